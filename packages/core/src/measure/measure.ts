import type { Curve } from '../curve/curve.js';
import { greatest, type NarrowPlace } from '../curve/greatest.js';
import { integrate } from '../curve/integrate.js';
import { angleBetween } from '../quaternion/angle-between.js';

/** The motion of a curve in figures. Radians, seconds; rates and accelerations are lengths of vectors, the same in every frame. */
export interface Measures {
  /** Greatest angular speed, rad/s, and when. */
  readonly peakRate: number;
  readonly peakAt: number;
  /** Greatest jump of the rate vector at a knot, rad/s, and when. 0 where the rate is continuous. */
  readonly worstRateJump: number;
  readonly worstRateJumpAt: number;
  /** Greatest angular acceleration, rad/s², and when; see `accelerationIs`. */
  readonly peakAcceleration: number;
  readonly peakAccelerationAt: number;
  /** Root of the mean square of the acceleration over the curve's time, rad/s². */
  readonly rmsAcceleration: number;
  /**
   * `exact`: the rate is continuous and the acceleration is its derivative. `step`: the rate jumps at knots, and there the
   * acceleration is the step acceleration 2|ω₊ − ω₋|/(h₋ + h₊), spread over half of either gap; what the inside of a segment
   * adds is exact.
   */
  readonly accelerationIs: 'step' | 'exact';
  /** Median over the segments of their mean speed (angle turned over time), each segment counting once; rad/s. */
  readonly medianRate: number;
  /** Angle turned from start to end. */
  readonly travelled: number;
}

/**
 * Measures a curve from its exact rates and accelerations, never from samples: peaks are searched for inside the segments too.
 * Where the orientation itself jumps (a declared cut, STEP) the held stretch before the jump and the jump count for nothing.
 * A curve of no time gives zeros at its start.
 */
export function measure(curve: Curve): Measures {
  const { rate: peakRate, time: peakAt } = curve.peak(curve.start, curve.end);
  const held = heldSegments(curve);
  const inside = insideAccelerations(curve, held);
  const jumps = rateJumps(curve, held);
  const stepped = jumps.step > inside.peak;
  const duration = curve.end - curve.start;
  return {
    peakRate,
    peakAt,
    worstRateJump: jumps.size,
    worstRateJumpAt: jumps.sizeAt,
    peakAcceleration: stepped ? jumps.step : inside.peak,
    peakAccelerationAt: stepped ? jumps.stepAt : inside.at,
    rmsAcceleration: duration > 0 ? Math.sqrt((inside.squares + jumps.squares) / duration) : 0,
    accelerationIs: curve.continuity >= 1 ? 'exact' : 'step',
    medianRate: median(meanSpeeds(curve)),
    travelled: curve.length(curve.start, curve.end),
  };
}

/** 1 for each segment between knots whose orientation is held and then jumps. */
function heldSegments(curve: Curve): Uint8Array {
  const { knots } = curve;
  const held = new Uint8Array(Math.max(0, knots.length - 1));
  if (curve.continuity >= 0) return held;
  const before = new Float64Array(4);
  const after = new Float64Array(4);
  for (let i = 0; i < held.length; i++) {
    curve.orientation(before, lastBefore(knots[i + 1]));
    curve.orientation(after, knots[i + 1]);
    // A curve moves far less than 1e-9 rad through one spacing of float64 times.
    held[i] = angleBetween(before, after) > 1e-9 ? 1 : 0;
  }
  return held;
}

function meanSpeeds(curve: Curve): Float64Array {
  const { knots } = curve;
  const speeds = new Float64Array(Math.max(0, knots.length - 1));
  for (let i = 0; i < speeds.length; i++)
    speeds[i] = curve.length(knots[i], knots[i + 1]) / (knots[i + 1] - knots[i]);
  return speeds;
}

/** Steps of the rate at inner knots: the greatest, the greatest over the time that it is spread over, and the integral of that one's square. */
interface RateJumps {
  size: number;
  sizeAt: number;
  step: number;
  stepAt: number;
  squares: number;
}

/** What the rate jumps by at every inner knot between two segments that are played. */
function rateJumps(curve: Curve, held: Uint8Array): RateJumps {
  const { knots, start } = curve;
  const jumps: RateJumps = { size: 0, sizeAt: start, step: 0, stepAt: start, squares: 0 };
  if (curve.continuity >= 1) return jumps;
  const before = new Float64Array(3);
  const after = new Float64Array(3);
  for (let i = 1; i < held.length; i++) {
    if (held[i - 1] || held[i]) continue;
    const time = knots[i];
    // Own axes are the same on both sides: the orientation is continuous here.
    curve.rate(before, lastBefore(time), 'own');
    curve.rate(after, time, 'own');
    const size = length(after[0] - before[0], after[1] - before[1], after[2] - before[2]);
    const share = (knots[i + 1] - knots[i - 1]) / 2;
    const step = size / share;
    if (size > jumps.size) {
      jumps.size = size;
      jumps.sizeAt = time;
    }
    if (step > jumps.step) {
      jumps.step = step;
      jumps.stepAt = time;
    }
    jumps.squares += step * step * share;
  }
  return jumps;
}

/** Greatest acceleration inside the segments, and the integral of its square. */
function insideAccelerations(curve: Curve, held: Uint8Array): { peak: number; at: number; squares: number } {
  const { knots } = curve;
  const now = new Float64Array(3);
  let peak = 0;
  let at = curve.start;
  let squares = 0;
  for (let i = 0; i < held.length; i++) {
    if (held[i]) continue;
    const from = knots[i];
    const to = knots[i + 1];
    if (curve.segmentAcceleration !== undefined) {
      const own = curve.segmentAcceleration(i);
      if (own.peak > peak) ({ peak, time: at } = own);
      squares += own.meanSquare * (to - from);
      continue;
    }
    const last = lastBefore(to);
    // The later segment's acceleration belongs to a knot, so a segment is asked up to the time before its end.
    const size = (u: number): number => {
      curve.acceleration(now, Math.min(last, from + u * (to - from)), 'own');
      return length(now[0], now[1], now[2]);
    };
    // Constant rate says so exactly, at every place.
    if (size(0) === 0 && size(0.3) === 0 && size(0.8) === 0) continue;
    const narrow = narrowPlace(curve, from, to);
    const u = greatest(size, 0, 1, narrow);
    if (size(u) > peak) {
      peak = size(u);
      at = from + u * (to - from);
    }
    squares += integrate((x) => size(x) ** 2, 0, 1, narrow, 1e-10 * size(u) ** 2) * (to - from);
  }
  return { peak, at, squares };
}

/** Where a segment turns much faster than its time allows: as long as a quarter radian takes at the peak. */
function narrowPlace(curve: Curve, from: number, to: number): NarrowPlace[] {
  const { rate, time } = curve.peak(from, to);
  const width = 0.25 / (rate * (to - from));
  return width < 0.1 ? [{ at: (time - from) / (to - from), width }] : [];
}

const spacing = new Float64Array(1);
const halves = new Uint32Array(spacing.buffer);
/** Which half holds sign and exponent: machines differ. */
const HIGH = new Uint8Array(Uint16Array.of(1).buffer)[0] === 1 ? 1 : 0;

/** The last float64 before `time`. */
function lastBefore(time: number): number {
  if (time === 0) return -Number.MIN_VALUE;
  spacing[0] = time;
  // Both halves are one whole number, which grows with the magnitude.
  if (time > 0) {
    if (halves[1 - HIGH] === 0) halves[HIGH]--;
    halves[1 - HIGH]--;
  } else {
    halves[1 - HIGH]++;
    if (halves[1 - HIGH] === 0) halves[HIGH]++;
  }
  return spacing[0];
}

function length(x: number, y: number, z: number): number {
  return Math.sqrt(x * x + y * y + z * z);
}

/** Sorts the numbers. */
function median(numbers: Float64Array): number {
  if (numbers.length === 0) return 0;
  // oxlint-disable-next-line unicorn/no-array-sort -- our own list: sorted where it is, no copy
  const sorted = numbers.sort();
  const middle = sorted.length >> 1;
  return sorted.length % 2 === 1 ? sorted[middle] : (sorted[middle - 1] + sorted[middle]) / 2;
}
