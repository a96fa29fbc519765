import type { ReadonlyNumberStore } from '../number-store.js';
import { fromEuler } from '../quaternion/euler/from-euler.js';
import { rotationTrack, type RotationTrack } from './rotation-track.js';

/** A third of a turn: the largest step between two keys that stays well clear of half a turn, where the way is lost. */
export const LARGEST_STEP: number = (2 * Math.PI) / 3;

/** Times and angles, three a key, in the units that went in. */
export interface SubdividedAngles {
  readonly times: Float64Array;
  readonly angles: Float64Array;
  /** For every key that went in, its number now. */
  readonly keys: Int32Array;
}

/**
 * Puts keys between keys of Euler angles (three a key, radians, joined as numbers) until no step turns by more than `largest`
 * radians, counted as the sum of the three angles' steps, which the turn never exceeds. A quaternion forgets whole turns, so
 * angles must be subdivided before they are converted. Keys that went in stay, to the bit; after the keys of `breaks` nothing is
 * put in.
 */
export function subdivideAngles(
  times: ReadonlyNumberStore,
  angles: ReadonlyNumberStore,
  largest: number = LARGEST_STEP,
  breaks: readonly number[] = [],
): SubdividedAngles {
  const held = new Set(breaks);
  const newTimes: number[] = [];
  const newAngles: number[] = [];
  const keys = new Int32Array(times.length);
  for (let key = 0; key < times.length; key++) {
    keys[key] = newTimes.length;
    const at = 3 * key;
    newTimes.push(times[key]);
    newAngles.push(angles[at], angles[at + 1], angles[at + 2]);
    if (key + 1 === times.length || held.has(key)) continue;
    const steps = [0, 1, 2].map((part) => angles[at + 3 + part] - angles[at + part]);
    const count = Math.ceil(steps.reduce((sum, step) => sum + Math.abs(step), 0) / largest);
    for (let n = 1; n < count; n++) {
      newTimes.push(times[key] + (n / count) * (times[key + 1] - times[key]));
      newAngles.push(...steps.map((step, part) => angles[at + part] + (n / count) * step));
    }
  }
  return { times: Float64Array.from(newTimes), angles: Float64Array.from(newAngles), keys };
}

/**
 * An EULER track as a LINEAR one: quaternion keys, at most `largest` radians apart, every sign on the side of the key before. At its
 * keys it is the track that went in; between them it goes by great arcs, not by angles. Any other track comes back as it is.
 *
 * @throws SlewcurveError what `rotationTrack` throws
 */
export function angleTrackToLinear(track: RotationTrack, largest: number = LARGEST_STEP): RotationTrack {
  if (track.interpolation !== 'EULER') return track;
  const { times, angles, keys } = subdivideAngles(track.times, track.values, largest, track.breaks);
  const values = new Float64Array(4 * times.length);
  for (let key = 0; key < times.length; key++) {
    const value = values.subarray(4 * key, 4 * key + 4);
    fromEuler(value, angles.subarray(3 * key, 3 * key + 3), track.sequence ?? 'XYZ');
    if (key > 0 && value.reduce((sum, part, n) => sum + part * values[4 * key - 4 + n], 0) < 0)
      value.forEach((part, n) => (value[n] = -part));
  }
  const breaks = track.breaks.map((key) => keys[key]);
  const { id, clip, storage, source } = track;
  return rotationTrack({ times, values, breaks, id, clip, storage, source });
}
