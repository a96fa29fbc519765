import { multiply, normalise } from '@slewcurve/core';
import { seededRandom } from './seeded-random.js';

/** A capture take made by formula: joints that sway, one of which pops for one frame. */
export interface TakePlan {
  readonly joints: number;
  readonly frames: number;
  readonly rate: number;
  /** Joint (or every one), frame and size in degrees of a key that stands off its neighbours. */
  readonly pop?: { readonly joint: number | 'every'; readonly frame: number; readonly degrees: number };
  /** All joints hang on the first one, not each on the one before. */
  readonly flat?: boolean;
  /** Standard deviation of white noise, degrees an axis, as a capture has it; none where left out. */
  readonly grain?: number;
}

/** 80 joints, 3 minutes, 120 Hz: 1,728,000 keys, 27.7 MB. */
export const THREE_MINUTES: TakePlan = { joints: 80, frames: 21_600, rate: 120 };

/** The take as a GLB: one clip, shared key times, float32, joints in a chain of skins' kind. */
export function generatedTake({ joints, frames, rate, pop, flat = false, grain = 0 }: TakePlan): Uint8Array {
  const times = Float32Array.from({ length: frames }, (_, k) => k / rate);
  const bin = new Uint8Array(times.byteLength + joints * frames * 16);
  bin.set(new Uint8Array(times.buffer));
  for (let joint = 0; joint < joints; joint++) {
    const values = new Float32Array(bin.buffer, times.byteLength + joint * frames * 16, frames * 4);
    for (let k = 0; k < frames; k++) {
      const pops = pop?.joint === 'every' || pop?.joint === joint;
      const popped = pops && pop.frame === k ? pop.degrees : 0;
      const half = ((swayAt(joint, k / rate) + popped) * Math.PI) / 360;
      values[4 * k + (joint % 3)] = Math.sin(half);
      values[4 * k + 3] = Math.cos(half);
    }
    if (grain > 0) addNoise(values, grain, joint);
  }
  return glbOf(takeJson({ joints, frames, rate, flat }, times, bin.byteLength), bin);
}

/** Turns every key of a joint, in own axes, by small normal angles (Box and Muller). */
function addNoise(values: Float32Array, grain: number, joint: number): void {
  const random = seededRandom(joint + 1);
  const half = (): number =>
    ((Math.sqrt(-2 * Math.log(1 - random())) * Math.cos(2 * Math.PI * random()) * grain) / 360) * Math.PI;
  for (let at = 0; at < values.length; at += 4) {
    const key = values.subarray(at, at + 4);
    normalise(key, multiply(key, key, [half(), half(), half(), 1]));
  }
}

/** Degrees: two slow waves, alike in no two of 80 joints, at most some 60 deg/s. */
function swayAt(number: number, t: number): number {
  const joint = number % 80;
  return (
    12 * Math.sin(2 * Math.PI * (0.3 + 0.01 * joint) * t + joint) +
    2 * Math.sin(2 * Math.PI * 1.1 * t + 2 * joint)
  );
}

function takeJson({ joints, frames, flat }: TakePlan, times: Float32Array, byteLength: number): object {
  const each = Array.from({ length: joints }, (_, joint) => joint);
  const timeBytes = times.byteLength;
  const childrenOf = (joint: number): { children?: number[] } => {
    if (flat) return joint === 0 ? { children: each.slice(1) } : {};
    return joint + 1 < joints ? { children: [joint + 1] } : {};
  };
  return {
    asset: { version: '2.0' },
    scene: 0,
    scenes: [{ nodes: [0] }],
    nodes: each.map((joint) => ({
      name: `joint-${joint}`,
      ...childrenOf(joint),
    })),
    skins: [{ joints: each }],
    buffers: [{ byteLength }],
    bufferViews: [
      { buffer: 0, byteLength: timeBytes },
      ...each.map((joint) => ({
        buffer: 0,
        byteOffset: timeBytes + joint * frames * 16,
        byteLength: frames * 16,
      })),
    ],
    accessors: [
      {
        bufferView: 0,
        componentType: 5126,
        count: frames,
        type: 'SCALAR',
        min: [0],
        max: [times[frames - 1]],
      },
      ...each.map((joint) => ({ bufferView: joint + 1, componentType: 5126, count: frames, type: 'VEC4' })),
    ],
    animations: [
      {
        name: 'Take',
        samplers: each.map((joint) => ({ input: 0, output: joint + 1 })),
        channels: each.map((joint) => ({ sampler: joint, target: { node: joint, path: 'rotation' } })),
      },
    ],
  };
}

/** GLB 2.0 container: header, JSON chunk padded with spaces, BIN chunk padded with zeros. */
function glbOf(json: object, bin: Uint8Array): Uint8Array {
  const text = new TextEncoder().encode(JSON.stringify(json));
  const jsonLength = Math.ceil(text.length / 4) * 4;
  const binLength = Math.ceil(bin.length / 4) * 4;
  const glb = new Uint8Array(28 + jsonLength + binLength);
  const view = new DataView(glb.buffer);
  [0x46546c67, 2, glb.length, jsonLength, 0x4e4f534a].forEach((word, i) => view.setUint32(4 * i, word, true));
  glb.fill(0x20, 20, 20 + jsonLength);
  glb.set(text, 20);
  view.setUint32(20 + jsonLength, binLength, true);
  view.setUint32(24 + jsonLength, 0x004e4942, true);
  glb.set(bin, 28 + jsonLength);
  return glb;
}
