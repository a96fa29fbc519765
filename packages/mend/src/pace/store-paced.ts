import {
  type Corner,
  type Curve,
  type PacedCurve,
  type RotationTrack,
  SlewcurveError,
  type Span,
  VALUES_PER_KEY,
  angleBetween,
  dot,
  playAs,
  regime,
  replaceTrack,
} from '@slewcurve/core';
import { placeOf } from '../acted-keys.js';
import { DEGREES, editResult } from '../edit-result.js';
import type { Step } from '../step.js';
import { storedBytes } from '../stored-bytes.js';
import { storedValue, tangentFor } from '../stored-key.js';
import type { EditResult, Price, TimeMap } from '../verb.js';
import { bendsOf } from './bends.js';
import { scaleTangents } from './scale-tangents.js';
import { splitCubic } from './split-cubic.js';
import { type NewKey, cubicKeys, frameKeys, movedKeys, offCorners } from './new-keys.js';

/** Share of a gap by which the side before a key is looked at. */
const BEFORE = 1e-6;

/**
 * Stores the path of a track at a new pace, as the step says, or else by `needs`: `steady` where each segment keeps one speed, so that moved keys say all;
 * `smooth` where the speed changes between keys.
 *
 * Moved keys keep their values to the bit, and each segment its path: under CUBICSPLINE its tangents are scaled by how much faster the segment runs. On
 * frames keys are read off the path, and the keys at the ends of the span, kept ones and all of a sparse track travel there unchanged. CUBICSPLINE
 * tangents are ½·q·(ω, 0) there, ω the exact rate at the new pace.
 *
 * @param corners those that the path was rounded at: keys there are read off it
 * @throws SlewcurveError `step.no-room`, `step.one-mode`, `step.kept-in-the-way`
 */
export function storePaced(
  track: RotationTrack,
  span: Span,
  paced: PacedCurve,
  step: Step,
  needs: 'steady' | 'smooth',
  corners: readonly Corner[] = [],
): EditResult {
  const isDense = regime(track) === 'dense';
  const fits = needs === 'steady' && !isDense && track.interpolation === 'LINEAR';
  const usual = track.interpolation === 'CUBICSPLINE' && !isDense ? 'cubic' : 'frames';
  const store = step.store ?? (fits || track.interpolation === 'STEP' ? 'move' : usual);
  const keys =
    store === 'move'
      ? movedKeys(track, paced)
      : store === 'cubic'
        ? cubicKeys(track, span, paced)
        : frameKeys(track, span, paced, isDense, step.keep);
  if (corners.length === 0) return storeKeys(track, span, paced, step, store, keys);
  const rounded = offCorners(
    keys,
    corners.map(({ key }) => key),
  );
  const result = storeKeys(track, span, paced, step, store, rounded);
  const off = corners.reduce((most, corner) => Math.max(most, corner.off), 0) * DEGREES;
  return result.price ? { ...result, price: { ...result.price, rounded: off } } : result;
}

/** Stores the path at a new pace by given keys, those of the old track among them unchanged. */
export function storeKeys(
  track: RotationTrack,
  span: Span,
  paced: PacedCurve,
  step: Step,
  store: NonNullable<Step['store']>,
  keys: readonly NewKey[],
): EditResult {
  if (store === 'cubic' && track.interpolation !== 'CUBICSPLINE') checkWholeTrack(track, span);
  checkRoom(track, keys);
  const after =
    store === 'cubic' || (store === 'frames' && track.interpolation === 'CUBICSPLINE')
      ? cubicTrack(track, span, paced, keys)
      : travelled(track, paced, keys);
  return pacedResult(track, after, keys, span, paced, paced.retiming, step);
}

/** Old keys that travel, and where there are more of them those that are read off the curve. */
function travelled(track: RotationTrack, paced: PacedCurve, keys: readonly NewKey[]): RotationTrack {
  const isSplit = track.interpolation === 'CUBICSPLINE' && keys.length > track.times.length;
  return isSplit ? splitCubic(track, paced, keys, breaksOf(track, keys)) : plainTrack(track, paced, keys);
}

/** The result of a pace edit, with its price and its bends. */
export function pacedResult(
  track: RotationTrack,
  after: RotationTrack,
  keys: readonly NewKey[],
  acted: Span,
  paced: Pick<Curve, 'orientation'>,
  retiming: Omit<TimeMap, 'turnsBack'> & Partial<TimeMap>,
  step: Step,
): EditResult {
  const { turnsBack = false, turnsAt } = retiming;
  const isNew = keys.length > track.times.length;
  const frames = keys.flatMap((one, key) => (one.old === undefined && one.for === undefined ? [key] : []));
  const inserted = isNew ? frames.slice(-(keys.length - track.times.length)) : [];
  return {
    ...editResult(track, after, { inserted }),
    repaced: {
      retiming: {
        oldTime: (t) => retiming.oldTime(t),
        newTime: (old) => retiming.newTime(old),
        turnsBack,
        ...(turnsAt !== undefined && { turnsAt }),
      },
      acted,
      with: step.with ?? 'node',
    },
    price: priceOf(track, after, paced),
    bends: bendsOf(after),
  };
}

/** A track with keys of one value each: old ones as they are stored, others read off the curve. */
export function plainTrack(track: RotationTrack, paced: Curve, keys: readonly NewKey[]): RotationTrack {
  const size = VALUES_PER_KEY[track.interpolation];
  const values = new Float64Array(size * keys.length);
  let before: Float64Array | undefined;
  keys.forEach(({ time, old }, key) => {
    const at = values.subarray(key * size, key * size + size);
    if (old === undefined) sampled(at, paced, time, before);
    else at.set(track.values.subarray(old * size, old * size + size));
    before = size === 4 ? at : undefined;
  });
  const times = Float64Array.from(keys, ({ time }) => time);
  if (track.interpolation === 'CUBICSPLINE') scaleTangents(values, track.times, times);
  return replaceTrack(track, { times, values, breaks: breaksOf(track, keys) });
}

/** A CUBICSPLINE track with the curve's exact tangents at every key that plays in the span. */
export function cubicTrack(
  track: RotationTrack,
  span: Span,
  paced: PacedCurve,
  keys: readonly NewKey[],
): RotationTrack {
  const values = new Float64Array(12 * keys.length);
  const isCubic = track.interpolation === 'CUBICSPLINE';
  let before: Float64Array | undefined;
  keys.forEach(({ time, old }, key) => {
    const value = values.subarray(12 * key + 4, 12 * key + 8);
    if (old === undefined) sampled(value, paced, time, before);
    else value.set(storedValue(track, old));
    if (!isCubic && before && dot(value, before) < 0) for (let i = 0; i < 4; i++) value[i] = -value[i];
    before = value;
    const kept = isCubic && old !== undefined ? old : undefined;
    const tangent = (t: number): Float64Array => tangentFor(value, paced.rate(new Float64Array(3), t, 'own'));
    if (key > 0) values.set(tangent(time - BEFORE * (time - keys[key - 1].time)), 12 * key);
    if (key < keys.length - 1) values.set(tangent(time), 12 * key + 8);
    if (kept !== undefined) keepOuterTangents(values, 12 * key, track, kept, span);
  });
  return replaceTrack(track, {
    times: Float64Array.from(keys, ({ time }) => time),
    values,
    interpolation: 'CUBICSPLINE',
    breaks: breaksOf(track, keys),
  });
}

/** Puts back the stored tangents of those sides of an old key that play outside the span. */
function keepOuterTangents(
  values: Float64Array,
  at: number,
  track: RotationTrack,
  key: number,
  [from, to]: Span,
): void {
  const time = track.times[key];
  const stored = track.values.subarray(12 * key, 12 * key + 12);
  if (time <= from || time > to) values.set(stored.subarray(0, 4), at);
  if (time < from || time >= to) values.set(stored.subarray(8), at + 8);
}

/** The pose at a new time, on the side of S³ of the key before. */
function sampled(out: Float64Array, paced: Curve, time: number, before: Float64Array | undefined): void {
  paced.orientation(out, time);
  if (before && dot(out, before) < 0) for (let i = 0; i < 4; i++) out[i] = -out[i];
}

function breaksOf(track: RotationTrack, keys: readonly NewKey[]): number[] {
  const broken = new Set(track.breaks);
  return keys.flatMap(({ old }, key) => (old !== undefined && broken.has(old) ? [key] : []));
}

/** What storing costs, against the curve that was wanted. */
export function priceOf(
  before: RotationTrack,
  after: RotationTrack,
  paced: Pick<Curve, 'orientation'>,
): Price {
  const stored = playAs(after, 'as-written');
  const { times } = after;
  const [p, q] = [new Float64Array(4), new Float64Array(4)];
  let degrees = 0;
  for (let key = 0; key + 1 < times.length; key++)
    for (let part = 0; part < 4; part++) {
      const t = times[key] + ((times[key + 1] - times[key]) * (part + 0.5)) / 4;
      degrees = Math.max(degrees, angleBetween(stored.orientation(p, t), paced.orientation(q, t)) * DEGREES);
    }
  return {
    seconds: lastOf(times) - lastOf(before.times),
    degrees,
    bytes: storedBytes(after) - storedBytes(before),
  };
}

function lastOf(times: Float64Array): number {
  return times[times.length - 1];
}

/** @throws SlewcurveError `step.no-room` where two keys would have one time */
export function checkRoom(track: RotationTrack, keys: readonly NewKey[]): void {
  for (let key = 1; key < keys.length; key++) {
    if (keys[key].time > keys[key - 1].time) continue;
    throw new SlewcurveError(
      'step.no-room',
      `Keys ${keys[key - 1].old ?? key - 1} and ${keys[key].old ?? key} would fall on one time, ${keys[key].time} s: nothing turns between them, or too little for the stored times. Store at the frames, or leave the rest out of the span.`,
      placeOf(track),
    );
  }
}

function checkWholeTrack(track: RotationTrack, [from, to]: Span): void {
  if (from === track.times[0] && to === lastOf(track.times)) return;
  throw new SlewcurveError(
    'step.one-mode',
    `A track has one interpolation, and this one is ${track.interpolation}: it becomes cubic as a whole or not at all. Leave the span out, or store at the frames.`,
    placeOf(track),
  );
}
