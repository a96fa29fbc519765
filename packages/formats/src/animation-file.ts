import type { Clip, RotationTrack, SceneNode } from '@slewcurve/core';
import type { PatchPlan } from './patch-plan.js';
import type { Source } from './source.js';

/** An animation file read into tracks, and the way back. */
export interface AnimationFile {
  readonly format: 'glb' | 'gltf';
  readonly nodes: readonly SceneNode[];
  readonly clips: readonly Clip[];
  /** Plan that writes the given tracks (matched by `clip` and `id`) into the file and changes nothing else. */
  plan(changed: readonly RotationTrack[]): Promise<PatchPlan>;
}

/** What opening needs beside the bytes. */
export interface OpenOptions {
  /** The file's name, for messages. */
  readonly name: string;
  /** Gives the file that stands beside this one under a relative URI. */
  readonly sibling?: (uri: string) => Promise<Source>;
}
