import { playAs, type Clip, type PlaybackId, type RotationTrack } from '@slewcurve/core';

import { largestRateFloor } from './track-report.js';

const DEGREES = 180 / Math.PI;

/** What the roster draws of one track: angular speed over its clip, the greatest in each bin. deg/s, seconds. */
export interface RosterRow {
  readonly clip: string;
  readonly track: string;
  readonly keys: number;
  /** Clip's start and end: every row of a clip has the same time axis. */
  readonly start: number;
  readonly end: number;
  /** Greatest speed in each of equal bins from `start` to `end`: never the mean, so that no one-frame pop is lost. */
  readonly columns: Float32Array;
  /** Largest rate floor of any segment, deg/s. */
  readonly noiseFloor: number;
  readonly peak: number;
  /** Degrees turned in all. */
  readonly travelled: number;
}

/** Bins of a row: enough for one a pixel on a wide screen. */
const MOST_BINS = 4096;

/** The roster's row of a track as played by `playback`. */
export function rosterRow(track: RotationTrack, clip: Clip, playback: PlaybackId): RosterRow {
  const curve = playAs(track, playback);
  const span = clip.end - clip.start;
  const bins = Math.min(MOST_BINS, Math.max(1, 4 * track.times.length));
  const columns = new Float32Array(bins);
  let peak = 0;
  if (span > 0)
    for (let bin = 0; bin < bins; bin++) {
      const from = clip.start + (span * bin) / bins;
      const to = clip.start + (span * (bin + 1)) / bins;
      if (to < curve.start || from > curve.end) continue;
      const rate = curve.peak(from, to).rate * DEGREES;
      columns[bin] = rate;
      if (rate > peak) peak = rate;
    }
  return {
    clip: track.clip,
    track: track.id,
    keys: track.times.length,
    start: clip.start,
    end: clip.end,
    columns,
    noiseFloor: largestRateFloor(track) * DEGREES,
    peak,
    travelled: curve.length(curve.start, curve.end) * DEGREES,
  };
}
