import { EVEN, FOURTH, dividedWeights, isEven } from './fourth-difference.js';

/** What the bound looks at; `period` is 0 where windows don't wrap. */
export interface CandidateGround {
  readonly times: Float64Array;
  /** Unit quaternions, each on the side of the one before. */
  readonly orientations: Float64Array;
  /** 1 where nothing is interpolated after a key. */
  readonly broken: Uint8Array;
  /** Median gap, seconds. */
  readonly gap: number;
  readonly period: number;
}

/** Keys that a window reaches to either side, positions likewise. */
const REACH = 6;
const POSITIONS = 4;
/** Length of q − p for a turn of 5°: up to that from key to key, chords tell the gains to a few per cent. */
const MODEST = 2 * Math.sin((5 * Math.PI) / 720);
/** Share of a least gain that the estimate by chords must reach. */
const SLACK = 0.5;

/**
 * Keys at which a lone key or a shelf of `size` radians may stand. A lone key of size a that a fit must explain 16 times over leaves
 * |d| ≥ 3.8a at its own position, a shelf explained 8 times ≥ 1.8a at its key or the one before; turns are twice the chord here, and a
 * quarter of the bound is asked for. Where the motion around is even and modest, the gains of both are estimated from the same chords,
 * and half of either least gain is asked for.
 *
 * @param noise what rounding leaves of |d|² at a position, rad²
 */
export function candidateKeys(
  ground: CandidateGround,
  size: number,
  gains: readonly [number, number] | undefined,
  noise: number,
): number[] {
  const { times, period } = ground;
  const chords = fourthChords(ground);
  const rough = roughSegments(ground);
  const isCandidate = (key: number): boolean => {
    if (gains === undefined || key < REACH || key + REACH >= times.length) return true;
    if (rough[key + REACH] > rough[key - REACH]) return true;
    return mayReach(chords, key, gains, noise / 4);
  };
  const found: number[] = [];
  const add = (key: number): void => {
    if (found.at(-1) !== key && isCandidate(key)) found.push(key);
  };
  const first = period > 0 ? 0 : 2;
  const last = period > 0 ? period : times.length - 2;
  for (let key = first; key < last; key++) {
    const square =
      chords[4 * key] ** 2 + chords[4 * key + 1] ** 2 + chords[4 * key + 2] ** 2 + chords[4 * key + 3] ** 2;
    if (2 * Math.sqrt(square) < 0.45 * size) continue;
    add(key);
    const next = period > 0 ? (key + 1) % period : key + 1;
    if (next > key) add(next);
  }
  if (period > 0 && found.length > 0 && found[0] !== 0) found.unshift(0);
  return found;
}

/** Fourth differences of the quaternions about every key, four numbers a key; 0 where a key is missing. */
function fourthChords({ times, orientations: q, gap, period }: CandidateGround): Float64Array {
  const count = times.length;
  const all = new Float64Array(4 * count);
  const weights = new Float64Array(5);
  const five = new Float64Array(5);
  const keys = new Int32Array(5);
  for (let key = 0; key < count; key++) {
    if (period === 0 && (key < 2 || key + 2 >= count)) continue;
    for (let m = 0; m < 5; m++) {
      const index = key + m - 2;
      const wraps = period > 0 ? Math.floor(index / period) : 0;
      keys[m] = index - wraps * period;
      five[m] = times[keys[m]] + (wraps === 0 ? 0 : wraps * (times[period] - times[0]));
    }
    if (isEven(five, 0, 5, gap)) weights.set(FOURTH);
    else dividedWeights(weights, five, 0, gap);
    // Over the seam of a loop the sides need not agree.
    const side = keys[0] < keys[4] || alongOf(q, 4 * period - 4, 0) >= 0 ? 1 : -1;
    for (let m = 0; m < 5; m++) {
      const weight = keys[m] < keys[0] ? side * weights[m] : weights[m];
      for (let i = 0; i < 4; i++) all[4 * key + i] += weight * q[4 * keys[m] + i];
    }
  }
  return all;
}

/** How many of the segments before each key are broken, of uneven length, or turned through fast. */
function roughSegments({ times, orientations: q, broken, gap }: CandidateGround): Int32Array {
  const rough = new Int32Array(times.length);
  for (let key = 0; key + 1 < times.length; key++) {
    let chord = 0;
    for (let i = 4 * key; i < 4 * key + 4; i++) chord += (q[i + 4] - q[i]) ** 2;
    const isUneven = !(Math.abs(times[key + 1] - times[key] - gap) <= (EVEN / 2) * gap);
    const isRough = isUneven || broken[key] === 1 || chord > MODEST * MODEST;
    rough[key + 1] = rough[key] + (isRough ? 1 : 0);
  }
  return rough;
}

/** Whether a lone key at `key` or a shelf into it reaches half of its least gain, by chords. `noise`: for the half turns that chords are. */
function mayReach(d: Float64Array, key: number, gains: readonly [number, number], noise: number): boolean {
  let roughness = 0;
  for (let i = 4 * (key - POSITIONS); i < 4 * (key + POSITIONS + 1); i++) roughness += d[i] * d[i];
  let lone = 0;
  let shelf = 0;
  for (let i = 4 * key; i < 4 * key + 4; i++) {
    lone += (d[i - 8] - 4 * d[i - 4] + 6 * d[i] - 4 * d[i + 4] + d[i + 8]) ** 2;
    shelf += (d[i - 8] - 3 * d[i - 4] + 3 * d[i] - d[i + 4]) ** 2;
  }
  const floor = (2 * POSITIONS + 1) * noise;
  return (
    roughness >= SLACK * gains[0] * (roughness - lone / 70 + floor) ||
    roughness >= SLACK * gains[1] * (roughness - shelf / 20 + floor)
  );
}

function alongOf(q: Float64Array, a: number, b: number): number {
  return q[a] * q[b] + q[a + 1] * q[b + 1] + q[a + 2] * q[b + 2] + q[a + 3] * q[b + 3];
}
