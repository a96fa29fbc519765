import type { Clip, ErrorPlace, RotationTrack, SceneNode } from '@slewcurve/core';
import type { TableOptions } from './delimited/table-options.js';
import type { PatchPlan } from './patch-plan.js';
import type { Source } from './source.js';

/** Something wrong in a file that did not stop the rest from being read. */
export interface FileProblem {
  /** Stable, dotted, lower-case, as `SlewcurveError.code`. */
  readonly code: string;
  readonly message: string;
  readonly place: ErrorPlace;
}

/** An animation file read into tracks, and the way back. */
export interface AnimationFile {
  readonly format: 'glb' | 'gltf' | 'bvh' | 'delimited';
  readonly nodes: readonly SceneNode[];
  readonly clips: readonly Clip[];
  /** Faults of single nodes, channels, samplers and accessors, in the file's order. A channel named here may have no track. */
  readonly problems: readonly FileProblem[];
  /**
   * Plan that writes the given tracks (matched by `clip` and `id`) into the file and changes nothing else.
   *
   * @throws SlewcurveError `plan.unknown-track`, `plan.doubled-track`, `plan.cannot-write`
   */
  plan(changed: readonly RotationTrack[]): Promise<PatchPlan>;
}

/** What opening needs beside the bytes. */
export interface OpenOptions {
  /** The file's name, for messages. */
  readonly name: string;
  /** Gives the file that stands beside this one under a relative path (percent-decoded, checked, `/`-separated). */
  readonly sibling?: (path: string) => Promise<Source>;
  /** What a table of delimited text does not say of itself. */
  readonly table?: TableOptions;
}
