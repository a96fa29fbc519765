import { turnBetween } from '../key-turns.js';

/** Sigmas out to which keys count: there the weight is 0.0003 of the middle's. */
const REACH = 4;

/** Keys that have turned further than this, radians (120°), have no common tangent space worth a polynomial. */
const FAR = (2 * Math.PI) / 3;

/** Where a local polynomial stands and how it turns at a key, against that key. Own axes, radians and rad/s. */
interface LocalFit {
  readonly turn: Float64Array;
  readonly rate: Float64Array;
}

/** Fits around one key after the other; the result is overwritten by the next call. */
export type LocalFitter = (key: number) => LocalFit;

/**
 * Σ wⱼ·log(q⁻¹qⱼ) with the weights of a parabola fitted by least squares under a Gaussian of standard deviation `sigma` seconds: on even
 * keys, away from ends, they leave every motion alone that is locally cubic, and are those of Savitzky and Golay (1964) with a Gaussian instead of a
 * box. Uneven keys, and keys beside an end, get the weights that do the same there. In the tangent space of the key itself, after Lee and Shin,
 * "General construction of time-domain filters for orientation data", IEEE TVCG 8 (2002).
 *
 * @param orientations unit quaternions on one side
 * @param isJoined whether keys `key` and `key + 1` may be looked at together
 * @param withItself false: a key is told by the others alone
 */
export function localFitter(
  times: Float64Array,
  orientations: Float64Array,
  sigma: number,
  isJoined: (key: number) => boolean,
  withItself = true,
): LocalFitter {
  const turn = new Float64Array(3);
  const rate = new Float64Array(3);
  const moments = new Float64Array(5);
  const sums = new Float64Array(9);
  const y = new Float64Array(3);
  const reach = REACH * sigma;

  /** Takes in one key; false where it is out of reach. */
  const take = (key: number, other: number): boolean => {
    const seconds = times[other] - times[key];
    if (Math.abs(seconds) > reach) return false;
    turnBetween(y, orientations, key, other);
    if (Math.abs(y[0]) + Math.abs(y[1]) + Math.abs(y[2]) > FAR) return false;
    const s = seconds / sigma;
    let weight = Math.exp((-s * s) / 2);
    for (let power = 0; power < 5; power++) {
      moments[power] += weight;
      if (power < 3) for (let axis = 0; axis < 3; axis++) sums[3 * power + axis] += weight * y[axis];
      weight *= s;
    }
    return true;
  };

  return (key) => {
    moments.fill(0);
    sums.fill(0);
    if (withItself) take(key, key);
    let count = Number(withItself);
    for (let other = key; other > 0 && isJoined(other - 1) && take(key, other - 1); other--) count++;
    for (let other = key; other + 1 < times.length && isJoined(other) && take(key, other + 1); other++)
      count++;
    const [value, slope] = parabolaWeights(moments, Math.min(count, 3));
    for (let axis = 0; axis < 3; axis++) {
      turn[axis] = value[0] * sums[axis] + value[1] * sums[3 + axis] + value[2] * sums[6 + axis];
      rate[axis] = (slope[0] * sums[axis] + slope[1] * sums[3 + axis] + slope[2] * sums[6 + axis]) / sigma;
    }
    return { turn, rate };
  };
}

/**
 * Share of white noise's power that a fit at `sigma` leaves on even keys `gap` seconds apart: Σ wⱼ².
 */
export function noiseLeft(sigma: number, gap: number): number {
  const reach = Math.floor((REACH * sigma) / gap);
  const moments = new Float64Array(5);
  const each = (add: (weight: number, s: number) => void): void => {
    for (let j = -reach; j <= reach; j++) {
      const s = (j * gap) / sigma;
      add(Math.exp((-s * s) / 2), s);
    }
  };
  each((weight, s) => {
    for (let power = 0; power < 5; power++) moments[power] += weight * s ** power;
  });
  const [value] = parabolaWeights(moments, Math.min(2 * reach + 1, 3));
  let sum = 0;
  each((weight, s) => (sum += (weight * (value[0] + value[1] * s + value[2] * s * s)) ** 2));
  return sum;
}

type Three = readonly [number, number, number];

/** What the sums of 1, s and s² count for in the fitted polynomial's value and slope at s = 0; of degree `terms` − 1. */
function parabolaWeights([m0, m1, m2, m3, m4]: Float64Array, terms: number): readonly [Three, Three] {
  if (terms === 1)
    return [
      [1 / m0, 0, 0],
      [0, 0, 0],
    ];
  if (terms === 2) {
    const det = m0 * m2 - m1 * m1;
    return [
      [m2 / det, -m1 / det, 0],
      [-m1 / det, m0 / det, 0],
    ];
  }
  // First two rows of the inverse of the moments' matrix, by cofactors.
  const c00 = m2 * m4 - m3 * m3;
  const c01 = m2 * m3 - m1 * m4;
  const c02 = m1 * m3 - m2 * m2;
  const det = m0 * c00 + m1 * c01 + m2 * c02;
  const value: Three = [c00 / det, c01 / det, c02 / det];
  return [value, [c01 / det, (m0 * m4 - m2 * m2) / det, (m1 * m2 - m0 * m3) / det]];
}
