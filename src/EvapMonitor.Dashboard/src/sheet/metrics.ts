/** Sizes of the drawing, px. "Along" follows the columns, "across" goes down from the steam to the condensate; turned, along runs down the page. */
export interface Metrics {
  turned: boolean;
  /** Left free before the first column, where the names of tracks and rows stand. */
  gutter: number;
  /** A column, and the box in it. */
  column: number;
  box: number;
  /** An effect, across. */
  across: number;
  /** Between two ports of a box; between two that lead to boxes of their own. */
  port: number;
  apart: number;
  lane: number;
  /** A heater, tank or other small box: across, and along (null: as its name needs). */
  small: { across: number; along: number | null };
  font: number;
}

/** Columns side by side, over the table. */
export function acrossThePage(columns: number, width: number): Metrics {
  const gutter = 116, column = Math.max(92, Math.min(176, Math.floor((width - gutter) / columns)));
  return { turned: false, gutter, column, box: Math.min(column - 16, 124), across: 98, port: 13, apart: 13, lane: 22, small: { across: 38, along: null }, font: 13 };
}

/** A row per column, for phones. */
export function downThePage(): Metrics {
  return { turned: true, gutter: 0, column: 92, box: 80, across: 92, port: 13, apart: 26, lane: 15, small: { across: 54, along: 22 }, font: 13 };
}
