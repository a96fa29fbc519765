import type { Clip } from '@slewcurve/core';
import type { ClipReport } from './report.js';

/** The figures of one clip. */
export function clipReport(clip: Clip): ClipReport {
  return {
    clip: clip.name,
    seconds: clip.end - clip.start,
    ...(clip.frameRate !== undefined && { frameRate: clip.frameRate }),
    tracks: clip.tracks.length,
    keys: clip.tracks.reduce((sum, track) => sum + track.times.length, 0),
  };
}
