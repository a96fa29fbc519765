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
  const segments = segmentsOf(curve);
  const jumps = curve.continuity >= 1 ? [] : rateJumps(curve, segments);
  const worstJump = jumps.reduce(larger('size'), { size: 0, time: curve.start, step: 0, share: 0 });
  const worstStep = jumps.reduce(larger('step'), { size: 0, time: curve.start, step: 0, share: 0 });
  const inside = insideAccelerations(curve, segments);
  const stepped = worstStep.step > inside.peak;
  const squares = jumps.reduce((sum, { step, share }) => sum + step * step * share, inside.squares);
  const duration = curve.end - curve.start;
  return {
    peakRate,
    peakAt,
    worstRateJump: worstJump.size,
    worstRateJumpAt: worstJump.time,
    peakAcceleration: stepped ? worstStep.step : inside.peak,
    peakAccelerationAt: stepped ? worstStep.time : inside.at,
    rmsAcceleration: duration > 0 ? Math.sqrt(squares / duration) : 0,
    accelerationIs: curve.continuity >= 1 ? 'exact' : 'step',
    medianRate: median(segments.map(({ from, to }) => curve.length(from, to) / (to - from))),
    travelled: curve.length(curve.start, curve.end),
  };
}

interface Segment {
  readonly from: number;
  readonly to: number;
  /** The orientation is held, then jumps. */
  readonly held: boolean;
}

interface RateJump {
  readonly size: number;
  readonly time: number;
  readonly step: number;
  /** Seconds over which the step is spread. */
  readonly share: number;
}

const larger =
  (by: 'size' | 'step') =>
  (a: RateJump, b: RateJump): RateJump =>
    b[by] > a[by] ? b : a;

function segmentsOf(curve: Curve): Segment[] {
  const { knots } = curve;
  const before = new Float64Array(4);
  const after = new Float64Array(4);
  const segments: Segment[] = [];
  for (let i = 0; i + 1 < knots.length; i++) {
    const to = knots[i + 1];
    let held = false;
    if (curve.continuity < 0) {
      curve.orientation(before, lastBefore(to));
      curve.orientation(after, to);
      // A curve moves far less than 1e-9 rad through one spacing of float64 times.
      held = angleBetween(before, after) > 1e-9;
    }
    segments.push({ from: knots[i], to, held });
  }
  return segments;
}

/** What the rate jumps by at every inner knot between two segments that are played. */
function rateJumps(curve: Curve, segments: readonly Segment[]): RateJump[] {
  const before = new Float64Array(3);
  const after = new Float64Array(3);
  const jumps: RateJump[] = [];
  for (let i = 1; i < segments.length; i++) {
    if (segments[i - 1].held || segments[i].held) continue;
    const time = segments[i].from;
    // Own axes are the same on both sides: the orientation is continuous here.
    curve.rate(before, lastBefore(time), 'own');
    curve.rate(after, time, 'own');
    const size = length(after[0] - before[0], after[1] - before[1], after[2] - before[2]);
    const share = (segments[i].to - segments[i - 1].from) / 2;
    jumps.push({ size, time, step: size / share, share });
  }
  return jumps;
}

/** Greatest acceleration inside the segments, and the integral of its square. */
function insideAccelerations(
  curve: Curve,
  segments: readonly Segment[],
): { peak: number; at: number; squares: number } {
  const now = new Float64Array(3);
  let peak = 0;
  let at = curve.start;
  let squares = 0;
  for (const [i, { from, to, held }] of segments.entries()) {
    if (held) continue;
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
    // Constant rate (great arcs) says so exactly, at every place.
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
const bits = new BigInt64Array(spacing.buffer);

/** The last float64 before `time`. */
function lastBefore(time: number): number {
  if (time === 0) return -Number.MIN_VALUE;
  spacing[0] = time;
  bits[0] += time > 0 ? -1n : 1n;
  return spacing[0];
}

function length(x: number, y: number, z: number): number {
  return Math.sqrt(x * x + y * y + z * z);
}

function median(numbers: readonly number[]): number {
  if (numbers.length === 0) return 0;
  // oxlint-disable-next-line unicorn/no-array-sort -- our own list: sorted where it is, no copy
  const sorted = Float64Array.from(numbers).sort();
  const middle = sorted.length >> 1;
  return sorted.length % 2 === 1 ? sorted[middle] : (sorted[middle - 1] + sorted[middle]) / 2;
}
