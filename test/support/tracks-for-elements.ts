import { playAs, rotationTrack, type RotationTrack } from '@slewcurve/core';
import { curveMotion, type ChartData } from '@slewcurve/elements/plot';

/** A track about own y whose keys stand at the given angles, degrees, `gap` seconds apart. */
export function turning(angles: readonly number[], gap = 0.1, id = 'arm/hand'): RotationTrack {
  return rotationTrack({
    times: angles.map((_, i) => i * gap),
    values: angles.flatMap((angle) => [
      0,
      Math.sin((angle * Math.PI) / 360),
      0,
      Math.cos((angle * Math.PI) / 360),
    ]),
    id,
    clip: 'Wave',
  });
}

/** The track as the chart gets it, played as written. */
export function chartOf(track: RotationTrack, more: Partial<ChartData> = {}): ChartData {
  return {
    track: track.id,
    clip: track.clip,
    file: 'wave.glb',
    motion: curveMotion(playAs(track, 'as-written')),
    playback: 'as written',
    keys: track.times,
    noiseFloor: 0.01,
    rateNames: ['about own x', 'about own y', 'about own z'],
    notes: [],
    ...more,
  };
}

/** 10° a key, every tenth of a second, with key 12 five degrees off: 100 deg/s, then 150 and 50. */
export function popped(): RotationTrack {
  return turning(Array.from({ length: 31 }, (_, i) => i * 10 + (i === 12 ? 5 : 0)));
}
