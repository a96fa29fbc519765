import { findSegment, rotationTrack } from '@slewcurve/core';
import { coreCopy, glMatrixCopy, threeCopy } from '../module-copies.js';
import { keyTimes, playbackTimes, scrubTimes, seeded, walk } from '../motion-data.js';
import type { BenchCase, Contender } from '../rounds.js';

/** Times asked in one batch: more than any cache holds the keys of, in the long tracks. */
const SAMPLES = 4000;

interface TrackCase {
  readonly tag: string;
  readonly times: Float32Array;
  readonly values: Float32Array;
  readonly at: Float64Array;
}

/** One track, its segment looked up: forwards at 60 frames a second, and at random times. */
export async function trackCases(): Promise<BenchCase[]> {
  const cases: BenchCase[] = [];
  for (const keys of [10, 100, 10_000, 1_000_000])
    for (const even of [false, true])
      for (const how of ['playback', 'scrub'] as const) cases.push(await trackCase(keys, even, how));
  return cases;
}

async function trackCase(keys: number, even: boolean, how: 'playback' | 'scrub'): Promise<BenchCase> {
  const id = `track-${keys}-${even ? 'even' : 'uneven'}-${how}`;
  const random = seeded(keys + (even ? 1 : 2));
  const times = keyTimes(keys, even, random);
  const values = walk(keys, (5 * Math.PI) / 180, random);
  const at = (how === 'playback' ? playbackTimes : scrubTimes)(times, SAMPLES, random);
  const shared: TrackCase = { tag: id, times, values, at };
  return {
    id,
    title: `one track, ${keys} ${even ? 'even' : 'uneven'} keys, ${how}`,
    unit: 'sample',
    items: SAMPLES,
    contenders: [
      await glMatrixSearched(shared),
      await threeInterpolant(shared),
      await ours(shared, 'float64'),
      await ours(shared, 'float32'),
    ],
    pairs: [
      ['ours float64', 'three interpolant'],
      ['ours float32', 'three interpolant'],
      ['ours float64', 'gl-matrix'],
      ['ours float32', 'gl-matrix'],
    ],
  };
}

/** With a binary search of its segment, as its user would write it, and views of the keys made as needed beforehand. */
async function glMatrixSearched({ tag, times, values, at }: TrackCase): Promise<Contender> {
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

async function threeInterpolant({ tag, times, values, at }: TrackCase): Promise<Contender> {
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

async function ours(
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
