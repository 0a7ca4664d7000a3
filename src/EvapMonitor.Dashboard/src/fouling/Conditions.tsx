import type { ComponentChildren } from 'preact';
import type { Effect, Quantity } from '../api/types';
import type { Columns } from '../chart/trend';
import { useTrend } from '../chart/use-trend';
import { Shown } from '../parts/Waiting';

/** Conditions under which the coefficient was met, in the order of their panels. */
export const conditionsOf = (effect: Effect): Quantity[] => [
  'solids', 'boiling_temperature', 'heat_flux', 'driving_force',
  ...((effect.now?.head_corrected_driving_force_k ?? null) === null ? [] : ['head_corrected_driving_force' as const]),
];

export interface ConditionProps {
  quantity: Quantity;
  address: string;
  version: string;
  /** Draws the panel. */
  children: (shown: Columns, busy: boolean) => ComponentChildren;
}

/** One condition over time, in a panel that shares time axis and cursor with those beside it. */
export function Condition({ quantity, address, version, children }: ConditionProps) {
  const trend = useTrend(address, quantity, version);
  return <Shown of={trend.resource} what="A series of the conditions">{() => children(trend.columns!, trend.busy)}</Shown>;
}
