import { rotationTrack } from '@slewcurve/core';
import { coreCopy, threeCopy } from '../module-copies.js';
import type { Contender } from '../rounds.js';

export interface OwnTimes {
  readonly tag: string;
  readonly joints: readonly { readonly times: Float32Array; readonly values: Float32Array }[];
  readonly at: Float64Array;
}

export async function threeEach({ tag, joints, at }: OwnTimes): Promise<Contender> {
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

export async function ours(
  { tag, joints, at }: OwnTimes,
  precision: 'float64' | 'float32',
): Promise<Contender> {
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
