import { type RotationTrack, SlewcurveError, VALUES_PER_KEY, replaceTrack } from '@slewcurve/core';
import { actedKeys, firstKey, placeOf } from '../acted-keys.js';
import { sentenceOf } from '../clauses.js';
import { editResult } from '../edit-result.js';
import type { Step } from '../step.js';
import type { EditResult, Verb } from '../verb.js';

/**
 * Drops keys at the start or the end of a track: a reference pose on the first frame, a doubled last key. Times and numbers of all other keys stay to the byte;
 * nothing is shifted, so that the track stays in step with the others of its clip. Before the new first key and after the new last one its pose is
 * held, as glTF 2.0 says.
 */
export const trim: Verb = Object.freeze({
  name: 'trim',
  summary: 'Drops keys at the start or the end of a track; all other keys keep their times and numbers.',
  alsoCalled: [
    'cut off',
    'crop',
    'drop keys',
    'remove first frame',
    'remove last frame',
    'in and out points',
  ],
  opening: 'Trim',
  reads: ['keys'] as const,
  needsAllowing: true,
  keysApart: true,
  insertsKeys: false,
  movesTimes: true,
  say: (step: Step) => sentenceOf('Trim', step),
  apply(track: RotationTrack, step: Step): EditResult {
    firstKey(track, step);
    const dropped = actedKeys(track, step);
    checkAtEnds(track, dropped);
    const gone = new Set(dropped);
    const oldKeys = Array.from(track.times.keys()).filter((key) => !gone.has(key));
    const [first, last] = [oldKeys[0], oldKeys[oldKeys.length - 1]];
    const size = VALUES_PER_KEY[track.interpolation];
    const after = replaceTrack(track, {
      times: track.times.slice(first, last + 1),
      values: track.values.slice(first * size, (last + 1) * size),
      breaks: track.breaks.filter((key) => key >= first && key < last).map((key) => key - first),
    });
    return editResult(track, after, { oldKeys });
  },
});

/** @throws SlewcurveError `step.not-at-end`, `step.nothing-left` */
function checkAtEnds(track: RotationTrack, dropped: readonly number[]): void {
  const gone = new Set(dropped);
  let first = 0;
  while (gone.has(first)) first++;
  let last = track.times.length - 1;
  while (gone.has(last)) last--;
  if (first > last)
    throw new SlewcurveError(
      'step.nothing-left',
      'That would drop every key. Leave one or more.',
      placeOf(track),
    );
  const inner = dropped.find((key) => key > first && key < last);
  if (inner === undefined) return;
  throw new SlewcurveError(
    'step.not-at-end',
    `Key ${inner} stands between keys that stay. Trim drops keys at an end alone; "lift out" mends a key in between.`,
    placeOf(track, inner),
  );
}
