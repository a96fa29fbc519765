import {
  measure,
  playAs,
  rateFloor,
  segmentAngle,
  signChanges,
  type PlaybackId,
  type RotationTrack,
} from '@slewcurve/core';
import type { TrackReport } from './report.js';
import { significant } from '@slewcurve/survey';

const DEGREES = 180 / Math.PI;

/** The figures of one track as played by `playback`. */
export function trackReport(track: RotationTrack, playback: PlaybackId): TrackReport {
  const curve = playAs(track, playback);
  const measured = measure(curve);
  const angles = segmentAngles(track);
  return {
    clip: track.clip,
    track: track.id,
    node: track.source.node,
    interpolation: track.interpolation,
    keys: track.times.length,
    start: curve.start,
    end: curve.end,
    travelled: degrees(measured.travelled),
    peakRate: degrees(measured.peakRate),
    peakAt: measured.peakAt,
    medianRate: degrees(measured.medianRate),
    worstRateJump: degrees(measured.worstRateJump),
    peakAcceleration: degrees(measured.peakAcceleration),
    rmsAcceleration: degrees(measured.rmsAcceleration),
    accelerationIs: measured.accelerationIs,
    noiseFloor: degrees(largestRateFloor(track, angles)),
    signChanges: signChanges(track).length,
    widestSegment: degrees(largest(track, (key) => angles[key] ?? 0)),
  };
}

function degrees(radians: number): number {
  return significant(radians * DEGREES);
}

/** Shortest angle of every segment, radians. */
function segmentAngles(track: RotationTrack): Float64Array {
  const angles = new Float64Array(Math.max(0, track.times.length - 1));
  for (let key = 0; key < angles.length; key++) angles[key] = segmentAngle(track, key);
  return angles;
}

/** Largest rate floor of any segment of a track, rad/s: nothing under it is claimed anywhere on the track. */
export function largestRateFloor(track: RotationTrack, angles: Float64Array = segmentAngles(track)): number {
  return largest(track, (key) => rateFloor(track, key, angles[key]));
}

/** Largest finite value over the segments of a track; 0 where there are none. */
function largest(track: RotationTrack, ofSegment: (key: number) => number): number {
  let most = 0;
  for (let key = 0; key + 1 < track.times.length; key++) {
    const value = ofSegment(key);
    if (Number.isFinite(value) && value > most) most = value;
  }
  return most;
}
