import type { NumberStore } from '../number-store.js';
import { greatArcs } from './great-arcs.js';
import { writeKeys, type SharedTimes, type WriteGroup } from './group.js';
import { NEAR_32, cosineNear32, cosineWide32, sineNear32, sineWide32 } from './half-angle.js';
import { locate } from './time-lookup.js';

/**
 * k = 2u − 1, written before it is read in every call. As an argument it would be a number object on the heap, and a stream of
 * those drives the keys out of the cache.
 */
const part = new Float64Array(1);

/**
 * LINEAR tracks, float32 grade. Their keys are unit and each on the side of the one before. The same lines as linear-float64 over
 * another kind of array: one loop for both would look up the kind of its array at every number.
 */
export function linearFloat32(shared: SharedTimes): WriteGroup {
  const { slots, times } = shared;
  const { records, stride, lookup } = greatArcs(
    shared,
    new Float32Array((7 * slots.length + 1) * shared.times.length),
    NEAR_32,
  );
  const [start, end] = lookup.span;
  const last = records.length - stride;
  return (t, out, at) => {
    // A time that is no number plays the first key.
    if (!(t > start)) return writeKeys(records, 0, slots, out, at);
    if (t >= end) return writeKeys(records, last, slots, out, at);
    const segment = locate(lookup, t);
    const from = segment * stride;
    const to = from + stride;
    const t0 = times[segment];
    const u = (t - t0) / (times[segment + 1] - t0);
    if (u === 0) return writeKeys(records, from, slots, out, at);
    part[0] = 2 * u - 1;
    if (records[from + 4 * slots.length] >= 0) writeNear(records, from, to, slots, out, at);
    else writeWide(records, from, to, slots, out, at);
  };
}

function writeNear(
  records: Float32Array,
  from: number,
  to: number,
  slots: Int32Array,
  out: NumberStore,
  at: number,
): void {
  const k = part[0];
  let weights = from + 4 * slots.length;
  for (let i = 0; i < slots.length; i++, from += 4, to += 4, weights += 3) {
    const x = k * records[weights];
    const even = cosineNear32(x * x) * records[weights + 1];
    const odd = k * sineNear32(x * x) * records[weights + 2];
    const before = even - odd;
    const after = even + odd;
    const o = at + slots[i];
    out[o] = before * records[from] + after * records[to];
    out[o + 1] = before * records[from + 1] + after * records[to + 1];
    out[o + 2] = before * records[from + 2] + after * records[to + 2];
    out[o + 3] = before * records[from + 3] + after * records[to + 3];
  }
}

function writeWide(
  records: Float32Array,
  from: number,
  to: number,
  slots: Int32Array,
  out: NumberStore,
  at: number,
): void {
  const k = part[0];
  let weights = from + 4 * slots.length;
  for (let i = 0; i < slots.length; i++, from += 4, to += 4, weights += 3) {
    const x = k * records[weights];
    const even = cosineWide32(x * x) * records[weights + 1];
    const odd = k * sineWide32(x * x) * records[weights + 2];
    const before = even - odd;
    const after = even + odd;
    const o = at + slots[i];
    out[o] = before * records[from] + after * records[to];
    out[o + 1] = before * records[from + 1] + after * records[to + 1];
    out[o + 2] = before * records[from + 2] + after * records[to + 2];
    out[o + 3] = before * records[from + 3] + after * records[to + 3];
  }
}
