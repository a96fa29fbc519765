import type { RotationTrack } from '@slewcurve/core';
import { VERBS, type Step } from '@slewcurve/mend';
import type { Remedy, TrackContext } from '../../rule.js';

/** Whether this is the track that a clip's own findings are told on: its first. What is wrong with a whole file is told once a clip. */
export function isFirstOfClip({ clip, stored }: TrackContext): boolean {
  return clip.tracks[0]?.id === stored.id;
}

/** Keys of a track that are looked at for what a whole file is read by: enough, and the same few of a long take. */
const LOOKS = 16;

/** Numbers of some keys of a track, spread over it. */
export function someKeys({ times }: RotationTrack): number[] {
  const count = Math.min(LOOKS, times.length);
  return Array.from({ length: count }, (_, i) => Math.floor((i * times.length) / count));
}

/** Reading the whole file by another convention; undefined where `restate` is not built. */
export function restated(by: Pick<Step, 'components' | 'angles' | 'axes'>): Remedy | undefined {
  if (VERBS.every(({ name }) => name !== 'restate')) return undefined;
  return { step: { verb: 'restate', clip: '*', track: '*', ...by } };
}
