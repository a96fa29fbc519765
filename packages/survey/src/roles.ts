import type { RotationTrack, SceneNode } from '@slewcurve/core';

/** What a turning thing is, which says how closely people look at it. */
export type Role = 'joint' | 'prop' | 'camera-screen' | 'camera-headset' | 'eye' | 'machine';

/** Every role. */
export const ROLES: readonly Role[] = Object.freeze([
  'joint',
  'prop',
  'camera-screen',
  'camera-headset',
  'eye',
  'machine',
]);

/**
 * The role of a track's node where no house rule names one: a node with a camera is a camera on a screen, a joint of a skin a joint,
 * anything else a prop. Names never decide.
 */
export function roleOf(track: RotationTrack, nodes: readonly SceneNode[]): Role {
  const node = nodes[track.source.node];
  if (node?.camera !== undefined) return 'camera-screen';
  return node?.joint === true ? 'joint' : 'prop';
}
