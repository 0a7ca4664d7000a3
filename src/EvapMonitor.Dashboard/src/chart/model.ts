import type { Cleaning } from '../api/types';
import type { Axis } from './axis';
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
  cleanings: readonly Cleaning[];
  span: Span;
  zone: string;
  palette: Palette;
  /** Laid out at drawing. */
  axis: Axis;
  /** How many values the axis leaves out, as far from all others. */
  outside: number;
  /** The lane of cleanings on top. */
  lane: boolean;
  /** The latest value's label, when the span holds it. */
  latest: { value: number; label: string } | null;
  narrow: boolean;
}
