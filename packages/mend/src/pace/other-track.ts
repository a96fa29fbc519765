import { type RotationTrack, SlewcurveError } from '@slewcurve/core';
import { placeOf } from '../acted-keys.js';
import { matchesPattern } from '../pattern.js';
import type { Step } from '../step.js';
import type { EditScene } from '../verb.js';

/**
 * The track that a step takes something from: by name, or else the one that its patterns fit; the track itself where it names none.
 *
 * @throws SlewcurveError `step.no-other`, `step.many-others`
 */
export function otherTrack(track: RotationTrack, step: Step, scene?: EditScene): RotationTrack {
  const [clip, id] = [step.fromClip ?? track.clip, step.fromTrack ?? track.id];
  if (clip === track.clip && id === track.id) return track;
  const all = scene?.tracks ?? [];
  const same = all.filter((other) => other.clip === clip && other.id === id);
  const found =
    same.length > 0
      ? same
      : all.filter((other) => matchesPattern(clip, other.clip) && matchesPattern(id, other.id));
  const [only] = found;
  if (only && found.length === 1) return only;
  throw new SlewcurveError(
    only ? 'step.many-others' : 'step.no-other',
    only
      ? `${found.length} tracks fit ${id} in ${clip}. Name the one that is meant.`
      : `There is no track ${id} in ${clip} to take it from.`,
    placeOf(track),
  );
}
