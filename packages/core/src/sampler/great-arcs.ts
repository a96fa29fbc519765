import type { SharedTimes } from './group.js';
import { writeWeights } from './segment-weights.js';
import { timeLookup, type TimeLookup } from './time-lookup.js';

/**
 * LINEAR tracks that share their times. One record a key: the orientation of every track, then the three weights of every track
 * for the segment that begins there, then the time. For a single track that is one cache line, which is what a random time costs
 * in a long one. The first h is negative where some track of the segment turns too far for the short polynomials: only h² is
 * asked for.
 */
export interface GreatArcs<Numbers extends Float64Array | Float32Array> {
  readonly records: Numbers;
  /** Numbers a record. */
  readonly stride: number;
  readonly lookup: TimeLookup;
}

/**
 * Fills `records`, which must hold `7 · tracks + 1` numbers a key; `near` is the greatest h of the short polynomials. The times
 * of float32 records stay float64 and apart: near 180 s a float32 time is off by up to 8e-6 s, at 500°/s hundreds of times the
 * arc's error.
 */
export function greatArcs<Numbers extends Float64Array | Float32Array>(
  { times, values }: SharedTimes,
  records: Numbers,
  near: number,
): GreatArcs<Numbers> {
  const count = times.length;
  const stride = records.length / count;
  const far = new Uint8Array(count);
  values.forEach((keys, track) => {
    for (let key = 0; key < count; key++) {
      const from = 4 * key;
      const row = key * stride;
      for (let i = 0; i < 4; i++) records[row + 4 * track + i] = keys[from + i];
      records[row + stride - 1] = times[key];
      const weights = row + 4 * values.length + 3 * track;
      if (key + 1 < count && writeWeights(records, weights, keys, from) > near) far[key] = 1;
    }
  });
  far.forEach((isFar, key) => {
    if (isFar === 1) records[key * stride + 4 * values.length] *= -1;
  });
  const lookup =
    records instanceof Float64Array
      ? timeLookup(records, stride, stride - 1, count)
      : timeLookup(times, 1, 0, count);
  return { records, stride, lookup };
}
