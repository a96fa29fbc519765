import { type RotationTrack, SlewcurveError, replaceTrack } from '@slewcurve/core';
import { actedKeys, placeOf } from '../acted-keys.js';
import { sentenceOf } from '../clauses.js';
import { editResult } from '../edit-result.js';
import type { Step } from '../step.js';
import type { EditResult, Verb } from '../verb.js';

const TURN = 2 * Math.PI;

/**
 * Lets angle channels go on where they jump: at each listed key (left out: all) whole turns are added, and the other triple of the same orientation,
 * (a + 180°, 180° − b, c + 180°), is taken where it lies nearer to the key before. Keys in between go along unchanged in their steps, so that turns that are
 * meant stay. No orientation changes but by rounding (1e-13°). `keep`: keys that must not be touched end what goes along.
 */
export const unwrap: Verb = Object.freeze({
  name: 'unwrap',
  summary:
    'Adds whole turns to angle channels that jump, so that they go on where they were; no orientation changes.',
  alsoCalled: [
    '360',
    'angle wrap',
    'Euler filter',
    'continuous angles',
    'Euler flip',
    'modulo 360',
    'remove jumps',
  ],
  opening: 'Unwrap',
  reads: ['keys'] as const,
  needsAllowing: false,
  keysApart: true,
  insertsKeys: false,
  say: (step: Step) => sentenceOf('Unwrap', step),
  apply(track: RotationTrack, step: Step): EditResult {
    if (track.interpolation !== 'EULER')
      throw new SlewcurveError(
        'step.needs-angles',
        `Only tracks of angles wrap; this one is ${track.interpolation} and stores quaternions. Bring it to one side instead.`,
        placeOf(track),
      );
    const acted = new Set(actedKeys(track, step));
    const values = track.values.slice();
    const other = otherTriple(track.sequence ?? 'XYZ');
    let shift: Shift = NO_SHIFT;
    let before: Float64Array | undefined;
    for (let key = 0; key < track.times.length; key++) {
      const stored = track.values.subarray(3 * key, 3 * key + 3);
      if (!stored.every(Number.isFinite)) continue;
      if (step.keep?.includes(key) === true) shift = NO_SHIFT;
      else if (before && acted.has(key)) shift = nearestShift(stored, before, other, shift);
      before = shifted(stored, shift, other);
      if (shift !== NO_SHIFT) values.set(before, 3 * key);
    }
    return editResult(track, replaceTrack(track, { values }));
  },
});

/** What is done to a key: whole turns on each channel, before that the other triple or not. */
interface Shift {
  readonly isOther: boolean;
  readonly turns: readonly [number, number, number];
}

const NO_SHIFT: Shift = { isOther: false, turns: [0, 0, 0] };

type Triple = (angles: Float64Array) => Float64Array;

/** The other triple of one orientation: of three axes (a + π, π − b, c + π), of two (a + π, −b, c + π) (MATHS 1, from memory, checked by its test). */
function otherTriple(sequence: string): Triple {
  const small = sequence.toLowerCase();
  const mirrored = small.startsWith(small.slice(2)) ? 0 : Math.PI;
  return ([a, b, c]) => Float64Array.of(a + Math.PI, mirrored - b, c + Math.PI);
}

function nearestShift(stored: Float64Array, before: Float64Array, other: Triple, now: Shift): Shift {
  const candidates = [false, true].map((isOther) => {
    const angles = isOther ? other(stored) : stored;
    const turns = Array.from(angles, (angle, i) => Math.round((before[i] - angle) / TURN));
    const gap = Math.hypot(...angles.map((angle, i) => angle + turns[i] * TURN - before[i]));
    return { shift: { isOther, turns: [turns[0], turns[1], turns[2]] } as const, gap };
  });
  const [same, flipped] = candidates;
  const { shift } = flipped.gap < same.gap - 1e-9 ? flipped : same;
  if (shift.isOther === now.isOther && shift.turns.every((turn, i) => turn === now.turns[i])) return now;
  return !shift.isOther && shift.turns.every((turn) => turn === 0) ? NO_SHIFT : shift;
}

function shifted(stored: Float64Array, shift: Shift, other: Triple): Float64Array {
  if (shift === NO_SHIFT) return stored;
  const angles = shift.isOther ? other(stored) : stored;
  return angles.map((angle, i) => angle + TURN * shift.turns[i]);
}
