import type { RotationTrack } from './rotation-track.js';

/** A node of the file's tree, at rest. Orientations are `[x, y, z, w]`, own to parent. */
export interface SceneNode {
  /** Path by name from the root, `/`-separated; `~1` and `~0` escape `/` and `~`; `[n]` among equal siblings, `#7` where nameless. */
  readonly path: string;
  readonly name?: string;
  /** Index of the parent, -1 at a root. */
  readonly parent: number;
  readonly rotation: readonly number[];
  readonly translation: readonly number[];
  readonly scale: readonly number[];
  /** Joint of a skin. */
  readonly joint: boolean;
  /** What keeps the matrix, where the file gives the node by one, from being a turn and a scale. */
  readonly matrix?: { readonly reflected: boolean; readonly shear: number };
  /** Horizontal and vertical view angle, radians, where the node carries a perspective camera that tells. */
  readonly camera?: { readonly verticalView: number; readonly aspect?: number };
}

/** A named moment of a clip. */
export interface Mark {
  readonly time: number;
  readonly name: string;
}

/** One animation: tracks over one clock, in seconds of the file's own time. */
export interface Clip {
  readonly name: string;
  readonly index: number;
  readonly tracks: readonly RotationTrack[];
  /** First and last key time over every rotation track, seconds; 0 and 0 without keys. */
  readonly start: number;
  readonly end: number;
  /** Frames per second of the grid that the keys lie on, where they lie on one. */
  readonly frameRate?: number;
  /** Whether the clip is declared to repeat. */
  readonly loop: boolean;
  readonly marks: readonly Mark[];
}
