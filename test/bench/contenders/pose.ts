import { findSegment, rotationTrack } from '@slewcurve/core';
import { coreCopy, glMatrixCopy, threeCopy } from '../module-copies.js';
import type { Contender } from '../rounds.js';

/** Everything that the contenders of one case share. */
export interface PoseCase {
  readonly tag: string;
  readonly keyTimes: Float32Array;
  /** For each joint its keys, 4 numbers each. */
  readonly joints: readonly Float32Array[];
  readonly at: Float64Array;
}

/** Number of the segment that each time lies in, and how far into it. */
function segmentsOf(times: Float32Array, at: Float64Array): { segments: Int32Array; parts: Float64Array } {
  const segments = Int32Array.from(at, (t) => findSegment(times, t));
  const parts = Float64Array.from(at, (t, n) => {
    const key = segments[n];
    return (t - times[key]) / (times[key + 1] - times[key]);
  });
  return { segments, parts };
}

/** Key views made beforehand, and the segment given: gl-matrix has no lookup to time. */
export async function glMatrixViews({ tag, keyTimes: times, joints, at }: PoseCase): Promise<Contender> {
  const { slerp } = await glMatrixCopy(tag);
  const keys = Array.from(times, (_, key) => joints.map((joint) => joint.slice(4 * key, 4 * key + 4)));
  const outs = joints.map(() => new Float32Array(4));
  const { segments, parts } = segmentsOf(times, at);
  return {
    name: 'gl-matrix',
    run: () => {
      for (let n = 0; n < at.length; n++) {
        const from = keys[segments[n]];
        const to = keys[segments[n] + 1];
        for (let i = 0; i < outs.length; i++) slerp(outs[i], from[i], to[i], parts[n]);
      }
      return outs[7][0];
    },
  };
}

/**
 * three's best form: its quaternion function over packed keys, the segment given. Its interpolant would not do: of a value of 320
 * numbers r187 writes the first four alone.
 */
export async function threeFlat({ tag, keyTimes: times, joints, at }: PoseCase): Promise<Contender> {
  const { Quaternion } = await threeCopy(`${tag}-flat`);
  const size = 4 * joints.length;
  const values = new Float32Array(size * times.length);
  joints.forEach((joint, i) =>
    joint.forEach((number, k) => (values[(k >> 2) * size + 4 * i + (k & 3)] = number)),
  );
  const { segments, parts } = segmentsOf(times, at);
  const out = new Float32Array(size);
  return {
    name: 'three, slerpFlat',
    run: () => {
      for (let n = 0; n < at.length; n++) {
        const from = segments[n] * size;
        for (let i = 0; i < size; i += 4)
          Quaternion.slerpFlat(out, i, values, from + i, values, from + size + i, parts[n]);
      }
      return out[28];
    },
  };
}

/** three's usual form, as its AnimationClip is built: an interpolant a track. */
export async function threeEach({ tag, keyTimes: times, joints, at }: PoseCase): Promise<Contender> {
  const { QuaternionLinearInterpolant } = await threeCopy(`${tag}-each`);
  const interpolants = joints.map(
    (values) => new QuaternionLinearInterpolant(times, values, 4, new Float32Array(4)),
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
  { tag, keyTimes: times, joints, at }: PoseCase,
  precision: 'float64' | 'float32',
): Promise<Contender> {
  const { poseSampler } = await coreCopy(`${tag}-${precision}`);
  const tracks = joints.map((values) => rotationTrack({ times, values }));
  // Two, since V8 builds the arrays of a function that was made only once into its code.
  const [{ samplePose }] = [poseSampler(tracks, { precision }), poseSampler(tracks.slice(1), { precision })];
  const out = new Float32Array(4 * joints.length);
  return {
    name: `ours ${precision}`,
    run: () => {
      for (let n = 0; n < at.length; n++) samplePose(at[n], out);
      return out[28];
    },
  };
}
