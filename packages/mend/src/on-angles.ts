import {
  angleFloor,
  fromEuler,
  replaceTrack,
  toEuler,
  unwrapEuler,
  type RotationTrack,
} from '@slewcurve/core';
import { editResult } from './edit-result.js';
import type { Verb } from './verb.js';

/**
 * A verb that keeps keys and times, made to work on tracks of angles too: it acts on the keys' orientations, and those that it changed
 * become angles again. The angles of every other key stay to the bit, and so do the turns that they count.
 */
export function onAngles(verb: Verb): Verb {
  return Object.freeze({
    ...verb,
    apply(track, step, scene) {
      if (track.interpolation !== 'EULER') return verb.apply(track, step, scene);
      const view = orientations(track);
      const result = verb.apply(view, step, scene);
      if (result.track === view) return { ...result, track };
      const after = replaceTrack(track, { values: anglesAgain(track, view, result.track) });
      const { span: _, ...told } = result;
      return { ...told, ...editResult(track, after, { moves: result.span !== undefined }) };
    },
  } satisfies Verb);
}

/** The track as quaternions at its own keys, signs on one side, with the same noise floor. A key that can't be played is NaN. */
function orientations(track: RotationTrack): RotationTrack {
  const { times, values: angles, sequence = 'XYZ', storage } = track;
  const values = new Float64Array(4 * times.length);
  const last = [0, 0, 0, 1];
  for (let key = 0; key < times.length; key++) {
    const q = values.subarray(4 * key, 4 * key + 4);
    fromEuler(q, angles.subarray(3 * key, 3 * key + 3), sequence);
    const side = q.reduce((sum, part, i) => sum + part * last[i], 0) < 0 ? -1 : 1;
    for (let i = 0; i < 4; i++) q[i] *= side;
    if (q.every(Number.isFinite)) last.splice(0, 4, ...q);
    else q.fill(NaN);
  }
  // The floor of a step of angles is not that of a step of components; a lattice step is half its floor.
  const lattice = angleFloor(storage, 'EULER') / 2;
  return replaceTrack(track, {
    interpolation: 'LINEAR',
    values,
    storage: { component: 'float64', timeComponent: storage.timeComponent, lattice, ...timeDecimals(track) },
  });
}

function timeDecimals({ storage }: RotationTrack): { timeDecimals?: number } {
  return storage.timeDecimals === undefined ? {} : { timeDecimals: storage.timeDecimals };
}

/** Angles of every key of `after`: those of `track` where `view` was not changed. */
function anglesAgain(track: RotationTrack, view: RotationTrack, after: RotationTrack): Float64Array {
  const { sequence = 'XYZ' } = track;
  const angles = track.values.slice();
  const principal = new Float64Array(3);
  for (let key = 0; key < track.times.length; key++) {
    const q = after.values.subarray(4 * key, 4 * key + 4);
    if (q.every((part, i) => Object.is(part, view.values[4 * key + i]))) continue;
    toEuler(principal, q, sequence);
    const [before, old, next] = [key - 1, key, key + 1].map((near) => angles.slice(3 * near, 3 * near + 3));
    angles.set(nearestTriple(principal, sequence, before, old, next), 3 * key);
  }
  return angles;
}

/**
 * Of the triples that are one orientation, the one that joins its neighbours with the least change, so that angles that are played as
 * numbers don't turn needlessly.
 */
function nearestTriple(
  principal: Float64Array,
  sequence: string,
  before: Float64Array,
  old: Float64Array,
  next: Float64Array,
): Float64Array {
  const neighbours = [before, next].filter(isTriple);
  const references = [before, next, old].filter(isTriple);
  const candidates = references.map((reference) =>
    unwrapEuler(new Float64Array(6), [...reference, ...principal], sequence).slice(3),
  );
  const judges = neighbours.length > 0 ? neighbours : references;
  const cost = (triple: Float64Array): number =>
    judges.reduce(
      (sum, judge) => sum + judge.reduce((part, angle, i) => part + (angle - triple[i]) ** 2, 0),
      0,
    );
  return candidates.reduce((best, one) => (cost(one) < cost(best) ? one : best), candidates[0] ?? principal);
}

function isTriple(angles: Float64Array): boolean {
  return angles.length === 3 && angles.every(Number.isFinite);
}
