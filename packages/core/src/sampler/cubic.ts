import { hermiteCoefficients } from '../curve/component-cubic.js';
import type { NumberStore } from '../number-store.js';
import { unitScale } from '../quaternion/unit-scale.js';
import type { SharedTimes, WriteGroup } from './group.js';
import { locate, timeLookup } from './time-lookup.js';

/** Numbers of one track and segment: a cubic of four components. */
const CUBIC = 16;

/**
 * CUBICSPLINE tracks as glTF 2.0 plays them (Appendix C, "Cubic Spline Interpolation"): the four numbers by Hermite's cubic with
 * tangents per second, signs as stored, then made unit. One record a segment, one more for the last key.
 */
export function cubic(shared: SharedTimes): WriteGroup {
  const { times, values, slots } = shared;
  const lookup = timeLookup(times);
  const [start, end] = lookup.span;
  const records = cubicRecords(shared);
  const stride = CUBIC * values.length;
  return (t, out, at) => {
    if (!(t > start)) return writeCubics(records, 0, slots, 0, out, at);
    if (t >= end) return writeCubics(records, records.length - stride, slots, 0, out, at);
    const segment = locate(lookup, t);
    const t0 = times[segment];
    writeCubics(records, segment * stride, slots, (t - t0) / (times[segment + 1] - t0), out, at);
  };
}

function cubicRecords({ times, values }: SharedTimes): Float64Array {
  const records = new Float64Array(CUBIC * values.length * times.length);
  values.forEach((keys, track) => {
    for (let key = 0; key < times.length; key++) {
      const at = 12 * key;
      const row = key * values.length + track;
      const duration = times[key + 1] - times[key];
      if (key === times.length - 1) records.set(keys.subarray(at + 4, at + 8), CUBIC * row);
      else
        hermiteCoefficients(
          records,
          row,
          keys.subarray(at + 4, at + 8),
          keys.subarray(at + 8, at + 12).map((tangent) => duration * tangent),
          keys.subarray(at + 16, at + 20),
          keys.subarray(at + 12, at + 16).map((tangent) => duration * tangent),
        );
    }
  });
  return records;
}

function writeCubics(
  records: Float64Array,
  from: number,
  slots: Int32Array,
  u: number,
  out: NumberStore,
  at: number,
): void {
  for (let i = 0; i < slots.length; i++, from += CUBIC) {
    let x = component(records, from, u);
    let y = component(records, from + 1, u);
    let z = component(records, from + 2, u);
    let w = component(records, from + 3, u);
    let scale = unitScale(x, y, z, w);
    if (scale === 0) {
      // Of no length at all: the key before stands, as on the exact curve.
      x = records[from];
      y = records[from + 1];
      z = records[from + 2];
      w = records[from + 3];
      scale = unitScale(x, y, z, w);
    }
    const o = at + slots[i];
    out[o] = x * scale;
    out[o + 1] = y * scale;
    out[o + 2] = z * scale;
    out[o + 3] = w * scale;
  }
}

function component(records: Float64Array, from: number, u: number): number {
  return records[from] + u * (records[from + 4] + u * (records[from + 8] + u * records[from + 12]));
}
