import { SlewcurveError } from '../errors.js';
import { unitScale } from '../quaternion/unit-scale.js';
import { playableKeys } from '../track/playable-track.js';
import { VALUES_PER_KEY, type RotationTrack } from '../track/rotation-track.js';
import type { SharedTimes } from './group.js';

/** What a sampler plays of one track: keys that can be played, declared cuts turned into keys, orientations made unit. */
export interface PlayedKeys {
  readonly interpolation: 'STEP' | 'LINEAR' | 'CUBICSPLINE';
  readonly times: Float64Array;
  readonly values: Float64Array;
}

const IDENTITY = [0, 0, 0, 1];

/** @throws SlewcurveError `sampler.euler-track` */
export function playedKeys(track: RotationTrack): PlayedKeys {
  const { interpolation } = track;
  if (interpolation === 'EULER')
    throw new SlewcurveError(
      'sampler.euler-track',
      'The track holds Euler angles; a sampler plays quaternions. Re-grid it to LINEAR first.',
      { track: track.id, clip: track.clip },
    );
  const { times, values } = withHolds(track, interpolation, playableKeys(track));
  if (times.length === 0)
    return { interpolation: 'STEP', times: Float64Array.of(0), values: Float64Array.from(IDENTITY) };
  if (interpolation !== 'CUBICSPLINE') makeUnit(values, interpolation === 'LINEAR');
  return { interpolation, times, values };
}

/**
 * A copy of the keys `kept`. Nothing is interpolated after a break: the key before it stands until the key after it. A second copy
 * at that key's time, with tangents 0, makes an ordinary segment of that; the copy's own segment lasts no time and is never
 * played. STEP holds as it is.
 */
function withHolds(
  track: RotationTrack,
  interpolation: PlayedKeys['interpolation'],
  kept: readonly number[],
): { times: Float64Array; values: Float64Array } {
  const size = VALUES_PER_KEY[interpolation];
  const times: number[] = [];
  const values: number[] = [];
  let cut = 0;
  kept.forEach((key, i) => {
    const own = track.values.subarray(key * size, (key + 1) * size);
    times.push(track.times[key]);
    values.push(...own);
    // A cut after a key that was dropped is one after the key kept before it.
    const next = kept[i + 1];
    while (track.breaks[cut] < key) cut++;
    if (interpolation === 'STEP' || !(track.breaks[cut] < next)) return;
    times.push(track.times[next]);
    if (size === 12) values.fill(0, -4);
    values.push(...(size === 12 ? [0, 0, 0, 0, ...own.subarray(4, 8), 0, 0, 0, 0] : own));
  });
  return { times: Float64Array.from(times), values: Float64Array.from(values) };
}

/**
 * Makes keys unit and, for great arcs, puts each on the side of the one before. Whether two keys lie on one side is asked of their
 * signs as stored: exactly half a turn apart these alone tell the way.
 */
function makeUnit(keys: Float64Array, oneSide: boolean): void {
  let side = 1;
  for (let at = 0; at < keys.length; at += 4) {
    const scale = unitScale(keys[at], keys[at + 1], keys[at + 2], keys[at + 3]);
    let dot = 0;
    for (let i = at; i < at + 4; i++) {
      keys[i] *= scale;
      dot += at > 0 ? keys[i - 4] * keys[i] : 0;
    }
    if (oneSide && dot * side < 0) side = -side;
    if (side < 0) for (let i = at; i < at + 4; i++) keys[i] = -keys[i];
  }
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
      times: first.times,
      values: members.map((i) => tracks[i].values),
      slots: Int32Array.from(members, (i) => 4 * i),
    },
  }));
}

function sameTimes(a: Float64Array, b: Float64Array): boolean {
  return a === b || a.every((time, i) => time === b[i]);
}
