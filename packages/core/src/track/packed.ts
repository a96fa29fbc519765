import type { NumberStore } from '../number-store.js';
import { normalise } from '../quaternion/normalise.js';
import { keyOrientation, valueOffset } from './key-orientation.js';
import { replaceTrack } from './replace-track.js';
import { VALUES_PER_KEY, type RotationTrack } from './rotation-track.js';
import type { Storage } from './storage.js';

/** How a program that packs files again stores an orientation; the digits are bits of each of the three components kept. */
export type StorageModel =
  | 'float32'
  | 'int16'
  | 'int8'
  | 'smallest-three-8'
  | 'smallest-three-9'
  | 'smallest-three-10'
  | 'smallest-three-11'
  | 'smallest-three-12'
  | 'smallest-three-13'
  | 'smallest-three-14'
  | 'smallest-three-15'
  | 'smallest-three-16';

/** Every storage model, the finest of each kind first. */
export const STORAGE_MODELS: readonly StorageModel[] = Object.freeze([
  'float32',
  'int16',
  'int8',
  'smallest-three-16',
  'smallest-three-15',
  'smallest-three-14',
  'smallest-three-13',
  'smallest-three-12',
  'smallest-three-11',
  'smallest-three-10',
  'smallest-three-9',
  'smallest-three-8',
]);

/**
 * The track as a program shows it that stores it again by `model`, its storage, and so its noise floor, with it. float32, and normalised integers as
 * glTF 2.0 ("Animations") rounds them: c = round(f·32767), f = max(c/32767, −1); `smallest-three-b` leaves the largest component out and stores the others
 * in b bits over ±1/√2, the largest rebuilt from unit length (common practice, no source), which gives q or −q as it comes. Times stay. Tangents, which none
 * of these holds, are rounded to float32 and go to the side of their value. Angles become LINEAR orientations of their keys.
 */
export function packed(track: RotationTrack, model: StorageModel): RotationTrack {
  const view = track.interpolation === 'EULER' ? orientationsOf(track) : track;
  const values = Float64Array.from(view.values, Math.fround);
  const size = VALUES_PER_KEY[view.interpolation];
  const q = new Float64Array(4);
  for (let key = 0; key < view.times.length; key++) {
    const at = valueOffset(view, key);
    q.set(view.values.subarray(at, at + 4));
    const side = round(q, model);
    if (side < 0 && size === 12) for (let i = key * size; i < (key + 1) * size; i++) values[i] = -values[i];
    values.set(q, at);
  }
  return replaceTrack(view, { values, storage: storageOf(model, track.storage) });
}

function orientationsOf(track: RotationTrack): RotationTrack {
  const values = new Float64Array(4 * track.times.length);
  for (let key = 0; key < track.times.length; key++)
    keyOrientation(values.subarray(4 * key, 4 * key + 4), track, key);
  return replaceTrack(track, { interpolation: 'LINEAR', values });
}

/** Rounds in place. Says on which side of the old quaternion the new one lies. */
function round(q: NumberStore, model: StorageModel): 1 | -1 {
  if (model === 'float32') {
    for (let i = 0; i < 4; i++) q[i] = Math.fround(q[i]);
    return 1;
  }
  if (model === 'int16' || model === 'int8') {
    const most = model === 'int16' ? 32767 : 127;
    for (let i = 0; i < 4; i++) q[i] = Math.max(-1, Math.min(1, Math.round(q[i] * most) / most));
    return 1;
  }
  return roundThree(q, bitsOf(model));
}

function roundThree(q: NumberStore, bits: number): 1 | -1 {
  normalise(q, q);
  let largest = 0;
  for (let i = 1; i < 4; i++) if (Math.abs(q[i]) > Math.abs(q[largest])) largest = i;
  const side = q[largest] < 0 ? -1 : 1;
  const steps = 2 ** bits - 1;
  let rest = 1;
  for (let i = 0; i < 4; i++) {
    if (i === largest) continue;
    const level = Math.round(((side * q[i] * Math.SQRT2 + 1) / 2) * steps);
    q[i] = (2 * (level / steps) - 1) * Math.SQRT1_2;
    rest -= q[i] * q[i];
  }
  q[largest] = Math.sqrt(Math.max(0, rest));
  return side;
}

function bitsOf(model: StorageModel): number {
  return Number(/\d+$/.exec(model)?.[0]);
}

/** The floor of smallest three is 2√6/(2^b − 1) rad; twice a lattice step is its floor. */
function storageOf(model: StorageModel, { timeComponent, timeDecimals }: Storage): Storage {
  const times = { timeComponent, ...(timeDecimals !== undefined && { timeDecimals }) };
  if (model === 'float32' || model === 'int16' || model === 'int8') return { component: model, ...times };
  return { component: 'float64', ...times, lattice: Math.sqrt(6) / (2 ** bitsOf(model) - 1) };
}
