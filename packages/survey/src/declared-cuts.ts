import { type RotationTrack, replaceTrack } from '@slewcurve/core';
import { matchesPattern } from '@slewcurve/mend';
import type { HouseRules } from './house-rules.js';

/** The declared cuts of a track as breaks: nothing is interpolated into the key at a declared time. */
export function withDeclaredCuts(track: RotationTrack, { declared }: HouseRules): RotationTrack {
  const breaks = new Set(track.breaks);
  for (const cut of declared.cuts) {
    if (!matchesPattern(cut.clip, track.clip) || !matchesPattern(cut.track, track.id)) continue;
    const key = nearestKey(track.times, cut.time);
    if (key > 0) breaks.add(key - 1);
  }
  if (breaks.size === track.breaks.length) return track;
  const sorted = [...breaks];
  sorted.sort((a, b) => a - b);
  return replaceTrack(track, { breaks: sorted });
}

/** The key that a declared time means: the nearest within half the gap to its neighbours; -1 where there is none. */
function nearestKey(times: Float64Array, time: number): number {
  let nearest = -1;
  for (let key = 0; key < times.length; key++)
    if (nearest < 0 || Math.abs((times[key] ?? 0) - time) < Math.abs((times[nearest] ?? 0) - time))
      nearest = key;
  const gap = Math.min(
    Math.abs((times[nearest] ?? 0) - (times[nearest - 1] ?? -Infinity)),
    Math.abs((times[nearest + 1] ?? Infinity) - (times[nearest] ?? 0)),
  );
  return Math.abs((times[nearest] ?? Infinity) - time) <= gap / 2 ? nearest : -1;
}
