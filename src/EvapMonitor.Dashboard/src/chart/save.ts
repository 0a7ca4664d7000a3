import { send } from '../api/request';

/** Hands a file to the reader. */
export function save(content: Blob, name: string): void {
  const link = document.createElement('a');
  link.href = URL.createObjectURL(content);
  link.download = name;
  link.click();
  setTimeout(() => URL.revokeObjectURL(link.href), 10_000);
}

/** The series behind a chart as the service writes CSV. */
export async function saveCsv(address: string, name: string): Promise<void> {
  const answer = await send(address, { headers: { accept: 'text/csv' } });
  save(await answer.blob(), `${name}.csv`);
}

/** A chart as PNG: its title above, its foot below, on the colour of the page. */
export function savePng(canvas: HTMLCanvasElement, title: string, foot: string, colours: { card: string; ink: string; soft: string }, name: string): void {
  const px = devicePixelRatio, edge = 16 * px, band = 30 * px;
  const picture = document.createElement('canvas');
  picture.width = canvas.width + 2 * edge;
  picture.height = canvas.height + 2 * edge + 2 * band;
  const ctx = picture.getContext('2d')!;
  ctx.fillStyle = colours.card;
  ctx.fillRect(0, 0, picture.width, picture.height);
  ctx.drawImage(canvas, edge, edge + band);
  ctx.textBaseline = 'top';
  ctx.fillStyle = colours.ink;
  ctx.font = `600 ${16 * px}px "Atkinson Hyperlegible Next Variable", system-ui, sans-serif`;
  ctx.fillText(title, edge, edge);
  ctx.fillStyle = colours.soft;
  ctx.font = `${13 * px}px "Atkinson Hyperlegible Next Variable", system-ui, sans-serif`;
  ctx.fillText(foot, edge, picture.height - edge - 18 * px);
  picture.toBlob(blob => { if (blob) save(blob, `${name}.png`); }, 'image/png');
}
