import {
  type Curve,
  type RotationTrack,
  SlewcurveError,
  angleBetween,
  conjugate,
  logMap,
  multiply,
  playAs,
  relative,
  replaceTrack,
  slerp,
} from '@slewcurve/core';
import { placeOf } from '../acted-keys.js';
import { anglesOf } from '../angles-in.js';
import { sentenceOf } from '../clauses.js';
import { DEGREES, editResult } from '../edit-result.js';
import { type ParentMotion, parentMotion } from '../parent-motion.js';
import { stored } from '../pace/new-keys.js';
import type { Step } from '../step.js';
import { tangentFor } from '../stored-key.js';
import type { EditResult, EditScene, Verb } from '../verb.js';
import { checkSound, refuseParts } from '../whole-track.js';

/** Degrees that the motion in the world may differ by between keys. */
const WITHIN = 0.01;
const MOST_HALVINGS = 8;

/**
 * Writes orientations in other axes, the motion in the world being the same: `parent` takes numbers that are the world's and makes them the parent's,
 * q* = P⁻¹·q, `world` the other way, q* = P·q, P the parent's orientation in the world as the tracks above play it as written, at rest where they have none.
 * Of tracks that the step names together each is taken as stored. Keys are put in where the parent turns so that neighbours alone would be more than 0.01°
 * off; with `store: "frames"` the times stay as they are.
 */
export const changeSpace: Verb = Object.freeze({
  name: 'change space',
  summary:
    "Writes orientations in the parent's axes instead of the world's, or the other way; the motion in the world stays.",
  alsoCalled: [
    'local',
    'world',
    'parent space',
    'global rotation',
    'world to local',
    'local to world',
    'unparent',
  ],
  opening: 'Change the space of',
  reads: ['space', 'store'] as const,
  needsAllowing: true,
  keysApart: false,
  insertsKeys: true,
  say: (step: Step) => sentenceOf('Change the space of', step),
  apply(track: RotationTrack, step: Step, scene?: EditScene): EditResult {
    refuseParts(track, step, ['span', 'keep']);
    const { space } = step;
    if (space === undefined)
      throw new SlewcurveError(
        'step.needs-space',
        "Say in whose axes it is to be: space, world or parent. The file's numbers are taken to be the other's now.",
        placeOf(track),
      );
    if (track.interpolation === 'STEP')
      throw new SlewcurveError(
        'step.no-convert',
        'A STEP track holds each key while its parent moves, which keys of other axes can’t say. Convert it first.',
        placeOf(track),
      );
    checkSound(track);
    const parent = parentMotion(track, scene, space === 'parent');
    if (!parent) return editResult(track, track);
    const moved = movedCurve(playAs(track, 'as-written'), parent, space);
    const oldKeys = keysOf(track, parent, moved, step.store === 'frames');
    return editResult(track, trackOf(track, moved, oldKeys), { oldKeys: oldKeys.map(({ old }) => old) });
  },
});

type Moved = Pick<Curve, 'orientation'>;

function movedCurve(own: Curve, parent: ParentMotion, space: 'world' | 'parent'): Moved {
  const p = new Float64Array(4);
  return {
    orientation(out, t) {
      parent.orientation(p, t);
      own.orientation(out, t);
      return multiply(out, space === 'world' ? p : conjugate(p, p), out);
    },
  };
}

interface Key {
  readonly time: number;
  readonly old: number;
}

/** The old keys, and more between them where a short arc would be off. */
function keysOf(track: RotationTrack, parent: ParentMotion, moved: Moved, sameTimes: boolean): Key[] {
  const keys: Key[] = [];
  for (let old = 0; old < track.times.length; old++) {
    const time = track.times[old];
    keys.push({ time, old });
    const next = track.times[old + 1];
    if (sameTimes || next === undefined || track.breaks.includes(old)) continue;
    const posts = [time, ...parent.times.filter((other) => other > time && other < next), next];
    for (let i = 0; i + 1 < posts.length; i++) {
      if (i > 0) keys.push({ time: posts[i], old: -1 });
      for (const place of between(moved, posts[i], posts[i + 1])) keys.push({ time: place, old: -1 });
    }
  }
  return keys
    .map(({ time, old }) => ({ time: stored(track, time), old }))
    .filter(
      ({ time, old }, i, all) =>
        old >= 0 ||
        (time > all[i - 1].time && time < (all.slice(i).find((key) => key.old >= 0)?.time ?? Infinity)),
    );
}

function between(moved: Moved, from: number, to: number, halvings = 0): number[] {
  const at = (t: number): Float64Array => moved.orientation(new Float64Array(4), t);
  const [a, b] = [at(from), at(to - 1e-12 * (to - from))];
  const most = Math.max(
    ...[0.25, 0.5, 0.75].map((u) =>
      angleBetween(slerp(new Float64Array(4), a, b, u), at(from + u * (to - from))),
    ),
  );
  if (most * DEGREES <= WITHIN / 2 || halvings === MOST_HALVINGS) return [];
  const middle = (from + to) / 2;
  return [...between(moved, from, middle, halvings + 1), middle, ...between(moved, middle, to, halvings + 1)];
}

function trackOf(track: RotationTrack, moved: Moved, keys: readonly Key[]): RotationTrack {
  const times = Float64Array.from(keys, ({ time }) => time);
  const values = new Float64Array(4 * keys.length);
  times.forEach((time, key) => {
    const value = values.subarray(4 * key, 4 * key + 4);
    moved.orientation(value, time);
    if (key > 0 && value.reduce((sum, part, i) => sum + part * values[4 * key - 4 + i], 0) < 0)
      value.forEach((part, i) => (value[i] = -part));
  });
  const breaks = track.breaks.map((old) => keys.findIndex((key) => key.old === old));
  const { interpolation, sequence = 'XYZ' } = track;
  if (interpolation === 'EULER')
    return replaceTrack(track, { times, breaks, values: anglesOf(values, sequence) });
  if (interpolation === 'LINEAR') return replaceTrack(track, { times, breaks, values });
  return replaceTrack(track, { times, breaks, values: withTangents(times, values, moved) });
}

/** Central differences, a thousandth of a gap to each side: the motion of the parent has no closed form here. */
function withTangents(times: Float64Array, values: Float64Array, moved: Moved): Float64Array {
  const all = new Float64Array(3 * values.length);
  const last = times.length - 1;
  times.forEach((time, key) => {
    const value = values.slice(4 * key, 4 * key + 4);
    all.set(value, 12 * key + 4);
    if (key > 0)
      all.set(tangentFor(value, sideRate(moved, time, time - 1e-4 * (time - times[key - 1]))), 12 * key);
    if (key < last)
      all.set(tangentFor(value, sideRate(moved, time, time + 1e-4 * (times[key + 1] - time))), 12 * key + 8);
  });
  return all;
}

/** Own-frame rate on one side of a time, rad/s. */
function sideRate(moved: Moved, time: number, beside: number): Float64Array {
  const turn = moved.orientation(new Float64Array(4), time);
  relative(turn, turn, moved.orientation(new Float64Array(4), beside));
  return logMap(new Float64Array(3), turn).map((part) => part / (beside - time));
}
