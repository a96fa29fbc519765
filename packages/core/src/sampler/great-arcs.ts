import type { SharedTimes } from './group.js';
import { writeWeights } from './segment-weights.js';
import { timeLookup, type TimeLookup } from './time-lookup.js';

/**
 * LINEAR tracks that share their times. One record a key: the orientation of every track, then the three weights of every track
 * for the segment that begins there, then the time. For a single track that is one cache line, which is what a random time costs
 * in a long one.
 */
export interface GreatArcs<Numbers extends Float64Array | Float32Array> {
  readonly records: Numbers;
  /** Numbers a record. */
  readonly stride: number;
  /** 1 for segments in which no track turns by more than the bound of the short polynomials. */
  readonly near: Uint8Array;
  readonly lookup: TimeLookup;
}

/** `near` is the greatest h of the short polynomials. */
export function greatArcs64(shared: SharedTimes, near: number): GreatArcs<Float64Array> {
  const { times, values } = shared;
  const stride = 7 * values.length + 1;
  const records = new Float64Array(stride * times.length);
  times.forEach((time, key) => (records[key * stride + stride - 1] = time));
  const lookup = timeLookup(records, stride, stride - 1, times.length);
  return { records, stride, lookup, near: writeRecords(records, stride, shared, near) };
}

/** Times stay float64 and apart: near 180 s a float32 time is off by up to 8e-6 s, at 500°/s hundreds of times the arc's error. */
export function greatArcs32(shared: SharedTimes, near: number): GreatArcs<Float32Array> {
  const { times, values } = shared;
  const stride = 7 * values.length + 1;
  const records = new Float32Array(stride * times.length);
  const lookup = timeLookup(times, 1, 0, times.length);
  return { records, stride, lookup, near: writeRecords(records, stride, shared, near) };
}

function writeRecords(
  records: Float64Array | Float32Array,
  stride: number,
  { values }: SharedTimes,
  near: number,
): Uint8Array {
  const rows = records.length / stride;
  const isNear = new Uint8Array(rows).fill(1);
  values.forEach((keys, track) => {
    for (let key = 0; key < rows; key++) {
      const at = key * stride + 4 * track;
      for (let i = 0; i < 4; i++) records[at + i] = keys[4 * key + i];
      if (key === rows - 1) continue;
      const h = writeWeights(
        records,
        key * stride + 4 * values.length + 3 * track,
        keys,
        4 * key,
        4 * key + 4,
      );
      if (h > near) isNear[key] = 0;
    }
  });
  return isNear;
}
