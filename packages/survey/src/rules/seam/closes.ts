import { angleFloor } from '@slewcurve/core';
import type { TrackContext } from '../../rule.js';
import { seamOf } from '../jump/seam-of.js';

const DEGREES = 180 / Math.PI;

/** Whether there is a seam to look at: a declared loop of keys that something turns along. */
export function hasSeam({ loop, played, track }: TrackContext): boolean {
  return loop && track.times.length > 2 && played.some(({ holds }) => !holds);
}

/** The angle up to which a loop counts as closed: the limit, or twice the noise floor where that is more. Degrees. */
export function seamLimit({ track }: TrackContext, gap: number): number {
  return Math.max(gap, 2 * angleFloor(track.storage, track.interpolation) * DEGREES);
}

/** Whether a loop's last pose is its first. */
export function closes(context: TrackContext): boolean {
  const gap = context.limits('seam.loop-gap')?.['gap'] ?? 0;
  return seamOf(context.track) <= seamLimit(context, gap);
}
