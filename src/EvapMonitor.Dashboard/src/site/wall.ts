/** How a wall screen pages: so many lines at a time, each for so long. */
export const wallLines = 6, wallFor = 20_000;

/** How many pages so many lines need; at least one. */
export const wallPages = (lines: number) => Math.max(1, Math.ceil(lines / wallLines));

/** The page that shows at an instant of the service, ms. It follows the clock alone, so that screens beside each other show the same. */
export const wallPage = (lines: number, at: number) => Math.floor(at / wallFor) % wallPages(lines);

/** The lines of a page, in the plant file's order. */
export function ofWallPage<T>(lines: readonly T[], page: number): T[] {
  const start = Math.min(page, wallPages(lines.length) - 1) * wallLines;
  return lines.slice(start, start + wallLines);
}
