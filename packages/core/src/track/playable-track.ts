import { valueOffset } from './key-orientation.js';
import { replaceTrack } from './replace-track.js';
import { VALUES_PER_KEY, type RotationTrack } from './rotation-track.js';

/**
 * The track without the keys that cannot be played (see `playableKeys`). A declared cut after a dropped key moves to the key kept
 * before. `track` itself where nothing is dropped, a new track otherwise.
 */
export function playableTrack(track: RotationTrack): RotationTrack {
  // Asked for by every curve and measure of one track.
  if (sound.has(track)) return track;
  const kept = playableKeys(track);
  if (kept.length < track.times.length) return keepKeys(track, kept);
  sound.add(track);
  return track;
}

/** Tracks all of whose keys can be played. */
const sound = new WeakSet<RotationTrack>();

/**
 * Numbers of the keys that can be played, ascending. Those that cannot: numbers that are not finite (a time beyond ±1e300 s
 * counts as such, so that differences of times stay finite), an orientation of no length (under 1e-6, as `rotationTrack`), a time
 * that is not later than that of the key kept before it.
 */
export function playableKeys(track: RotationTrack): number[] {
  const kept: number[] = [];
  let last = -Infinity;
  for (let key = 0; key < track.times.length; key++) {
    if (!playable(track, key) || track.times[key] <= last) continue;
    last = track.times[key];
    kept.push(key);
  }
  return kept;
}

function playable(track: RotationTrack, key: number): boolean {
  const { values, times, interpolation } = track;
  const size = VALUES_PER_KEY[interpolation];
  if (!(Math.abs(times[key]) <= 1e300)) return false;
  for (let i = key * size; i < (key + 1) * size; i++) if (!Number.isFinite(values[i])) return false;
  if (interpolation === 'EULER') return true;
  const at = valueOffset(track, key);
  return Math.hypot(values[at], values[at + 1], values[at + 2], values[at + 3]) >= 1e-6;
}

function keepKeys(track: RotationTrack, kept: readonly number[]): RotationTrack {
  const size = VALUES_PER_KEY[track.interpolation];
  const values = new Float64Array(kept.length * size);
  kept.forEach((key, i) => values.set(track.values.subarray(key * size, (key + 1) * size), i * size));
  const breaks = new Set<number>();
  // Breaks and kept keys both ascend.
  let upTo = 0;
  for (const key of track.breaks) {
    while (kept[upTo] <= key) upTo++;
    if (upTo > 0) breaks.add(upTo - 1);
  }
  return replaceTrack(track, {
    times: Float64Array.from(kept, (key) => track.times[key]),
    values,
    breaks: [...breaks],
  });
}
