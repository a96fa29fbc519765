import { playableTrack } from '../track/playable-track.js';
import type { RotationTrack } from '../track/rotation-track.js';
import { durations } from './segmented-curve.js';
import { segmentTurns } from './slerp-curve.js';
import { unitKeys } from './unit-keys.js';

/** What every spline through keys starts from. Segment i joins key i and key i + 1. */
export interface SplineKeys {
  readonly times: Float64Array;
  readonly breaks: readonly number[];
  /** Unit orientations, each on the side of the one before; four numbers a key. */
  readonly keys: Float64Array;
  /** Seconds a segment. */
  readonly gaps: Float64Array;
  /** Rotation vector of every segment, the short way, radians, own axes; three numbers a segment. */
  readonly turns: Float64Array;
  /** For every segment, the one that joins it at its first key; −1 where none does. */
  readonly before: Int32Array;
  /** For every segment, the one that joins it at its last key; −1 where none does. */
  readonly after: Int32Array;
  /** Whether last and first segment join: asked for, and there are no breaks. */
  readonly loop: boolean;
}

/** The playable keys of a track, made ready; with `loop` the last key is the first again. */
export function splineKeys(track: RotationTrack, loop: boolean): SplineKeys {
  const played = playableTrack(track);
  const { times, breaks } = played;
  const keys = onOneSide(unitKeys(played));
  const gaps = durations(times);
  const closed = loop && gaps.length > 0 && breaks.length === 0;
  return {
    times,
    breaks,
    keys,
    gaps,
    turns: segmentTurns(keys),
    ...segmentEnds(gaps.length, breaks, closed),
    loop: closed,
  };
}

/** Keys `first` to `last` with nothing broken between them, at least one segment. */
export interface SplineRun {
  readonly first: number;
  readonly last: number;
}

/** The stretches between breaks. */
export function splineRuns({ gaps, before, after, breaks }: SplineKeys): SplineRun[] {
  const runs: SplineRun[] = [];
  const held = new Set(breaks);
  for (let first = 0; first < gaps.length; first++) {
    if (held.has(first) || (first > 0 && before[first] >= 0)) continue;
    let last = first + 1;
    while (last < gaps.length && after[last - 1] === last) last++;
    runs.push({ first, last });
  }
  return runs;
}

function segmentEnds(
  count: number,
  breaks: readonly number[],
  loop: boolean,
): { before: Int32Array; after: Int32Array } {
  const before = Int32Array.from({ length: count }, (_, i) => i - 1);
  const after = Int32Array.from({ length: count }, (_, i) => (i + 1 < count ? i + 1 : -1));
  for (const held of breaks.filter((key) => key < count)) {
    if (held > 0) after[held - 1] = -1;
    if (held + 1 < count) before[held + 1] = -1;
  }
  if (loop) {
    before[0] = count - 1;
    after[count - 1] = 0;
  }
  return { before, after };
}

/** Negates, in place, every key that lies on the other side of the one before. */
function onOneSide(keys: Float64Array): Float64Array {
  for (let at = 4; at < keys.length; at += 4) {
    let dot = 0;
    for (let k = 0; k < 4; k++) dot += keys[at + k] * keys[at - 4 + k];
    if (dot < 0) for (let k = 0; k < 4; k++) keys[at + k] = -keys[at + k];
  }
  return keys;
}
