import {
  type Curve,
  type RotationTrack,
  SlewcurveError,
  angleFloor,
  dot,
  keyOrientation,
  playAs,
  replaceTrack,
} from '@slewcurve/core';
import { placeOf } from '../acted-keys.js';
import { sentenceOf } from '../clauses.js';
import { DEGREES, editResult } from '../edit-result.js';
import { cubicPlaces } from '../pace/cubic-places.js';
import { departure } from '../pace/departure.js';
import { linearPlaces } from '../pace/linear-places.js';
import { stored } from '../pace/new-keys.js';
import type { Step } from '../step.js';
import { storedValue, tangentFor } from '../stored-key.js';
import type { EditResult, Verb } from '../verb.js';
import { checkSound, refuseParts } from '../whole-track.js';

/** Degrees that the motion may differ by where the step says nothing. */
const WITHIN = 0.01;

/** Share of a gap by which the side before a key is looked at. */
const BEFORE = 1e-9;

/**
 * Writes the same motion by another interpolation: LINEAR, CUBICSPLINE or angles in, LINEAR or CUBICSPLINE out. Keys stay at their times with their values
 * (up to the sign, which the standard's cubic needs on one side); as many are put in between as it takes to stay within `within` degrees (default 0.01) of
 * what was played. Tangents are ½·q·(ω, 0), ω the played rate on that side of the key, so corners stay corners.
 */
export const convert: Verb = Object.freeze({
  name: 'convert',
  summary: 'Writes the same motion as LINEAR or CUBICSPLINE keys, within a stated angle.',
  alsoCalled: [
    'bake',
    'change interpolation',
    'linear to cubic',
    'cubic to linear',
    'to quaternions',
    'Euler to quaternion',
  ],
  opening: 'Convert',
  reads: ['interpolation', 'within'] as const,
  needsAllowing: true,
  keysApart: false,
  insertsKeys: true,
  say: (step: Step) => sentenceOf('Convert', step),
  apply(track: RotationTrack, step: Step): EditResult {
    refuseParts(track, step, ['span', 'keep']);
    const { interpolation } = step;
    if (interpolation === undefined || track.interpolation === 'STEP')
      throw new SlewcurveError(
        'step.needs-interpolation',
        interpolation === undefined
          ? 'Say what it is to become: interpolation, LINEAR or CUBICSPLINE.'
          : 'A STEP track jumps from key to key, and joined keys would turn there. Give it keys that move first.',
        placeOf(track),
      );
    if (interpolation === track.interpolation) return editResult(track, track);
    checkSound(track);
    const within = step.within ?? WITHIN;
    const curve = playAs(track, 'as-written');
    const { times, oldKeys } = placesOf(track, curve, interpolation, within / DEGREES);
    const after = replaceTrack(track, {
      interpolation,
      times,
      values:
        interpolation === 'LINEAR'
          ? linearValues(track, curve, times, oldKeys)
          : cubicValues(track, curve, times, oldKeys),
      breaks: track.breaks.map((key) => oldKeys.indexOf(key)),
      ...(track.interpolation === 'EULER' && { storage: turnStorage(track) }),
    });
    const apart = departure(curve, playAs(after, 'as-written'));
    if (apart > within)
      throw new SlewcurveError(
        'step.beyond-tolerance',
        `As ${interpolation} it would play up to ${apart.toPrecision(3)}° off (limit ${within}°): it turns too sharply for as many keys as were tried. Allow more degrees.`,
        placeOf(track),
      );
    return editResult(track, after, { oldKeys });
  },
});

interface Places {
  readonly times: Float64Array;
  readonly oldKeys: readonly number[];
}

function placesOf(
  track: RotationTrack,
  curve: Curve,
  interpolation: 'LINEAR' | 'CUBICSPLINE',
  near: number,
): Places {
  const times: number[] = [];
  const oldKeys: number[] = [];
  // Half of what is allowed is left for what lies between the places that are looked at.
  const places = interpolation === 'LINEAR' ? linearPlaces : cubicPlaces;
  for (let key = 0; key < track.times.length; key++) {
    times.push(track.times[key]);
    oldKeys.push(key);
    if (key + 1 === track.times.length || track.breaks.includes(key)) continue;
    for (const place of places(curve, track.times[key], track.times[key + 1], near / 2)) {
      const time = stored(track, place);
      if (!(time > times[times.length - 1]) || !(time < track.times[key + 1])) continue;
      times.push(time);
      oldKeys.push(-1);
    }
  }
  return { times: Float64Array.from(times), oldKeys };
}

function valueOf(track: RotationTrack, curve: Curve, time: number, old: number): Float64Array {
  if (old < 0) return curve.orientation(new Float64Array(4), time);
  return track.interpolation === 'EULER'
    ? keyOrientation(new Float64Array(4), track, old)
    : Float64Array.from(storedValue(track, old));
}

function linearValues(
  track: RotationTrack,
  curve: Curve,
  times: Float64Array,
  oldKeys: readonly number[],
): Float64Array {
  const values = new Float64Array(4 * times.length);
  times.forEach((time, key) => values.set(valueOf(track, curve, time, oldKeys[key]), 4 * key));
  return values;
}

function cubicValues(
  track: RotationTrack,
  curve: Curve,
  times: Float64Array,
  oldKeys: readonly number[],
): Float64Array {
  const values = new Float64Array(12 * times.length);
  const last = times.length - 1;
  let before: Float64Array | undefined;
  times.forEach((time, key) => {
    const value = valueOf(track, curve, time, oldKeys[key]);
    if (before && dot(value, before) < 0) value.forEach((part, i) => (value[i] = -part));
    before = value;
    const tangent = (t: number): Float64Array => tangentFor(value, curve.rate(new Float64Array(3), t, 'own'));
    if (key > 0) values.set(tangent(time - BEFORE * (time - times[key - 1])), 12 * key);
    values.set(value, 12 * key + 4);
    if (key < last) values.set(tangent(time), 12 * key + 8);
  });
  return values;
}

/** What angles were stored to, said of orientations: a lattice step is half its floor. */
function turnStorage({ storage }: RotationTrack): RotationTrack['storage'] {
  const { timeComponent, timeDecimals } = storage;
  return {
    component: 'float64',
    timeComponent,
    ...(timeDecimals !== undefined && { timeDecimals }),
    lattice: angleFloor(storage, 'EULER') / 2,
  };
}
