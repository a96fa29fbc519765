import {
  type NumberStore,
  type RotationTrack,
  SlewcurveError,
  multiply,
  nodeChain,
  playAs,
} from '@slewcurve/core';
import { placeOf } from './acted-keys.js';
import type { EditScene } from './verb.js';

/** How a track's parent stands in the world. */
export interface ParentMotion {
  /** Unit quaternion, parent to world, at `t` seconds. */
  orientation<T extends NumberStore>(out: T, t: number): T;
  /** Times of the keys that move it, ascending, each once. */
  readonly times: readonly number[];
}

/**
 * The orientation in the world of the parent of a track's node: the tracks above, in the same clip, as written; nodes without one at rest. Undefined where
 * the node has no parent: its parent's axes are the world's.
 *
 * @param namedAreWorlds true where tracks that the step names hold orientations in the world, so that nothing above them counts
 * @throws SlewcurveError `step.needs-parents` where nothing is known of the node
 */
export function parentMotion(
  track: RotationTrack,
  scene: EditScene | undefined,
  namedAreWorlds = false,
): ParentMotion | undefined {
  const node = scene?.nodes.find(({ path }) => path === track.id);
  if (!scene || !node)
    throw new SlewcurveError(
      'step.needs-parents',
      'Nothing is known of what stands above this track, so the axes of its parent are not known. Open it with its file.',
      placeOf(track),
    );
  const links: Link[] = [];
  for (const at of nodeChain(scene.nodes, node.parent)) {
    const above = scene.nodes[at];
    const moving = scene.tracks.find(({ id, clip }) => id === above.path && clip === track.clip);
    links.push(moving && moving.times.length > 0 ? linkOf(moving) : resting(above.rotation));
    if (namedAreWorlds && moving && scene.named.includes(moving)) break;
  }
  if (links.length === 0) return undefined;
  const one = new Float64Array(4);
  const whole = new Float64Array(4);
  const times = [...new Set(links.flatMap((link) => link.times))];
  // oxlint-disable-next-line unicorn/no-array-sort -- our own list: sorted where it is, no copy
  times.sort((a, b) => a - b);
  return {
    times,
    orientation(out, t) {
      whole.set([0, 0, 0, 1]);
      for (const link of links) multiply(whole, link.orientation(one, t), whole);
      for (let i = 0; i < 4; i++) out[i] = whole[i];
      return out;
    },
  };
}

interface Link {
  orientation(out: Float64Array, t: number): Float64Array;
  readonly times: readonly number[];
}

function linkOf(track: RotationTrack): Link {
  const curve = playAs(track, 'as-written');
  return { orientation: (out, t) => curve.orientation(out, t), times: Array.from(curve.knots) };
}

function resting(rotation: readonly number[]): Link {
  return {
    orientation(out) {
      out.set(rotation);
      return out;
    },
    times: [],
  };
}
