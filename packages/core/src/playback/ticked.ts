import type { Curve } from '../curve/curve.js';
import { slerpCurve } from '../curve/slerp-curve.js';
import { SlewcurveError } from '../errors.js';
import { findSegment } from '../track/find-segment.js';
import { keyOrientation } from '../track/key-orientation.js';
import { playableTrack } from '../track/playable-track.js';
import { rotationTrack, type RotationTrack } from '../track/rotation-track.js';
import { playAs } from './play-as.js';
import type { PlaybackId } from './playback.js';

/** What a program does at each tick: reads the playback's own curve, the short arc between the two keys beside it, or the nearest key. */
export type TickReading = 'own' | 'linear' | 'nearest';

/** A day at 115 ticks a second. */
const MOST_TICKS = 1e7;

/** Every way to read at a tick, the default first. */
export const TICK_READINGS: readonly TickReading[] = Object.freeze(['own', 'linear', 'nearest']);

/**
 * What is seen of a track whose program steps at a fixed rate: the poses at its ticks, the first at the first key, the last at or after the last one, joined by
 * short arcs, so that its rate is the step from tick to tick. Whatever turns further than half a turn between two ticks is seen the other way round. Across a
 * cut nothing turns.
 *
 * @param rate ticks per second
 * @throws SlewcurveError what `playAs` throws; `ticks.too-many`
 */
export function ticked(
  track: RotationTrack,
  id: PlaybackId,
  rate: number,
  reading: TickReading = 'own',
): Curve {
  const keys = playableTrack(track);
  const own = playAs(keys, reading === 'linear' ? 'short-way' : id);
  const count = keys.times.length === 0 ? 0 : Math.ceil((own.end - own.start) * rate - 1e-9) + 1;
  if (!(rate > 0 && count <= MOST_TICKS))
    throw new SlewcurveError(
      'ticks.too-many',
      `${rate} ticks a second over ${own.end - own.start} s are not between 1 and ${MOST_TICKS} ticks.`,
      { track: track.id, clip: track.clip },
    );
  const times = Float64Array.from({ length: count }, (_, tick) => own.start + tick / rate);
  const values = new Float64Array(4 * count);
  times.forEach((time, tick) => {
    const q = values.subarray(4 * tick, 4 * tick + 4);
    if (reading === 'nearest') keyOrientation(q, keys, nearestKey(keys.times, time));
    else own.orientation(q, time);
  });
  const breaks = new Set(
    keys.breaks.map((key) => {
      const [from, to] = [keys.times[key], keys.times[key + 1] ?? Infinity];
      return lastTickBefore(times, reading === 'nearest' ? (from + to) / 2 : to);
    }),
  );
  const inside = [...breaks].filter((tick) => tick >= 0 && tick + 1 < count);
  return slerpCurve(rotationTrack({ times, values, breaks: inside }));
}

function nearestKey(times: Float64Array, time: number): number {
  const key = findSegment(times, time);
  return key + 1 < times.length && times[key + 1] - time <= time - times[key] ? key + 1 : key;
}

function lastTickBefore(ticks: Float64Array, time: number): number {
  return ticks.findLastIndex((tick) => tick < time);
}
