import { SlewcurveError } from '../errors.js';
import { unitScale } from '../quaternion/unit-scale.js';
import { playableTrack } from '../track/playable-track.js';
import { VALUES_PER_KEY, type RotationTrack } from '../track/rotation-track.js';
import type { SharedTimes } from './group.js';

/** What a sampler plays of one track: keys that can be played, declared cuts turned into keys, orientations made unit. */
export interface PlayedKeys {
  readonly interpolation: 'STEP' | 'LINEAR' | 'CUBICSPLINE';
  readonly times: Float64Array;
  readonly values: Float64Array;
}

const IDENTITY = { times: Float64Array.of(0), values: Float64Array.of(0, 0, 0, 1) };

/** @throws SlewcurveError `sampler.euler-track` */
export function playedKeys(track: RotationTrack): PlayedKeys {
  const { interpolation } = track;
  if (interpolation === 'EULER')
    throw new SlewcurveError(
      'sampler.euler-track',
      'A sampler plays quaternions; this track holds Euler angles. Re-grid it to quaternion keys first.',
      { track: track.id, clip: track.clip },
    );
  const playable = playableTrack(track);
  if (playable.times.length === 0) return { interpolation: 'STEP', ...IDENTITY };
  if (interpolation === 'CUBICSPLINE') return { interpolation, ...withHolds(playable) };
  const { times, values } = interpolation === 'LINEAR' ? withHolds(playable) : playable;
  return { interpolation, times, values: unitKeys(values, interpolation === 'LINEAR') };
}

/**
 * Nothing is interpolated after a break: the key before it stands until the key after it. A copy of it at that key's time, with
 * tangents 0, makes an ordinary segment of that; the copy's own segment lasts no time and is never played.
 */
function withHolds(track: RotationTrack): { times: Float64Array; values: Float64Array } {
  const { times, values } = track;
  const breaks = track.breaks.filter((key) => key < times.length - 1);
  if (breaks.length === 0) return { times, values };
  const size = VALUES_PER_KEY[track.interpolation];
  const heldTimes = new Float64Array(times.length + breaks.length);
  const heldValues = new Float64Array(heldTimes.length * size);
  for (let key = 0, to = 0, next = 0; key < times.length; key++, to++) {
    heldTimes[to] = times[key];
    heldValues.set(values.subarray(key * size, (key + 1) * size), to * size);
    if (key !== breaks[next]) continue;
    next++;
    if (size === 12) heldValues.fill(0, to * size + 8, to * size + 12);
    heldTimes[++to] = times[key + 1];
    const value = size === 12 ? 4 : 0;
    heldValues.set(values.subarray(key * size + value, key * size + value + 4), to * size + value);
  }
  return { times: heldTimes, values: heldValues };
}

/**
 * Keys made unit and, for great arcs, each put on the side of the one before. Whether two keys lie on one side is asked of their
 * signs as stored: exactly half a turn apart these alone tell the way.
 */
function unitKeys(values: Float64Array, oneSide: boolean): Float64Array {
  const keys = new Float64Array(values.length);
  let side = 1;
  for (let at = 0; at < keys.length; at += 4) {
    const scale = unitScale(values[at], values[at + 1], values[at + 2], values[at + 3]);
    for (let i = at; i < at + 4; i++) keys[i] = values[i] * scale;
    if (!oneSide || at === 0) continue;
    let dot = 0;
    for (let i = at; i < at + 4; i++) dot += keys[i - 4] * keys[i];
    if (dot * side < 0) side = -side;
    if (side < 0) for (let i = at; i < at + 4; i++) keys[i] = -keys[i];
  }
  return keys;
}

/** Tracks of one kind with the same times, number by number, put together in the order in which they come. */
export function groupBySharedTimes(
  tracks: readonly PlayedKeys[],
): { interpolation: PlayedKeys['interpolation']; shared: SharedTimes }[] {
  const groups: { first: PlayedKeys; members: number[] }[] = [];
  const bySize = new Map<string, typeof groups>();
  tracks.forEach((track, i) => {
    const { interpolation, times } = track;
    const size = `${interpolation} ${times.length} ${times[0]} ${times.at(-1)}`;
    const alike = bySize.get(size) ?? [];
    bySize.set(size, alike);
    const group = alike.find(({ first }) => sameTimes(first.times, times));
    if (group !== undefined) return group.members.push(i);
    const own = { first: track, members: [i] };
    alike.push(own);
    return groups.push(own);
  });
  return groups.map(({ first, members }) => ({
    interpolation: first.interpolation,
    shared: {
      times: first.times.slice(),
      values: members.map((i) => tracks[i].values),
      slots: Int32Array.from(members, (i) => 4 * i),
    },
  }));
}

function sameTimes(a: Float64Array, b: Float64Array): boolean {
  return a === b || a.every((time, i) => time === b[i]);
}
