import type { ChartData, HandEdit, Motion } from '@slewcurve/elements/plot';

/** What the chart says of an edit by hand. */
export interface Sketched {
  readonly edit: HandEdit;
  readonly settled: boolean;
  readonly idle: boolean;
  readonly motion?: Motion;
}

/** A chart's data with a sketch of the edit at hand in place of its motion. */
export function sketchedData(data: ChartData, motion: Motion | undefined): ChartData {
  if (!motion) return data;
  const motionBefore = data.tried ? data.before?.motion : data.motion;
  return { ...data, motion, ...(motionBefore && { before: { motion: motionBefore, name: 'before' } }) };
}
