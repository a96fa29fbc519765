import type { RotationTrack, SceneNode } from '@slewcurve/core';
import { limitsAt, roleIn, type HouseRules } from './house-rules.js';
import { speedLimit } from './rules/limit/speed.js';

/** The speed that the house rules allow a track of a file, deg/s; undefined where they set none: there is no default. */
export function allowedSpeed(
  house: HouseRules,
  track: RotationTrack,
  { name, nodes }: { readonly name: string; readonly nodes: readonly SceneNode[] },
): number | undefined {
  const address = { file: name, clip: track.clip, track: track.id };
  const rate = limitsAt(house, speedLimit, roleIn(house, track, nodes), address)?.['rate'];
  return rate !== undefined && Number.isFinite(rate) ? rate : undefined;
}
