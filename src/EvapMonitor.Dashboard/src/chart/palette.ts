const names = ['card', 'ink', 'soft', 'faint', 'hair', 'water', 'wash', 'soon', 'now'] as const;

/** Colours of the page's tokens as the canvas takes them. */
export type Palette = Record<(typeof names)[number], string>;

/** Reads the tokens through an element, so that system colours of a forced palette become real ones. */
export function readPalette(element: HTMLElement): Palette {
  const probe = document.createElement('span');
  probe.hidden = true;
  element.append(probe);
  const palette = {} as Palette;
  for (const name of names) {
    probe.style.color = `var(--${name})`;
    palette[name] = getComputedStyle(probe).color;
  }
  probe.remove();
  return palette;
}

/** Whether the page is being printed. */
export const onPaper = () => document.documentElement.classList.contains('paper');

/** Calls back when the colours may have changed: light and dark, forced colours, paper. Returns what stops it. */
export function watchPalette(changed: () => void): () => void {
  const queries = ['(prefers-color-scheme: dark)', '(forced-colors: active)'].map(q => matchMedia(q));
  const paper = () => { document.documentElement.classList.add('paper'); changed(); };
  const screen = () => { document.documentElement.classList.remove('paper'); changed(); };
  queries.forEach(q => q.addEventListener('change', changed));
  addEventListener('beforeprint', paper);
  addEventListener('afterprint', screen);
  return () => {
    queries.forEach(q => q.removeEventListener('change', changed));
    removeEventListener('beforeprint', paper);
    removeEventListener('afterprint', screen);
  };
}
