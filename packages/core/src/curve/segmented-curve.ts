import type { NumberStore } from '../number-store.js';
import { rotateVector } from '../quaternion/rotate-vector.js';
import { findSegment } from '../track/find-segment.js';
import type { Curve, Frame, Peak, SegmentAcceleration } from './curve.js';

/**
 * How one kind of interpolation moves between key `segment` and the next, at the fraction `u` (0 to 1) of the segment's time.
 * Rates are rad/s and rad/s², in own axes. Only called for segments that exist and are not held.
 */
export interface SegmentMotion {
  orientation(out: NumberStore, segment: number, u: number): void;
  rate(out: NumberStore, segment: number, u: number): void;
  acceleration(out: NumberStore, segment: number, u: number): void;
  /** Angle turned between two fractions, `u0 <= u1`, radians. */
  length(segment: number, u0: number, u1: number): number;
  /** Fraction in `[u0, u1]` at which the angular speed is greatest; the earliest of equals. */
  peakAt(segment: number, u0: number, u1: number): number;
  /** Where there is a closed form: fraction at which the acceleration is greatest, how much, and the mean of its square. */
  accelerationOver?(segment: number): {
    readonly u: number;
    readonly peak: number;
    readonly meanSquare: number;
  };
}

export interface SegmentedCurveParts {
  /** Key times, seconds, strictly ascending. */
  readonly times: Float64Array;
  readonly continuity: 0 | 1 | 2;
  /** Keys after which nothing is interpolated: their orientation is held until the next key. */
  readonly breaks: readonly number[];
  /** Writes the unit orientation of a key. */
  readonly key: (out: NumberStore, key: number) => void;
  readonly motion: SegmentMotion;
}

/**
 * Time gaps between keys, seconds. A gap below 1e-60 s counts as 1e-60 s: second powers of its reciprocal would leave float64.
 */
export function durations(times: Float64Array): Float64Array {
  const gaps = new Float64Array(Math.max(0, times.length - 1));
  for (let i = 0; i < gaps.length; i++) gaps[i] = Math.max(times[i + 1] - times[i], 1e-60);
  return gaps;
}

/**
 * The curve that plays keys by one `SegmentMotion`: finds the segment, holds outside the keys and after breaks, turns rates into
 * parent axes, adds lengths and compares peaks over segments. No keys give identity for ever.
 */
export function segmentedCurve(parts: SegmentedCurveParts): Curve {
  const { times, motion } = parts;
  const last = times.length - 1;
  const held = new Uint8Array(last + 1);
  for (const key of parts.breaks) held[key] = 1;
  const orientationNow = new Float64Array(4);
  const vectorNow = new Float64Array(3);

  function orientation<T extends NumberStore>(out: T, t: number): T {
    // A NaN time counts as before the start.
    if (last < 0) identity(out);
    else if (!(t > times[0])) parts.key(out, 0);
    else if (t >= times[last]) parts.key(out, last);
    else {
      const i = findSegment(times, t);
      if (held[i] || t === times[i]) parts.key(out, i);
      else motion.orientation(out, i, fraction(times, i, t));
    }
    return out;
  }

  function derivative<T extends NumberStore>(
    out: T,
    t: number,
    frame: Frame,
    kind: 'rate' | 'acceleration',
  ): T {
    const inside = last >= 1 && t >= times[0] && t <= times[last];
    const i = inside ? findSegment(times, t) : -1;
    if (i < 0 || held[i]) return still(out);
    if (frame === 'own') {
      motion[kind](out, i, fraction(times, i, t));
      return out;
    }
    // Not by way of `out`, which may hold fewer digits.
    motion[kind](vectorNow, i, fraction(times, i, t));
    return rotateVector(out, orientation(orientationNow, t), vectorNow);
  }

  // What turns at a constant rate says so once for all.
  const over = motion.acceleration === still ? stillOver : motion.accelerationOver?.bind(motion);

  return {
    start: last < 0 ? 0 : times[0],
    end: last < 0 ? 0 : times[last],
    continuity: last < 1 ? 2 : parts.breaks.some((key) => key < last) ? -1 : parts.continuity,
    knots: last < 0 ? new Float64Array(1) : times,
    orientation,
    rate: (out, t, frame) => derivative(out, t, frame, 'rate'),
    acceleration: (out, t, frame) => derivative(out, t, frame, 'acceleration'),
    ...turnedOver(times, motion, held),
    ...(over === undefined
      ? {}
      : {
          segmentAcceleration: (i: number): SegmentAcceleration => {
            const { u, peak, meanSquare } = over(i);
            return { peak, time: times[i] + u * (times[i + 1] - times[i]), meanSquare };
          },
        }),
  };
}

/** Lengths and peaks over stretches of time; those of whole segments are worked out once. */
function turnedOver(
  times: Float64Array,
  motion: SegmentMotion,
  held: Uint8Array,
): Pick<Curve, 'length' | 'peak'> {
  const count = Math.max(0, times.length - 1);
  const wholeLengths = new Float64Array(count).fill(NaN);
  const wholePeaks = new Float64Array(count).fill(NaN);
  const rateNow = new Float64Array(3);

  function lengthWithin(i: number, u0: number, u1: number): number {
    if (held[i] || u1 <= u0) return 0;
    if (u0 > 0 || u1 < 1) return motion.length(i, u0, u1);
    if (Number.isNaN(wholeLengths[i])) wholeLengths[i] = motion.length(i, 0, 1);
    return wholeLengths[i];
  }

  function peakWithin(i: number, u0: number, u1: number): number {
    if (u0 > 0 || u1 < 1) return motion.peakAt(i, u0, u1);
    if (Number.isNaN(wholePeaks[i])) wholePeaks[i] = motion.peakAt(i, 0, 1);
    return wholePeaks[i];
  }

  function length(t0: number, t1: number): number {
    const from = Math.max(times[0], Math.min(t0, t1));
    const to = Math.min(times[count], Math.max(t0, t1));
    if (count === 0 || !(from < to)) return 0;
    let sum = 0;
    for (let i = findSegment(times, from); i < count && times[i] < to; i++)
      sum += lengthWithin(i, fraction(times, i, from), fraction(times, i, to));
    return sum;
  }

  function peak(t0: number, t1: number): Peak {
    const best: Peak = { rate: 0, time: Math.min(t0, t1) };
    if (count === 0) return best;
    const from = Math.max(times[0], Math.min(t0, t1));
    const to = Math.min(times[count], Math.max(t0, t1));
    if (!(from <= to)) return best;
    best.time = from;
    let i = findSegment(times, from);
    do {
      if (!held[i]) {
        const u = peakWithin(i, fraction(times, i, from), fraction(times, i, to));
        motion.rate(rateNow, i, u);
        const rate = Math.sqrt(rateNow[0] ** 2 + rateNow[1] ** 2 + rateNow[2] ** 2);
        if (rate > best.rate) {
          best.rate = rate;
          best.time = times[i] + u * (times[i + 1] - times[i]);
        }
      }
      i++;
    } while (i < count && times[i] < to);
    return best;
  }

  return { length, peak };
}

function fraction(times: Float64Array, i: number, t: number): number {
  return Math.max(0, Math.min(1, (t - times[i]) / (times[i + 1] - times[i])));
}

function identity(out: NumberStore): void {
  out[0] = 0;
  out[1] = 0;
  out[2] = 0;
  out[3] = 1;
}

const STILL = Object.freeze({ u: 0, peak: 0, meanSquare: 0 });

function stillOver(): typeof STILL {
  return STILL;
}

/** Writes the rate, or the acceleration, of a thing that does not turn. */
export function still<T extends NumberStore>(out: T): T {
  out[0] = 0;
  out[1] = 0;
  out[2] = 0;
  return out;
}
