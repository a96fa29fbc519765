import { type ReadonlyNumberStore, type RotationTrack, VALUES_PER_KEY, dot, multiply } from '@slewcurve/core';

/** Shorter than this a stored quaternion has no direction: `file.not-normalised` calls it zero. */
const NO_LENGTH = 1e-6;

/** Where the four numbers of a key's value begin in `values`: after the in-tangent under CUBICSPLINE. */
export function valueAt(track: RotationTrack, key: number): number {
  return key * VALUES_PER_KEY[track.interpolation] + (track.interpolation === 'CUBICSPLINE' ? 4 : 0);
}

/** The stored quaternion of a key: a view, not a copy. */
export function storedValue(
  track: RotationTrack,
  key: number,
  values: Float64Array = track.values,
): Float64Array {
  const at = valueAt(track, key);
  return values.subarray(at, at + 4);
}

/** Length of the stored quaternion. NaN where a number is not finite. */
export function storedLength(track: RotationTrack, key: number): number {
  const [x, y, z, w] = storedValue(track, key);
  const length = Math.hypot(x, y, z, w);
  return Number.isFinite(length) ? length : NaN;
}

/** Whether playing uses a key: a finite time, finite numbers (tangents too), a length. */
export function isPlayable(track: RotationTrack, key: number): boolean {
  if (!(storedLength(track, key) >= NO_LENGTH) || !Number.isFinite(track.times[key])) return false;
  const size = VALUES_PER_KEY[track.interpolation];
  return size === 4 || track.values.subarray(key * size, (key + 1) * size).every(Number.isFinite);
}

/** Whether motion runs from key `key` to `key + 1` as far as the track declares. */
export function isJoined(track: RotationTrack, key: number): boolean {
  return key >= 0 && key + 1 < track.times.length && !track.breaks.includes(key);
}

/**
 * The nearest playable key from `key` in steps of `way`, at a time on that side, without crossing a break; undefined where there is
 * none. Keys in `skip` don't count.
 */
export function playableNeighbour(
  track: RotationTrack,
  key: number,
  way: 1 | -1,
  skip: ReadonlySet<number> = new Set(),
): number | undefined {
  for (let at = key; isJoined(track, way === 1 ? at : at - 1);) {
    at += way;
    const onItsSide = (track.times[at] - track.times[key]) * way > 0 || !Number.isFinite(track.times[key]);
    if (onItsSide && !skip.has(at) && isPlayable(track, at)) return at;
  }
  return undefined;
}

/**
 * Writes unit orientation `q` as a key's value into `values`, on the side of S³ where `sideOf` is (`q` and `-q` are one orientation).
 * Under CUBICSPLINE both tangents become ½·q·(ω, 0) for own-frame rate `rate`, rad/s (MATHS: best tangent for a wanted rate); the first
 * key's in-tangent and the last key's out-tangent become zero, as glTF 2.0 wants.
 */
export function writeKey(
  values: Float64Array,
  track: RotationTrack,
  key: number,
  q: ReadonlyNumberStore,
  sideOf: Float64Array | undefined,
  rate: ReadonlyNumberStore,
): void {
  const value = storedValue(track, key, values);
  const sign = sideOf && dot(q, sideOf) < 0 ? -1 : 1;
  for (let i = 0; i < 4; i++) value[i] = sign * q[i];
  if (track.interpolation !== 'CUBICSPLINE') return;
  const tangent = tangentFor(value, rate);
  const at = key * 12;
  values.set(key === 0 ? [0, 0, 0, 0] : tangent, at);
  values.set(key === track.times.length - 1 ? [0, 0, 0, 0] : tangent, at + 8);
}

/** ½·q·(ω, 0): what d/dt of the stored quaternion must be for own-frame rate ω, rad/s. */
export function tangentFor(q: Float64Array, rate: ReadonlyNumberStore): Float64Array {
  return multiply(new Float64Array(4), q, [rate[0] / 2, rate[1] / 2, rate[2] / 2, 0]);
}
