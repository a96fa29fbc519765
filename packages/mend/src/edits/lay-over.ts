import {
  type RotationTrack,
  SlewcurveError,
  conjugate,
  expMap,
  multiply,
  replaceTrack,
} from '@slewcurve/core';
import { actedKeys, checkQuaternions, placeOf } from '../acted-keys.js';
import { sentenceOf } from '../clauses.js';
import { DEGREES, editResult } from '../edit-result.js';
import { type ParentMotion, parentMotion } from '../parent-motion.js';
import type { Step } from '../step.js';
import { isPlayable, valueAt } from '../stored-key.js';
import type { EditResult, EditScene, Verb } from '../verb.js';

/** Seconds over which the turning of a parent is read, for tangents. */
const BESIDE = 1e-4;

/**
 * Lays one turn d over keys, about the own axes (q* = q·dʷ), the parent's (dʷ·q) or the world's (p⁻¹dʷp·q, p the parent's orientation in the world as the
 * tracks above play it). `turn` is a rotation vector in degrees. The weight w is 1 on the keys of the span and falls along the minimum-jerk step to 0 over
 * the shoulders outside it. The same with the turn's signs changed takes it off again.
 *
 * Tangents of a CUBICSPLINE go along, with the turn's own change: (L·v)′ = L·v′ + L′·v.
 */
export const layOver: Verb = Object.freeze({
  name: 'lay over',
  summary: 'Turns keys about their own, their parent’s or the world’s axes; times stay.',
  alsoCalled: ['additive', 'layer', 'offset rotation', 'rotate key', 'pose key', 'local axes', 'world axes'],
  opening: 'Lay a turn over',
  reads: ['keys', 'turn', 'about'] as const,
  needsAllowing: true,
  keysApart: false,
  insertsKeys: false,
  say: (step: Step) => sentenceOf('Lay a turn over', step),
  apply(track: RotationTrack, step: Step, scene?: EditScene): EditResult {
    checkQuaternions(track);
    const { turn, about = 'own', span, shoulders = 0 } = step;
    if (!turn)
      throw new SlewcurveError(
        'step.needs-turn',
        'Say by what to turn: turn, three numbers of degrees about x, y and z.',
        placeOf(track),
      );
    const reached = span && ([span[0] - shoulders, span[1] + shoulders] as const);
    const acted = actedKeys(track, { ...step, ...(reached && { span: reached }) });
    const parent = about === 'world' ? parentMotion(track, scene) : undefined;
    const values = Float64Array.from(track.values);
    for (const key of acted) {
      if (!isPlayable(track, key)) continue;
      const weight = weightAt(track.times[key], step);
      if (weight.share > 0)
        turnKey(values, track, key, laidTurn(turn, about, weight, parent, track.times[key]));
    }
    return editResult(track, replaceTrack(track, { values }));
  },
});

interface Weight {
  readonly share: number;
  /** Per second. */
  readonly slope: number;
}

/** A turn with its change per second, multiplied from one side. */
interface LaidTurn {
  readonly side: 'own' | 'parent';
  readonly turn: Float64Array;
  readonly rate: Float64Array;
}

function weightAt(time: number, { span, shoulders = 0 }: Step): Weight {
  if (!span || (time >= span[0] && time <= span[1])) return { share: 1, slope: 0 };
  const sign = time < span[0] ? 1 : -1;
  const u = 1 - (sign === 1 ? span[0] - time : time - span[1]) / shoulders;
  if (!(u > 0)) return { share: 0, slope: 0 };
  return { share: u ** 3 * (10 - 15 * u + 6 * u * u), slope: (sign * 30 * u * u * (1 - u) ** 2) / shoulders };
}

function laidTurn(
  degrees: NonNullable<Step['turn']>,
  about: NonNullable<Step['about']>,
  { share, slope }: Weight,
  parent: ParentMotion | undefined,
  time: number,
): LaidTurn {
  const vector = degrees.map((angle) => angle / DEGREES);
  const turn = expMap(
    new Float64Array(4),
    vector.map((angle) => angle * share),
  );
  // The turn and its change have one axis, so the order is free.
  const rate = multiply(new Float64Array(4), [...vector.map((angle) => (angle * slope) / 2), 0], turn);
  if (!parent) return { side: about === 'own' ? 'own' : 'parent', turn, rate };
  const inParent = (of: Float64Array, t: number): Float64Array => {
    const p = parent.orientation(new Float64Array(4), t);
    const turned = multiply(new Float64Array(4), of, p);
    return multiply(turned, conjugate(p, p), turned);
  };
  const [early, late] = [inParent(turn, time - BESIDE), inParent(turn, time + BESIDE)];
  const moving = late.map((part, i) => (part - early[i]) / (2 * BESIDE));
  return {
    side: 'parent',
    turn: inParent(turn, time),
    rate: inParent(rate, time).map((part, i) => part + moving[i]),
  };
}

function turnKey(
  values: Float64Array,
  track: RotationTrack,
  key: number,
  { side, turn, rate }: LaidTurn,
): void {
  const laid = (by: Float64Array, at: number): Float64Array => {
    const stored = track.values.subarray(at, at + 4);
    return side === 'own'
      ? multiply(new Float64Array(4), stored, by)
      : multiply(new Float64Array(4), by, stored);
  };
  const at = valueAt(track, key);
  values.set(laid(turn, at), at);
  if (track.interpolation !== 'CUBICSPLINE') return;
  const ofTurn = laid(rate, at);
  for (const tangentAt of [at - 4, at + 4])
    values.set(
      laid(turn, tangentAt).map((part, i) => part + ofTurn[i]),
      tangentAt,
    );
}
