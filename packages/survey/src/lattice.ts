import type { RotationTrack } from '@slewcurve/core';

/** Fewer keys or levels than this say nothing of a lattice. */
const LEAST_KEYS = 50;
const LEAST_LEVELS = 16;
/** Finer lattices drown in the motion at any usual rate. */
const FINEST = 1e-5;
/** Keys that are looked at before all are: a smooth track of float32 shows its fine steps there. */
const GLANCE = 64;
/** How far from whole steps differences may lie, in steps. */
const OFF = 0.1;

/**
 * Step of the lattice that all stored quaternion components lie on, 0 where there is none coarser than 1e-5: the least difference of two
 * components, where every other is a whole multiple of it. Normalised bytes that were widened to float32 give 1/127.
 */
export function latticeOf(track: RotationTrack): number {
  const { values, times, interpolation } = track;
  if (times.length < LEAST_KEYS || interpolation === 'EULER' || interpolation === 'CUBICSPLINE') return 0;
  if (stepOf(values.slice(0, 4 * GLANCE), 2) === 0) return 0;
  return stepOf(values.slice(), LEAST_LEVELS);
}

function stepOf(values: Float64Array, leastLevels: number): number {
  values.sort();
  let step = Infinity;
  for (let i = 1; i < values.length; i++) {
    const difference = (values[i] ?? 0) - (values[i - 1] ?? 0);
    if (difference > 0 && difference < step) step = difference;
  }
  if (!(step >= FINEST && step < Infinity)) return 0;
  let levels = 1;
  for (let i = 1; i < values.length; i++) {
    const steps = ((values[i] ?? 0) - (values[i - 1] ?? 0)) / step;
    if (Math.abs(steps - Math.round(steps)) > OFF) return 0;
    if (steps > 0.5) levels++;
  }
  return levels >= leastLevels ? step : 0;
}
