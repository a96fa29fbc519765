import { keyOrientation, multiply, conjugate } from '@slewcurve/core';
import type { TrackContext } from './rule.js';

const DEGREES = 180 / Math.PI;

/** A track's keys and the straight turns between them, worked out once for all rules. A segment has the number of its earlier key. */
export interface Segments {
  /** Unit quaternions, each on the side of the one before. */
  readonly orientations: Float64Array;
  /** Shortest turn of a segment, degrees; NaN across a break, where nothing turns. */
  readonly turns: Float64Array;
  /** deg/s; NaN across a break. */
  readonly speeds: Float64Array;
  /** Rate in parent axes, deg/s, three numbers a segment; NaN across a break. */
  readonly rates: Float64Array;
}

const known = new WeakMap<TrackContext, Segments>();

/** The segments of `context.track`. */
export function segmentsOf(context: TrackContext): Segments {
  const before = known.get(context);
  if (before !== undefined) return before;
  const segments = measured(context);
  known.set(context, segments);
  return segments;
}

function measured({ track }: TrackContext): Segments {
  const { times } = track;
  const count = Math.max(0, times.length - 1);
  const orientations = alignedOrientations(track);
  const turns = new Float64Array(count);
  const speeds = new Float64Array(count);
  const rates = new Float64Array(3 * count);
  const broken = new Set(track.breaks);
  const before = new Float64Array(4);
  const turn = new Float64Array(4);
  for (let k = 0; k < count; k++) {
    if (broken.has(k)) {
      turns[k] = speeds[k] = Number.NaN;
      rates.fill(Number.NaN, 3 * k, 3 * k + 3);
      continue;
    }
    for (let i = 0; i < 4; i++) {
      before[i] = orientations[4 * k + i] ?? 0;
      turn[i] = orientations[4 * k + 4 + i] ?? 0;
    }
    // b·a⁻¹ has the turn's axis in parent axes.
    multiply(turn, turn, conjugate(before, before));
    const x = turn[0] ?? 0;
    const y = turn[1] ?? 0;
    const z = turn[2] ?? 0;
    const w = turn[3] ?? 0;
    const sine = Math.sqrt(x * x + y * y + z * z);
    const angle = 2 * Math.atan2(sine, Math.abs(w)) * DEGREES;
    const gap = (times[k + 1] ?? 0) - (times[k] ?? 0);
    turns[k] = angle;
    speeds[k] = angle / gap;
    const scale = sine > 0 ? angle / gap / sine : 0;
    rates[3 * k] = x * scale;
    rates[3 * k + 1] = y * scale;
    rates[3 * k + 2] = z * scale;
  }
  return { orientations, turns, speeds, rates };
}

function alignedOrientations(track: TrackContext['track']): Float64Array {
  const all = new Float64Array(4 * track.times.length);
  const one = new Float64Array(4);
  for (let key = 0; key < track.times.length; key++) {
    keyOrientation(one, track, key);
    let along = 0;
    if (key > 0) for (let i = 0; i < 4; i++) along += (one[i] ?? 0) * (all[4 * key - 4 + i] ?? 0);
    const side = along < 0 ? -1 : 1;
    for (let i = 0; i < 4; i++) all[4 * key + i] = side * (one[i] ?? 0);
  }
  return all;
}

/** A segment's rate, deg/s, parent axes. */
export function rateOf({ rates }: Segments, segment: number): [number, number, number] {
  return [rates[3 * segment] ?? 0, rates[3 * segment + 1] ?? 0, rates[3 * segment + 2] ?? 0];
}

/** Length of the difference of two vectors. */
export function differenceOf(
  [ax = 0, ay = 0, az = 0]: ArrayLike<number> & Iterable<number>,
  [bx = 0, by = 0, bz = 0]: ArrayLike<number> & Iterable<number>,
): number {
  return Math.hypot(ax - bx, ay - by, az - bz);
}

/** Angle between two directions, degrees. */
export function angleApart(
  [ax, ay, az]: readonly [number, number, number],
  [bx, by, bz]: readonly [number, number, number],
): number {
  const cross = Math.hypot(ay * bz - az * by, az * bx - ax * bz, ax * by - ay * bx);
  return Math.atan2(cross, ax * bx + ay * by + az * bz) * DEGREES;
}
