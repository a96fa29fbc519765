import { keyGrain, medianGap } from '@slewcurve/core';
import type { TrackContext } from '../../rule.js';
import { segmentsOf } from '../../segments.js';

const DEGREES = 180 / Math.PI;

const known = new WeakMap<TrackContext, number>();

/** Standard deviation of the noise on a dense track, degrees an axis; 0 where it can't be told. */
export function grainOf(context: TrackContext): number {
  const before = known.get(context);
  if (before !== undefined) return before;
  const grain = context.regime === 'dense' ? measured(context) : 0;
  known.set(context, grain);
  return grain;
}

function measured(context: TrackContext): number {
  const { orientations, speeds } = segmentsOf(context);
  // Nothing turns across a break: its speed is NaN.
  const isJoined = (key: number): boolean => (speeds[key] ?? Number.NaN) >= 0;
  return DEGREES * keyGrain(context.track.times, orientations, medianGap(context.track), isJoined);
}
