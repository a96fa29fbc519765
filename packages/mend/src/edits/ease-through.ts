import { type RotationTrack, SlewcurveError, dot, replaceTrack, rotationSpline } from '@slewcurve/core';
import { checkQuaternions, placeOf } from '../acted-keys.js';
import { sentenceOf } from '../clauses.js';
import { editResult } from '../edit-result.js';
import { cubicPlaces } from '../pace/cubic-places.js';
import type { Step } from '../step.js';
import { isPlayable, storedValue, tangentFor } from '../stored-key.js';
import type { EditResult, Verb } from '../verb.js';

/** Keys put in until the stored cubic is within this many radians of the wanted curve. */
const NEAR = 0.005 * (Math.PI / 180);

/**
 * Takes the corners out of a LINEAR track: the C² rotation spline through its keys, at their times, stored as CUBICSPLINE with exact tangents. Every key
 * keeps its value and its time; keys are put in between where one cubic of four numbers is more than 0.005° off the spline. Cuts stay cuts. The
 * path between the keys changes: that is what it is for.
 */
export const easeThrough: Verb = Object.freeze({
  name: 'ease through',
  summary: 'Runs smoothly through the keys instead of turning corners at them; keys and times stay.',
  alsoCalled: ['smooth keys', 'spline', 'auto tangents', 'elbow', 'C1', 'C2', 'rotation spline'],
  opening: 'Ease through',
  reads: [] as const,
  needsAllowing: true,
  keysApart: false,
  insertsKeys: true,
  say: (step: Step) => sentenceOf('Ease through', step),
  apply(track: RotationTrack, step: Step): EditResult {
    checkQuaternions(track);
    const { times } = track;
    const faulty = times.findIndex(
      (time, key) => !isPlayable(track, key) || (key > 0 && !(time > times[key - 1])),
    );
    if (track.interpolation !== 'LINEAR' || times.length < 2 || step.span || step.keep?.length || faulty >= 0)
      throw new SlewcurveError(
        'step.one-mode',
        faulty >= 0
          ? `Key ${faulty} cannot be run through: it holds no orientation or its time is not later. Mend it first.`
          : `A LINEAR track of two keys or more is eased through as a whole, as it has one interpolation; this one is ${track.interpolation} with ${times.length} keys. Leave span and keep out.`,
        placeOf(track),
      );
    const curve = rotationSpline(track, { kind: 'c2' });
    const news: number[] = [];
    const olds = new Map<number, number>();
    for (let key = 0; key < times.length; key++) {
      olds.set(news.length, key);
      news.push(times[key]);
      if (key + 1 < times.length && !track.breaks.includes(key))
        news.push(...cubicPlaces(curve, times[key], times[key + 1], NEAR));
    }
    const values = new Float64Array(12 * news.length);
    let before: Float64Array | undefined;
    news.forEach((time, at) => {
      const old = olds.get(at);
      const value = values.subarray(12 * at + 4, 12 * at + 8);
      if (old === undefined) curve.orientation(value, time);
      else value.set(storedValue(track, old));
      if (before && dot(value, before) < 0) for (let i = 0; i < 4; i++) value[i] = -value[i];
      before = value;
      // Beside a cut both sides have rates of their own.
      const early = at === 0 ? time : time - 1e-9 * (time - news[at - 1]);
      const tangent = (t: number): Float64Array =>
        tangentFor(value, curve.rate(new Float64Array(3), t, 'own'));
      values.set(at === 0 ? [0, 0, 0, 0] : tangent(early), 12 * at);
      values.set(at === news.length - 1 ? [0, 0, 0, 0] : tangent(time), 12 * at + 8);
    });
    const broken = track.breaks.map((key) => [...olds].find(([, old]) => old === key)?.[0] ?? key);
    const after = replaceTrack(track, {
      times: Float64Array.from(news),
      values,
      interpolation: 'CUBICSPLINE',
      breaks: broken,
    });
    const inserted = news.flatMap((_, at) => (olds.has(at) ? [] : [at]));
    return editResult(track, after, { inserted });
  },
});
