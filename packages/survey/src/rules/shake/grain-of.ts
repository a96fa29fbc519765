import { medianGap } from '@slewcurve/core';
import { median } from '../../median.js';
import type { TrackContext } from '../../rule.js';
import { segmentsOf } from '../../segments.js';

const DEGREES = 180 / Math.PI;
/** deg/s: faster motion has fourth differences of its own. */
const SLOW = 60;
/** Keys on each side over which speed is judged. */
const AROUND = 6;
/** Fewer slow keys tell nothing. */
const FEWEST = 8;
/** Gaps that differ by more than this share are left out. */
const EVEN = 0.02;
/**
 * What white noise of one degree an axis leaves of p = |y₋₂ − 4y₋₁ + 6y₀ − 4y₁ + y₂|/6: each axis √70/6 = 1.394, and the median length
 * of a normal vector of three is 1.538 (the chi distribution of three degrees of freedom).
 */
const MEDIAN_OF_NOISE = 1.538 * (Math.sqrt(70) / 6);

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
  const { times } = context.track;
  const { orientations: q, speeds } = segmentsOf(context);
  const usual = medianGap(context.track);
  const missed = new Float64Array(times.length);
  let count = 0;
  for (let key = 2; key + 2 < times.length; key++) {
    if (!isSlowAt(times, q, key) || !isEven(times, key, usual) || !(speeds[key - 2]! + speeds[key + 1]! >= 0))
      continue;
    let square = 0;
    // Twice the chord is the turn here: under 60 deg/s the two differ by less than 1e-4° a key even at 24 frames a second.
    for (let i = 4 * key; i < 4 * key + 4; i++) {
      const d = q[i - 8]! - 4 * q[i - 4]! + 6 * q[i]! - 4 * q[i + 4]! + q[i + 8]!;
      square += d * d;
    }
    missed[count++] = (2 * Math.sqrt(square) * DEGREES) / 6;
  }
  return count < FEWEST ? 0 : median(missed.subarray(0, count)) / MEDIAN_OF_NOISE;
}

/** Over some keys on each side, so that the noise itself is not taken for motion. */
function isSlowAt(times: Float64Array, q: Float64Array, key: number): boolean {
  const [from, to] = [Math.max(0, key - AROUND), Math.min(times.length - 1, key + AROUND)];
  let square = 0;
  for (let i = 0; i < 4; i++) square += (q[4 * to + i]! - q[4 * from + i]!) ** 2;
  return 2 * Math.sqrt(square) * DEGREES < SLOW * ((times[to] ?? 0) - (times[from] ?? 0));
}

function isEven(times: Float64Array, key: number, usual: number): boolean {
  for (let k = key - 2; k < key + 2; k++)
    if (Math.abs((times[k + 1] ?? 0) - (times[k] ?? 0) - usual) > EVEN * usual) return false;
  return true;
}
