import {
  type FreedCurve,
  type PacedCurve,
  type RotationTrack,
  SlewcurveError,
  type Span,
  VALUES_PER_KEY,
  multiply,
  regime,
  replaceTrack,
} from '@slewcurve/core';
import { placeOf } from '../acted-keys.js';
import { editResult } from '../edit-result.js';
import type { Step } from '../step.js';
import { storedValue, tangentFor } from '../stored-key.js';
import type { EditResult } from '../verb.js';
import { bendsOf } from './bends.js';
import { cubicKeys, frameKeys, movedKeys } from './new-keys.js';
import { keysAround } from './pace-span.js';
import { cubicTrack, plainTrack, priceOf } from './store-paced.js';

/** Share of a curve's time by which the side before a key is looked at. */
const BEFORE = 1e-9;

/**
 * Stores a track whose angle was let go. Every old key keeps its time; those in the press lie on the pressed motion, and all later ones are turned by the
 * one turn that is left, tangents with them. Where keys are sparse, the press itself needs more of them: on the frames, or as many as cubics need.
 *
 * @throws SlewcurveError `step.kept-in-the-way` where a kept key would turn
 */
export function storeFreed(track: RotationTrack, freed: FreedCurve, step: Step): EditResult {
  checkKept(track, freed, step);
  const isDense = regime(track) === 'dense';
  const usual = track.interpolation === 'CUBICSPLINE' ? 'cubic' : 'frames';
  const store = step.store ?? (isDense ? 'move' : usual);
  const seated = seatedTrack(track, freed);
  const paced: PacedCurve = { ...freed, retiming: oldClock(freed) };
  const around = keysAround(track, freed.pressed);
  const isWhole = store === 'cubic' && track.interpolation !== 'CUBICSPLINE';
  const played: Span = isWhole ? [freed.start, freed.end] : around;
  const keys =
    store === 'move'
      ? movedKeys(track, paced)
      : store === 'cubic'
        ? cubicKeys(track, played, paced)
        : frameKeys(track, played, paced, isDense, step.keep);
  const after =
    store !== 'move' && (store === 'cubic' || track.interpolation === 'CUBICSPLINE')
      ? cubicTrack(seated, played, paced, keys)
      : plainTrack(seated, paced, keys);
  const inserted = keys.flatMap(({ old }, key) => (old === undefined ? [key] : []));
  const isNew = keys.length > track.times.length;
  return {
    ...editResult(track, after, { inserted: isNew ? inserted : [] }),
    price: priceOf(track, after, freed),
    bends: bendsOf(after),
  };
}

function checkKept(track: RotationTrack, { pressed }: FreedCurve, { keep = [] }: Step): void {
  const kept = keep.find((key) => track.times[key] > pressed[0]);
  if (kept === undefined) return;
  throw new SlewcurveError(
    'step.kept-in-the-way',
    `Key ${kept} is kept, and with the angle let go every key after ${pressed[0]} s turns. Take it out of keep, or keep the same ends.`,
    placeOf(track, kept),
  );
}

/** The old keys at their times, turned; no key is put in. */
function seatedTrack(track: RotationTrack, freed: FreedCurve): RotationTrack {
  const [from, to] = freed.pressed;
  const values = track.values.slice();
  const size = VALUES_PER_KEY[track.interpolation];
  const turn = new Float64Array(4);
  track.times.forEach((time, key) => {
    if (time < from) return;
    freed.turnAt(turn, time);
    if (time > from)
      for (let at = key * size; at < (key + 1) * size; at += 4)
        values.set(multiply(new Float64Array(4), turn, track.values.subarray(at, at + 4)), at);
    if (size !== 12) return;
    const value = storedValue(track, key, values);
    const tangent = (t: number): Float64Array => tangentFor(value, freed.rate(new Float64Array(3), t, 'own'));
    // What plays inside the press has its rates; what plays after it is turned along.
    if (time > from && time <= to) values.set(tangent(time - BEFORE * (freed.end - freed.start)), key * 12);
    if (time < to) values.set(tangent(time), key * 12 + 8);
  });
  return replaceTrack(track, { values });
}

/** The clock on which nothing is moved. */
function oldClock({ start, end, knots }: FreedCurve): PacedCurve['retiming'] {
  return {
    start,
    end,
    knots,
    continuity: 2,
    oldTime: (t) => t,
    newTime: (old) => old,
    paceAt: () => ({ by: 'time', speed: 1, acceleration: 0 }),
  };
}
