import { findSegment, rotationTrack } from '@slewcurve/core';
import { coreCopy, glMatrixCopy } from '../module-copies.js';
import { keyTimes, scrubTimes, seeded, turned, walk } from '../motion-data.js';
import type { BenchCase, Contender } from '../rounds.js';

const SAMPLES = 2000;
const KEYS = 60;

/** Squad through the keys of one track, compiled, one call a pair of keys, and gl-matrix's `sqlerp`. */
export async function squadCases(): Promise<BenchCase[]> {
  const cases: BenchCase[] = [];
  for (const degrees of [5, 30]) {
    const id = `squad-${degrees}`;
    const random = seeded(degrees);
    const times = keyTimes(KEYS, true, random);
    const values = walk(KEYS, (degrees * Math.PI) / 180, random);
    const at = scrubTimes(times, SAMPLES, random);
    cases.push({
      id,
      title: `squad, ${KEYS} keys about ${degrees}° apart, random times`,
      unit: 'squad',
      items: SAMPLES,
      contenders: [await glMatrixSqlerp(id, times, values, at), await ours(id, times, values, at)],
      pairs: [['ours compiled', 'gl-matrix sqlerp']],
    });
  }
  return cases;
}

/** Keys and inner points made beforehand and the segment given: what is timed is `sqlerp` alone. */
async function glMatrixSqlerp(
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

async function ours(
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
