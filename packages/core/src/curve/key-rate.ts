import type { NumberStore } from '../number-store.js';

/** How fast a spline passes its keys. */
export type KeyRates =
  /** K. Shoemake's inner points, which know no times: at uneven keys the speed jumps by the ratio of the gaps. */
  | 'uniform'
  /** (φ₋ + φ₊)/(h₋ + h₊): overshoots least of those that are not limited. */
  | 'secant'
  /** Parabola through three keys (Bessel); where that would swing an inner point over half a turn, secant. */
  | 'three-point'
  /** Secant, and never so fast that the curve runs past a key that it turns back at or holds. */
  | 'limited';

/** Turns and durations of segments, as `SplineKeys` and the log chart have them. */
export interface SegmentTurns {
  readonly turns: Float64Array;
  readonly gaps: Float64Array;
}

/**
 * The rate, rad/s, by which a spline passes the key between segments `before` and `after`; −1 where there is none: then the rate
 * of the other one. `uniform` is squad's own and counts as `secant` here.
 */
export function keyRate(
  out: NumberStore,
  segments: SegmentTurns,
  before: number,
  after: number,
  rates: KeyRates,
): void {
  if (before < 0 || after < 0) return chordRate(out, segments, Math.max(before, after));
  if (rates === 'three-point' && parabola(out, segments, before, after)) return;
  secant(out, segments, before, after);
  if (rates === 'limited') limit(out, segments, before, after);
}

function chordRate(out: NumberStore, { turns, gaps }: SegmentTurns, segment: number): void {
  for (let k = 0; k < 3; k++) out[k] = turns[3 * segment + k] / gaps[segment];
}

function secant(out: NumberStore, { turns, gaps }: SegmentTurns, before: number, after: number): void {
  const span = gaps[before] + gaps[after];
  for (let k = 0; k < 3; k++) out[k] = (turns[3 * before + k] + turns[3 * after + k]) / span;
}

/** False where an inner point of squad would be over half a turn from its key: past that its end rate comes out wrong. */
function parabola(out: NumberStore, { turns, gaps }: SegmentTurns, before: number, after: number): boolean {
  const h0 = gaps[before];
  const h1 = gaps[after];
  let left = 0;
  let right = 0;
  for (let k = 0; k < 3; k++) {
    const phi0 = turns[3 * before + k];
    const phi1 = turns[3 * after + k];
    out[k] = ((phi0 / h0) * h1 + (phi1 / h1) * h0) / (h0 + h1);
    left += ((h0 * out[k] - phi0) / 2) ** 2;
    right += ((h1 * out[k] - phi1) / 2) ** 2;
  }
  return Math.max(left, right) <= Math.PI ** 2;
}

/**
 * F. N. Fritsch and R. E. Carlson, SIAM J. Numer. Anal. 17 (1980) 238–246 (abstract seen): a cubic runs monotone where its end
 * slopes do not oppose its mean slope and are at most three times as large. So what of the rate opposes a chord is taken out of
 * it, and the rest is shortened to three times the slower mean rate: 0 where the turn goes straight back or rests. Exact for
 * turns about one axis; for others the same along each chord, changing smoothly with the keys.
 */
function limit(out: NumberStore, { turns, gaps }: SegmentTurns, before: number, after: number): void {
  let most = Infinity;
  for (const segment of [before, after]) {
    const squared = agreement(turns, segment, turns, segment);
    const along = agreement(turns, segment, out, 0);
    if (along < 0 && squared > 0)
      for (let k = 0; k < 3; k++) out[k] -= (along / squared) * turns[3 * segment + k];
    most = Math.min(most, (3 * Math.sqrt(squared)) / gaps[segment]);
  }
  const size = Math.sqrt(agreement(out, 0, out, 0));
  const scale = size > most ? most / size : 1;
  for (let k = 0; k < 3; k++) out[k] *= scale;
}

function agreement(a: NumberStore, i: number, b: NumberStore, j: number): number {
  return a[3 * i] * b[3 * j] + a[3 * i + 1] * b[3 * j + 1] + a[3 * i + 2] * b[3 * j + 2];
}
