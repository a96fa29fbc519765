import type { NumberStore } from '../number-store.js';
import { ARC } from './arc-record.js';
import { fillArcs } from './great-arcs.js';
import { writeKeys, type SharedTimes, type WriteGroup } from './group.js';
import { NEAR_32, cosineNear32, cosineWide32, sineNear32, sineWide32 } from './half-angle.js';
import { locate, timeLookup } from './time-lookup.js';

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
  const { times, slots } = shared;
  const tracks = slots.length;
  const arcs = new Float32Array(ARC * tracks * (times.length - 1));
  const keys = new Float32Array(4 * tracks * times.length);
  fillArcs(shared, arcs, keys, NEAR_32);
  const lookup = timeLookup(times);
  const [start, end] = lookup.span;
  const slot = slots[0];
  return (t, out, at) => {
    // A time that is no number plays the first key.
    if (!(t > start && t < end))
      return writeKeys(keys, t >= end ? keys.length - 4 * tracks : 0, slots, out, at);
    const segment = locate(lookup, t);
    const t0 = times[segment];
    if (t === t0) return writeKeys(keys, 4 * tracks * segment, slots, out, at);
    const k = (2 * (t - t0)) / (times[segment + 1] - t0) - 1;
    const from = ARC * tracks * segment;
    const near = arcs[from] >= 0;
    if (near && tracks === 1) return writeOne(arcs, from, k, out, at + slot);
    part[0] = k;
    if (near) writeNear(arcs, from, slots, out, at);
    else writeWide(arcs, from, slots, out, at);
  };
}

/** writeNear of one track. Short enough for an engine to build it into the loop that asks for samples. */
function writeOne(arcs: Float32Array, from: number, k: number, out: NumberStore, at: number): void {
  const x = k * arcs[from];
  const even = cosineNear32(x * x);
  const odd = k * sineNear32(x * x);
  out[at] = even * arcs[from + 1] + odd * arcs[from + 5];
  out[at + 1] = even * arcs[from + 2] + odd * arcs[from + 6];
  out[at + 2] = even * arcs[from + 3] + odd * arcs[from + 7];
  out[at + 3] = even * arcs[from + 4] + odd * arcs[from + 8];
}

function writeNear(arcs: Float32Array, from: number, slots: Int32Array, out: NumberStore, at: number): void {
  const k = part[0];
  for (let i = 0; i < slots.length; i++, from += ARC) {
    const x = k * arcs[from];
    const even = cosineNear32(x * x);
    const odd = k * sineNear32(x * x);
    const o = at + slots[i];
    out[o] = even * arcs[from + 1] + odd * arcs[from + 5];
    out[o + 1] = even * arcs[from + 2] + odd * arcs[from + 6];
    out[o + 2] = even * arcs[from + 3] + odd * arcs[from + 7];
    out[o + 3] = even * arcs[from + 4] + odd * arcs[from + 8];
  }
}

function writeWide(arcs: Float32Array, from: number, slots: Int32Array, out: NumberStore, at: number): void {
  const k = part[0];
  for (let i = 0; i < slots.length; i++, from += ARC) {
    const x = k * arcs[from];
    const even = cosineWide32(x * x);
    const odd = k * sineWide32(x * x);
    const o = at + slots[i];
    out[o] = even * arcs[from + 1] + odd * arcs[from + 5];
    out[o + 1] = even * arcs[from + 2] + odd * arcs[from + 6];
    out[o + 2] = even * arcs[from + 3] + odd * arcs[from + 7];
    out[o + 3] = even * arcs[from + 4] + odd * arcs[from + 8];
  }
}
