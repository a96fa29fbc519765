import { expMap } from '../quaternion/exp-map.js';
import { multiply } from '../quaternion/multiply.js';
import { playableTrack } from '../track/playable-track.js';
import type { RotationTrack } from '../track/rotation-track.js';
import type { Curve } from './curve.js';
import { durations } from './segmented-curve.js';
import { segmentTurns } from './slerp-curve.js';
import { squadCurve } from './squad-curve.js';
import { copyKey, unitKeys } from './unit-keys.js';

/** How fast a spline passes its keys. */
export type KeyRates =
  /** K. Shoemake's inner points, which know no times: at uneven keys the speed jumps by the ratio of the gaps. */
  | 'uniform'
  /** (φ₋ + φ₊)/(h₋ + h₊): overshoots least. */
  | 'secant'
  /** Parabola through three keys (Bessel); where that would swing an inner point over half a turn, secant. */
  | 'three-point';

export interface RotationSplineOptions {
  readonly kind: 'squad';
  readonly rates: KeyRates;
  /** The last key is the first again: both take the rate across the seam. Default false; without effect where there are breaks. */
  readonly loop?: boolean;
}

/**
 * A smooth curve through the keys of a track, the short way between each two, whatever their signs. Kind `squad`: spherical
 * quadrangles with two inner points a key, so that one rate holds on both sides of it at uneven times too (M. Geier, "splines",
 * "Squad, non-uniform", for the three-point rule; the rest derived): a_i = q_i Exp((h_iω_i − φ_i)/2),
 * b_{i+1} = q_{i+1} Exp((φ_i − h_iω_{i+1})/2). First and last key, and keys beside breaks, take the rate of their one segment.
 * The rate is continuous (but for `uniform` at uneven times), the acceleration jumps at keys. Keys that cannot be played are left
 * out (`playableTrack`).
 */
export function rotationSpline(track: RotationTrack, options: RotationSplineOptions): Curve {
  const played = playableTrack(track);
  const { times, breaks } = played;
  const keys = onOneSide(unitKeys(played));
  const gaps = durations(times);
  const turns = segmentTurns(keys);
  const ends = segmentEnds(gaps.length, breaks, options.loop === true);
  const leaving = new Float64Array(4 * gaps.length);
  const arriving = new Float64Array(4 * gaps.length);
  const point = new Float64Array(4);
  const bow = new Float64Array(4);
  for (let i = 0; i < gaps.length; i++) {
    copyKey(point, keys, i);
    leaving.set(multiply(point, point, expMap(bow, bowAt(bow, ends.before[i], i, 1))), 4 * i);
    copyKey(point, keys, i + 1);
    arriving.set(multiply(point, point, expMap(bow, bowAt(bow, i, ends.after[i], -1))), 4 * i);
  }

  /** Rotation vector from a key to an inner point: of the segment after the key (side 1) or before it (side −1). */
  function bowAt(out: Float64Array, before: number, after: number, side: 1 | -1): Float64Array {
    const own = side === 1 ? after : before;
    const alone = before < 0 || after < 0;
    for (let k = 0; k < 3; k++) {
      if (alone) out[k] = 0;
      else if (options.rates === 'uniform') out[k] = (turns[3 * before + k] - turns[3 * after + k]) / 4;
      else out[k] = (side / 2) * (gaps[own] * rateAt(before, after, k) - turns[3 * own + k]);
    }
    return out;
  }

  function rateAt(before: number, after: number, k: number): number {
    const rule =
      options.rates === 'three-point' && parabolaHolds(turns, gaps, before, after) ? parabola : secant;
    return rule(turns[3 * before + k], gaps[before], turns[3 * after + k], gaps[after]);
  }

  const even = gaps.every((gap) => Math.abs(gap - gaps[0]) <= 1e-9 * gaps[0]);
  const continuity = options.rates === 'uniform' && !even ? 0 : 1;
  return squadCurve({ times, breaks, keys, leaving, arriving, continuity });
}

function secant(phi0: number, h0: number, phi1: number, h1: number): number {
  return (phi0 + phi1) / (h0 + h1);
}

function parabola(phi0: number, h0: number, phi1: number, h1: number): number {
  return ((phi0 / h0) * h1 + (phi1 / h1) * h0) / (h0 + h1);
}

/** Whether neither inner point of the three-point rule is over half a turn from its key: past that the end rate comes out wrong. */
function parabolaHolds(turns: Float64Array, gaps: Float64Array, before: number, after: number): boolean {
  return [before, after].every((own) => {
    let squared = 0;
    for (let k = 0; k < 3; k++) {
      const rate = parabola(turns[3 * before + k], gaps[before], turns[3 * after + k], gaps[after]);
      squared += ((gaps[own] * rate - turns[3 * own + k]) / 2) ** 2;
    }
    return squared <= Math.PI ** 2;
  });
}

/** For every segment the segments that join it at its first and at its last key; −1 where none does. */
function segmentEnds(
  count: number,
  breaks: readonly number[],
  loop: boolean,
): { before: Int32Array; after: Int32Array } {
  const before = Int32Array.from({ length: count }, (_, i) => i - 1);
  const after = Int32Array.from({ length: count }, (_, i) => (i + 1 < count ? i + 1 : -1));
  for (const held of breaks.filter((key) => key < count)) {
    if (held > 0) after[held - 1] = -1;
    if (held + 1 < count) before[held + 1] = -1;
  }
  if (loop && count > 0 && breaks.length === 0) {
    before[0] = count - 1;
    after[count - 1] = 0;
  }
  return { before, after };
}

/** Negates, in place, every key that lies on the other side of the one before. */
function onOneSide(keys: Float64Array): Float64Array {
  for (let at = 4; at < keys.length; at += 4) {
    let dot = 0;
    for (let k = 0; k < 4; k++) dot += keys[at + k] * keys[at - 4 + k];
    if (dot < 0) for (let k = 0; k < 4; k++) keys[at + k] = -keys[at + k];
  }
  return keys;
}
