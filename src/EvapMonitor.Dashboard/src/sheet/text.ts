const widths: [RegExp, number][] = [[/[\u202f.,:;'|iljI!]/, 0.3], [/[ ]/, 0.28], [/[()\-frt/]/, 0.42], [/[MWmw@%]/, 0.9], [/[A-Z±]/, 0.7]];

/** Width of a text in the page's type, px: rather too wide than too narrow. */
export function textWidth(text: string, size: number): number {
  let ems = 0;
  for (const c of text) ems += widths.find(([like]) => like.test(c))?.[1] ?? 0.6;
  return ems * size;
}

/** The text, or its beginning and its end around an ellipsis, in so much width: names often differ at their ends. */
export function fitted(text: string, width: number, size: number): string {
  if (textWidth(text, size) <= width) return text;
  const end = text.length > 5 ? text.slice(-2) : '';
  let cut = text.slice(0, text.length - end.length);
  while (cut.length > 0 && textWidth(`${cut}…${end}`, size) > width) cut = cut.slice(0, -1);
  return cut === '' ? '' : `${cut}…${end}`;
}

/** A name in at most two lines, broken after a hyphen or underscore where it has one. */
export function twoLines(name: string, width: number, size: number): string[] {
  if (textWidth(name, size) <= width) return [name];
  for (let at = name.length - 1; at > 0; at--) {
    if (/[-_ ]/.test(name[at]!) && textWidth(name.slice(0, at + 1), size) <= width) return [name.slice(0, at + 1).trimEnd(), fitted(name.slice(at + 1), width, size)];
  }
  return [fitted(name, width, size)];
}
