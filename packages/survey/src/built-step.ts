import { VERBS } from '@slewcurve/mend';
import type { Remedy, TrackContext } from './rule.js';

/** An edit of a whole track as a remedy; undefined where that verb is not built, or where the track stores angles. */
export function builtStep({ track }: TrackContext, verb: string): Remedy | undefined {
  if (track.interpolation === 'EULER' || VERBS.every(({ name }) => name !== verb)) return undefined;
  return { step: { verb, clip: track.clip, track: track.id } };
}
