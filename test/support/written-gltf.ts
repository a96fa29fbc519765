import { validateBytes } from 'gltf-validator';
import { expect } from 'vitest';
import { replaceTrack, type RotationTrack } from '@slewcurve/core';
import {
  bufferSource,
  invertPatchPlan,
  openAnimation,
  patchedBytes,
  type AnimationFile,
  type PatchPlan,
} from '@slewcurve/formats';
import type { GltfJson, Packer } from './gltf-bytes.js';

export const NAME = 'mast.glb';
export const open = async (bytes: Uint8Array): Promise<AnimationFile> =>
  openAnimation(bufferSource(bytes), { name: NAME });
export const tracksOf = (file: AnimationFile): RotationTrack[] => file.clips.flatMap(({ tracks }) => tracks);

async function issuesOf(bytes: Uint8Array): Promise<string[]> {
  const { issues } = await validateBytes(bytes, { maxIssues: 0 });
  return issues.messages.map(({ code, pointer, offset }) => `${code} ${pointer ?? offset}`);
}

export interface Written {
  readonly plan: PatchPlan;
  readonly made: Uint8Array;
  readonly file: AnimationFile;
}

/**
 * Writes changed tracks and checks what every write must hold: what was not named by the plan is equal, the plan turned
 * round restores the file, the validator finds nothing new, the changed tracks read back as given (to `within`), every
 * other track as before.
 */
export async function write(
  bytes: Uint8Array,
  change: (tracks: RotationTrack[]) => RotationTrack[],
  within = 0,
): Promise<Written> {
  const before = await open(bytes);
  const old = tracksOf(before);
  const changed = change(old);
  const plan = await before.plan(changed);
  const made = patchedBytes(bytes, plan);
  const back = await invertPatchPlan(bufferSource(bytes), plan);
  expect(Buffer.compare(patchedBytes(made, back), bytes)).toBe(0);
  const known = new Set(await issuesOf(bytes));
  expect((await issuesOf(made)).filter((issue) => !known.has(issue))).toEqual([]);
  const file = await open(made);
  const now = tracksOf(file);
  expect(now.map(({ clip, id }) => [clip, id])).toEqual(old.map(({ clip, id }) => [clip, id]));
  now.forEach((track, i) => {
    const wanted = changed.find(({ clip, id }) => clip === track.clip && id === track.id) ?? old[i];
    const tolerance = changed.includes(wanted) ? within : 0;
    expect(track.interpolation).toBe(wanted.interpolation);
    expectNumbers(track.times, wanted.times, tolerance);
    expectNumbers(track.values, wanted.values, tolerance);
  });
  return { plan, made, file };
}

function expectNumbers(actual: Float64Array, wanted: Float64Array, within: number): void {
  expect(actual).toHaveLength(wanted.length);
  const worst = actual.reduce(
    (most, x, i) => Math.max(most, Object.is(x, wanted[i]) ? 0 : Math.abs(x - wanted[i])),
    0,
  );
  expect(worst).toBeLessThanOrEqual(within);
}

/** The track with the values of some keys negated: the same orientations, other numbers. */
export function negated(track: RotationTrack, ...keys: number[]): RotationTrack {
  const size = track.values.length / track.times.length;
  return replaceTrack(track, {
    values: track.values.map((x, i) => (keys.includes(Math.floor(i / size)) ? -x : x)),
  });
}

export function withoutLast(track: RotationTrack): RotationTrack {
  const size = track.values.length / track.times.length;
  return replaceTrack(track, { times: track.times.slice(0, -1), values: track.values.slice(0, -size) });
}

/** A clip for each sampler, each turning node 0. */
export function turned(packer: Packer, samplers: readonly GltfJson[], more: GltfJson = {}): GltfJson {
  return {
    ...packer.json,
    nodes: [{ name: 'Mast' }, { name: 'Arm' }],
    animations: samplers.map((sampler, i) => ({
      name: `Clip ${i}`,
      channels: [{ sampler: 0, target: { node: 0, path: 'rotation' } }],
      samplers: [sampler],
    })),
    ...more,
  };
}
