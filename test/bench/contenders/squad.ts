import { findSegment, rotationTrack } from '@slewcurve/core';
import { coreCopy, glMatrixCopy } from '../module-copies.js';
import { seeded, turned } from '../motion-data.js';
import type { Contender } from '../rounds.js';

/** Keys and inner points made beforehand and the segment given: what is timed is `sqlerp` alone. */
export async function glMatrixSqlerp(
  tag: string,
  times: Float32Array,
  values: Float32Array,
  at: Float64Array,
): Promise<Contender> {
  const { sqlerp } = await glMatrixCopy(tag);
  const random = seeded(3);
  const keys = Array.from(times, (_, key) => values.slice(4 * key, 4 * key + 4));
  const [leaving, arriving] = [0, 1].map(() => keys.map((key) => turned(key, 0.05, random)));
  const segments = Int32Array.from(at, (t) => findSegment(times, t));
  const parts = Float64Array.from(at, (t, n) => {
    const key = segments[n];
    return (t - times[key]) / (times[key + 1] - times[key]);
  });
  const out = new Float32Array(4);
  return {
    name: 'gl-matrix sqlerp',
    run: () => {
      let sum = 0;
      for (let n = 0; n < at.length; n++) {
        const key = segments[n];
        sqlerp(out, keys[key], leaving[key], arriving[key + 1], keys[key + 1], parts[n]);
        sum += out[0];
      }
      return sum;
    },
  };
}

export async function ours(
  tag: string,
  times: Float32Array,
  values: Float32Array,
  at: Float64Array,
): Promise<Contender> {
  const { squadSampler } = await coreCopy(tag);
  const { sample } = squadSampler(rotationTrack({ times, values }), { rates: 'secant' });
  const out = new Float32Array(4);
  return {
    name: 'ours compiled',
    run: () => {
      let sum = 0;
      for (let n = 0; n < at.length; n++) {
        sample(at[n], out);
        sum += out[0];
      }
      return sum;
    },
  };
}
