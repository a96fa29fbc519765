import type { Clip, ErrorPlace, RotationTrack, SceneNode } from '@slewcurve/core';
import type { TableOptions } from './delimited/table-options.js';
import type { PatchPlan } from './patch-plan.js';
import type { Source } from './source.js';

/** Something wrong in a file that did not stop the rest from being read. */
export interface FileProblem {
  /** Stable, dotted, lower-case, as `SlewcurveError.code`. */
  readonly code: string;
  /** `error`: something has no track for it; `warning`: the format forbids it, and all is read; `note`: worth knowing. */
  readonly level: 'error' | 'warning' | 'note';
  readonly message: string;
  readonly place: ErrorPlace;
}

/** An animation file read into tracks, and the way back. */
export interface AnimationFile {
  readonly format: 'glb' | 'gltf' | 'bvh' | 'delimited';
  readonly nodes: readonly SceneNode[];
  readonly clips: readonly Clip[];
  /** Whether keys can only stand at the times that the file has: its tracks share rows. */
  readonly fixedTimes: boolean;
  /** Faults of single nodes, channels, samplers and accessors, in the file's order. A channel named here may have no track. */
  readonly problems: readonly FileProblem[];
  /**
   * Plan that writes the given tracks (matched by `clip` and `id`) into the file, lets what follows them travel, and changes nothing
   * else.
   *
   * @param axes changes of axes that all its rotations went through, as `axisChange` reads them, in order: what else has axes goes along
   * @throws SlewcurveError `plan.unknown-track`, `plan.doubled-track`, `plan.cannot-write`
   */
  plan(
    changed: readonly RotationTrack[],
    followers?: readonly Follower[],
    axes?: readonly string[],
  ): Promise<PatchPlan>;
}

/**
 * Whatever is no rotation and goes by the clock of one that was re-timed: positions, scales, weights. Its keys travel and its values stay, so that a
 * camera's place goes with its aim. Several are followed one after the other. A format that holds nothing but rotations has nobody to follow.
 */
export interface Follower {
  readonly clip: string;
  /** Id of a rotation track: what else moves its node. Left out: all that the clip moves. */
  readonly track?: string;
  /** True where later keys come earlier. */
  readonly turnsBack: boolean;
  /** Where everything plays backwards again, seconds; `newTime` gives the way there. */
  readonly turnsAt?: number;
  /** When what stood at an old time stands now, seconds. */
  newTime(old: number): number;
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
