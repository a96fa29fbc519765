import { rotationTrack } from '@slewcurve/core';
import { coreCopy, threeCopy } from '../module-copies.js';
import { keyTimes, playbackTimes, scrubTimes, seeded, walk } from '../motion-data.js';
import type { BenchCase, Contender } from '../rounds.js';

const JOINTS = 80;
const POSES = 50;

interface OwnTimes {
  readonly tag: string;
  readonly joints: readonly { readonly times: Float32Array; readonly values: Float32Array }[];
  readonly at: Float64Array;
}

/** 80 joints at one time, each with uneven key times of its own. */
export async function ownTimePoses(): Promise<BenchCase[]> {
  const cases: BenchCase[] = [];
  for (const keys of [60, 5400])
    for (const how of ['playback', 'scrub'] as const) {
      const id = `own-times-${keys}-${how}`;
      const random = seeded(keys + 17);
      const joints = Array.from({ length: JOINTS }, () => ({
        times: keyTimes(keys, false, random),
        values: walk(keys, (5 * Math.PI) / 180, random),
      }));
      const pick = how === 'playback' ? playbackTimes : scrubTimes;
      const shared: OwnTimes = { tag: id, joints, at: pick(joints[0].times, POSES, random) };
      cases.push({
        id,
        title: `80 joints, ${keys} uneven keys of their own, ${how}`,
        unit: 'joint',
        items: JOINTS * POSES,
        contenders: [await threeEach(shared), await ours(shared, 'float64'), await ours(shared, 'float32')],
        pairs: [
          ['ours float64', 'three, 80 interpolants'],
          ['ours float32', 'three, 80 interpolants'],
        ],
      });
    }
  return cases;
}

async function threeEach({ tag, joints, at }: OwnTimes): Promise<Contender> {
  const { QuaternionLinearInterpolant } = await threeCopy(tag);
  const interpolants = joints.map(
    ({ times, values }) => new QuaternionLinearInterpolant(times, values, 4, new Float32Array(4)),
  );
  return {
    name: 'three, 80 interpolants',
    run: () => {
      for (let n = 0; n < at.length; n++)
        for (let i = 0; i < interpolants.length; i++) interpolants[i].evaluate(at[n]);
      return interpolants[7].resultBuffer[0];
    },
  };
}

async function ours({ tag, joints, at }: OwnTimes, precision: 'float64' | 'float32'): Promise<Contender> {
  const { poseSampler } = await coreCopy(`${tag}-${precision}`);
  const { samplePose } = poseSampler(joints.map(rotationTrack), { precision });
  const out = new Float32Array(4 * joints.length);
  return {
    name: `ours ${precision}`,
    run: () => {
      for (let n = 0; n < at.length; n++) samplePose(at[n], out);
      return out[28];
    },
  };
}
