import { findSegment, rotationTrack } from '@slewcurve/core';
import { coreCopy, glMatrixCopy, threeCopy } from '../module-copies.js';
import type { Contender } from '../rounds.js';

export interface TrackCase {
  readonly tag: string;
  readonly times: Float32Array;
  readonly values: Float32Array;
  readonly at: Float64Array;
}

/** With a binary search of its segment, as its user would write it, and views of the keys made as needed beforehand. */
export async function glMatrixSearched({ tag, times, values, at }: TrackCase): Promise<Contender> {
  const { slerp } = await glMatrixCopy(tag);
  const keys = Array.from(times, (_, key) => values.subarray(4 * key, 4 * key + 4));
  const out = new Float32Array(4);
  return {
    name: 'gl-matrix',
    run: () => {
      let sum = 0;
      for (let n = 0; n < at.length; n++) {
        const t = at[n];
        const key = findSegment(times, t);
        slerp(out, keys[key], keys[key + 1], (t - times[key]) / (times[key + 1] - times[key]));
        sum += out[0];
      }
      return sum;
    },
  };
}

export async function threeInterpolant({ tag, times, values, at }: TrackCase): Promise<Contender> {
  const { QuaternionLinearInterpolant } = await threeCopy(tag);
  const out = new Float32Array(4);
  const interpolant = new QuaternionLinearInterpolant(times, values, 4, out);
  return {
    name: 'three interpolant',
    run: () => {
      let sum = 0;
      for (let n = 0; n < at.length; n++) {
        interpolant.evaluate(at[n]);
        sum += out[0];
      }
      return sum;
    },
  };
}

export async function ours(
  { tag, times, values, at }: TrackCase,
  precision: 'float64' | 'float32',
): Promise<Contender> {
  const { sampler } = await coreCopy(`${tag}-${precision}`);
  const { sample } = sampler(rotationTrack({ times, values }), { precision });
  // A second one, since V8 builds the arrays of a function that was made only once into its code.
  sampler(rotationTrack({ times: [0, 1], values: values.slice(0, 8) }), { precision }).sample(
    0.5,
    [0, 0, 0, 0],
  );
  const out = new Float32Array(4);
  return {
    name: `ours ${precision}`,
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
