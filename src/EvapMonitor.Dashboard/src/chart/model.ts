import type { Axis } from './axis';
import type { LaneMark } from './lane';
import type { Palette } from './palette';
import type { Columns } from './trend';
import type { Span } from './view';

/** Everything that one chart draws; changed in place and drawn anew. */
export interface ChartModel {
  columns: Columns;
  /** The clean expectation over the same time, dashed; null when it is not drawn. */
  clean: Columns | null;
  /** The limit, in the unit shown, and its words in the gutter. */
  limit: { value: number; label: string } | null;
  /** Cleanings and stops. */
  marks: readonly LaneMark[];
  span: Span;
  zone: string;
  palette: Palette;
  /** Laid out at drawing. */
  axis: Axis;
  /** How many values the axis leaves out, as far from all others. */
  outside: number;
  /** The lane of cleanings and stops on top; without it cleanings are lines down the plot alone. */
  lane: boolean;
  /** A dashed line at zero, where nothing is on the surface. */
  zero: boolean;
  /** Whether the time axis has its labels: of charts under each other the last one alone. */
  times: boolean;
  /** The latest value's label, when the span holds it. */
  latest: { value: number; label: string } | null;
  narrow: boolean;
  /** At most so many steps of the value axis. */
  most: number;
}
