import {
  type RotationTrack,
  angleBetween,
  expMap,
  keyOrientation,
  multiply,
  rotationTrack,
} from '@slewcurve/core';
import { seededRandom } from './seeded-random.js';

const DEGREES = 180 / Math.PI;

/** A pose of three angles about own axes one after the other, degrees: about y, then x, then z. */
export function panTilt(pan: number, tilt: number, roll = 0): Float64Array {
  const out = expMap(new Float64Array(4), [0, pan / DEGREES, 0]);
  multiply(out, out, expMap(new Float64Array(4), [tilt / DEGREES, 0, 0]));
  return multiply(out, out, expMap(new Float64Array(4), [0, 0, roll / DEGREES]));
}

/** 10u³ − 15u⁴ + 6u⁵ (Flash and Hogan 1985): degrees turned at `t` by a move between two times. */
export function moved(t: number, from: number, to: number, degrees: number): number {
  const u = Math.min(1, Math.max(0, (t - from) / (to - from)));
  return degrees * u ** 3 * (10 - 15 * u + 6 * u * u);
}

/** Three normal numbers by Box and Muller's polar form. */
function normals(seed: number): () => readonly [number, number, number] {
  const random = seededRandom(seed);
  const one = (): number => Math.sqrt(-2 * Math.log(1 - random())) * Math.cos(2 * Math.PI * random());
  return () => [one(), one(), one()];
}

/** A dense LINEAR track of a motion with white noise of `grain` degrees an axis in own axes. */
export function captured(
  motion: (time: number) => Float64Array,
  { keys, rate, grain = 0, seed = 1 }: { keys: number; rate: number; grain?: number; seed?: number },
): RotationTrack {
  const noise = normals(seed);
  const times = Array.from({ length: keys }, (_, key) => key / rate);
  const values = times.flatMap((time) => {
    const stray = noise().map((part) => (part * grain) / DEGREES);
    return [...multiply(new Float64Array(4), motion(time), expMap(new Float64Array(4), stray))];
  });
  return rotationTrack({ times, values, clip: 'Take', id: 'head' });
}

/** Degrees between each key and a motion. */
export function straysFrom(track: RotationTrack, motion: (time: number) => Float64Array): number[] {
  return Array.from(
    track.times,
    (time, key) => angleBetween(keyOrientation(new Float64Array(4), track, key), motion(time)) * DEGREES,
  );
}

/** Degrees between the keys of two tracks. */
export function between(a: RotationTrack, b: RotationTrack): number[] {
  return Array.from(
    a.times,
    (_, key) =>
      angleBetween(keyOrientation(new Float64Array(4), a, key), keyOrientation(new Float64Array(4), b, key)) *
      DEGREES,
  );
}
