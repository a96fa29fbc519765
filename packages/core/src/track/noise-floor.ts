import { segmentAngle } from './segment-angle.js';
import type { Interpolation, RotationTrack } from './rotation-track.js';
import type { Storage } from './storage.js';

const DEGREE = Math.PI / 180;

/**
 * Largest error of an angle by rounding alone, radians: a bound, so nothing smaller is claimed of a stored orientation. A step s of
 * each component gives at most 2s rad (four half steps, |δq| ≤ s, rotation error 2|δq|): normalised integers 1/(2^(b−1) − 1),
 * text 10^−d, and a lattice that was found coarser than that. float32: 5.9e-6°, measured; float64 2^29 times finer. EULER text of
 * d decimals (degrees in the file): 1.5·10^−d degrees, three half steps.
 */
export function angleFloor(storage: Storage, interpolation: Interpolation = 'LINEAR'): number {
  return Math.max(componentFloor(storage, interpolation), 2 * (storage.lattice ?? 0));
}

function componentFloor(storage: Storage, interpolation: Interpolation): number {
  switch (storage.component) {
    case 'float64':
      return 5.9e-6 * DEGREE * 2 ** -29;
    case 'float32':
      return 5.9e-6 * DEGREE;
    case 'text': {
      const step = 10 ** -(storage.decimals ?? 15);
      return interpolation === 'EULER' ? 1.5 * step * DEGREE : 2 * step;
    }
    default:
      return 2 * INTEGER_STEP[storage.component];
  }
}

/** Step of a normalised integer, glTF 2.0, "Animations". */
const INTEGER_STEP = Object.freeze({ int16: 1 / 32767, int8: 1 / 127, uint16: 1 / 65535, uint8: 1 / 255 });

/** Largest error of a stored time, seconds: half a step at `time`. */
function timeFloor(storage: Storage, time: number): number {
  const magnitude = Math.abs(time);
  switch (storage.timeComponent) {
    case 'float64':
      return binade(magnitude) * 2 ** -53;
    case 'float32':
      return binade(magnitude) * 2 ** -24;
    case 'text':
      return 0.5 * 10 ** -(storage.timeDecimals ?? 15);
    default:
      return INTEGER_STEP[storage.timeComponent] / 2;
  }
}

const number = new Float64Array(1);
const halves = new Uint32Array(number.buffer);
/** Which half holds the exponent: machines differ. */
const HIGH = new Uint8Array(Uint16Array.of(1).buffer)[0] === 1 ? 1 : 0;

/** The greatest power of two that is not above `magnitude`; 0 below float64's normal numbers. */
function binade(magnitude: number): number {
  number[0] = magnitude;
  halves[HIGH] &= 0x7ff00000;
  halves[1 - HIGH] = 0;
  return number[0];
}

/**
 * Largest error of the mean angular rate from key number `key` to the next by rounding of orientations and times, rad/s:
 * 2f/Δt + s·(δ₀ + δ₁)/Δt (f the angle floor, s the segment's speed, δ half a step of the stored time, which either end may be off
 * by). Infinite where the next key is not later.
 *
 * @param angle the segment's, radians, where it is known already
 */
export function rateFloor(
  track: RotationTrack,
  key: number,
  angle: number = segmentAngle(track, key),
): number {
  const duration = track.times[key + 1] - track.times[key];
  if (!(duration > 0)) return Infinity;
  const floor = 2 * angleFloor(track.storage, track.interpolation);
  const speed = angle / duration;
  const times = timeFloor(track.storage, track.times[key]) + timeFloor(track.storage, track.times[key + 1]);
  return (floor + speed * times) / duration;
}

/**
 * Largest error of the step acceleration at key number `key` by rounding of orientations, rad/s²: 4f/Δt²; where the gaps beside
 * the key differ, 4f/(h₀h₁), which is what 2|ω₁ − ω₀|/(h₀ + h₁) gives for rates that are each 2f/h wrong. A first or last key
 * takes its one gap twice. Infinite where a gap is not positive.
 */
export function accelerationFloor(track: RotationTrack, key: number): number {
  const before = track.times[key] - track.times[key - 1];
  const after = track.times[key + 1] - track.times[key];
  const h0 = Number.isNaN(before) ? after : before;
  const h1 = Number.isNaN(after) ? before : after;
  return h0 > 0 && h1 > 0 ? (4 * angleFloor(track.storage, track.interpolation)) / (h0 * h1) : Infinity;
}
