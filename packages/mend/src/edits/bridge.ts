import { type RotationTrack, SlewcurveError } from '@slewcurve/core';
import { actedKeys, checkQuaternions, firstKey, mayChange, placeOf } from '../acted-keys.js';
import { type BridgeEnds, bridgeAcross, shelfEnds } from '../bridge-across.js';
import { sentenceOf } from '../clauses.js';
import { editResult } from '../edit-result.js';
import type { Step } from '../step.js';
import { isJoined, isPlayable, playableNeighbour } from '../stored-key.js';
import type { EditResult, Verb } from '../verb.js';

/**
 * Lays one smooth turn across keys that are lost or stand in a step.
 *
 * With `steps`: each listed key is the later one of a shelf, and the keys strictly between a = k − 1 − ⌊n/2⌋ and b = a + n are laid
 * anew, over `n` key steps; near an end, a cut, a kept key or the span's limit the window moves inwards, and shrinks if it must.
 * Without: the listed keys themselves are laid anew, each run of neighbours between the nearest playable keys that are not listed. At
 * an end of the track, with one side alone, they take that neighbour's pose.
 *
 * The turn is the cumulative Hermite curve between both ends; see `bridgeAcross` for its end rates and its peak. STEP tracks play no
 * turn: lost keys take the pose of the key before, and a shelf is refused.
 */
export const bridge: Verb = Object.freeze({
  name: 'bridge',
  summary: 'Lays one smooth turn across a step or across lost keys; the keys at both ends stay as stored.',
  alsoCalled: ['pop', 'step', 'gap', 'fill', 'fill gap', 'NaN', 'interpolate over', 'blend over', 'freeze'],
  opening: 'Bridge',
  reads: ['keys', 'steps'] as const,
  needsAllowing: false,
  keysApart: true,
  insertsKeys: false,
  say: (step: Step) => sentenceOf('Bridge', step),
  apply(track: RotationTrack, step: Step): EditResult {
    checkQuaternions(track);
    firstKey(track, step);
    const after = step.steps === undefined ? bridgeKeys(track, step) : bridgeShelves(track, step, step.steps);
    return editResult(track, after);
  },
});

function bridgeShelves(track: RotationTrack, step: Step, steps: number): RotationTrack {
  let after = track;
  for (const key of actedKeys(track, { ...step, keep: [] }))
    after = bridgeAcross(
      after,
      shelfEnds(after, key, steps, (other) => mayChange(track, step, other)),
    );
  return after;
}

function bridgeKeys(track: RotationTrack, step: Step): RotationTrack {
  const acted = actedKeys(track, step);
  const listed = new Set(acted);
  let after = track;
  for (let i = 0; i < acted.length;) {
    const run = [acted[i++]];
    while (i < acted.length && isSameRun(track, acted[i - 1], acted[i], listed)) run.push(acted[i++]);
    after = bridgeAcross(after, endsOf(track, run, listed));
  }
  return after;
}

/** Whether nothing lies between two listed keys that a bridge could stand on, nor a cut. */
function isSameRun(track: RotationTrack, a: number, b: number, listed: ReadonlySet<number>): boolean {
  for (let key = a; key < b; key++) {
    if (!isJoined(track, key)) return false;
    if (!listed.has(key) && isPlayable(track, key)) return false;
  }
  return true;
}

function endsOf(track: RotationTrack, run: readonly number[], listed: ReadonlySet<number>): BridgeEnds {
  const before = playableNeighbour(track, run[0], -1, listed);
  const beyond = playableNeighbour(track, run[run.length - 1], 1, listed);
  const from = before ?? beyond;
  if (from === undefined)
    throw new SlewcurveError(
      'step.no-neighbours',
      `No playable key lies beside key ${run[0]} to bridge from.`,
      placeOf(track, run[0]),
    );
  return { from, to: before === undefined ? from : (beyond ?? from), keys: run };
}
