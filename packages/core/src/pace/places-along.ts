import type { Curve } from '../curve/curve.js';
import { greatest } from '../curve/greatest.js';
import type { Span } from './span-retiming.js';

/** Even places that each smooth piece of a curve is looked at, at least, and that the whole span gets about. */
const LEAST_PARTS = 4;
const WANTED_PLACES = 2000;

/** How far before a knot the side before it is looked at, as a share of its piece: a knot's own numbers are those after it. */
const BEFORE = 1e-9;

/** A curve at places along a span: two sides for each piece between neighbouring places, just after its start and just before its end. */
export interface Places {
  /** Old times, ascending. */
  readonly times: Float64Array;
  /** Angle turned from each place to the next, radians. */
  readonly angles: Float64Array;
  /** Speed at each side, rad/s. */
  readonly speeds: Float64Array;
  /** What of the acceleration is square to the turn at each side, rad/s²: ṡ²κ. */
  readonly across: Float64Array;
}

/** Places at the curve's knots, evenly between them, and at the `more` times. */
export function placesAlong(
  curve: Curve,
  span: Span,
  more: (rough: Float64Array) => readonly number[],
): Places {
  const rough = evenTimes(curve, span);
  const times = ascendingOnce([...rough, ...more(rough)]);
  const count = Math.max(0, times.length - 1);
  const angles = new Float64Array(count);
  const speeds = new Float64Array(2 * count);
  const across = new Float64Array(2 * count);
  const rate = new Float64Array(3);
  const acceleration = new Float64Array(3);
  for (let i = 0; i < count; i++) {
    angles[i] = curve.length(times[i], times[i + 1]);
    for (const side of [0, 1]) {
      const t = side === 0 ? times[i] : times[i + 1] - BEFORE * (times[i + 1] - times[i]);
      curve.rate(rate, t, 'own');
      curve.acceleration(acceleration, t, 'own');
      const speed = Math.hypot(rate[0], rate[1], rate[2]);
      const [x, y, z] = rate.map((part) => (speed > 0 ? part / speed : 0));
      const along = x * acceleration[0] + y * acceleration[1] + z * acceleration[2];
      speeds[2 * i + side] = speed;
      across[2 * i + side] =
        speed > 0
          ? Math.hypot(acceleration[0] - along * x, acceleration[1] - along * y, acceleration[2] - along * z)
          : 0;
    }
  }
  return { times, angles, speeds, across };
}

/** Times between places at which the speed passes `limit`. */
export function crossings(curve: Curve, times: Float64Array, limit: number): number[] {
  const rate = new Float64Array(3);
  const over = (t: number): boolean => {
    curve.rate(rate, t, 'own');
    return Math.hypot(rate[0], rate[1], rate[2]) > limit;
  };
  const found: number[] = [];
  for (let i = 0; i + 1 < times.length; i++) {
    let low = times[i];
    let high = times[i + 1] - BEFORE * (times[i + 1] - times[i]);
    const was = over(low);
    if (was === over(high)) continue;
    for (let round = 0; round < 50; round++) {
      const middle = (low + high) / 2;
      if (over(middle) === was) low = middle;
      else high = middle;
    }
    found.push((low + high) / 2);
  }
  return found;
}

/**
 * Times about each near-stop, where the turn may change its direction within v/|ω′| seconds: geometrically from an eighth of that on, as far as the
 * places are apart anyway.
 */
export function nearStops(curve: Curve, times: Float64Array): number[] {
  const now = new Float64Array(3);
  const speedAt = (t: number): number => {
    curve.rate(now, t, 'own');
    return Math.hypot(now[0], now[1], now[2]);
  };
  const speeds = times.map(speedAt);
  const low = 0.1 * speeds.reduce((most, speed) => Math.max(most, speed), 0);
  const found: number[] = [];
  for (let i = 1; i + 1 < times.length; i++) {
    if (!(speeds[i] < low && speeds[i] <= speeds[i - 1] && speeds[i] < speeds[i + 1])) continue;
    const at = greatest((t) => -speedAt(t), times[i - 1], times[i + 1]);
    const speed = speedAt(at);
    curve.acceleration(now, at, 'own');
    const width = Math.max(speed / Math.hypot(now[0], now[1], now[2]), 1e-9 * (times[i + 1] - times[i - 1]));
    found.push(at);
    for (let off = width / 8; off < times[i + 1] - times[i - 1]; off *= 1.1) found.push(at - off, at + off);
  }
  return found.filter((t) => t > times[0] && t < times[times.length - 1]);
}

function evenTimes(curve: Curve, [from, to]: Span): Float64Array {
  const knots = [from, ...curve.knots.filter((knot) => knot > from && knot < to), to];
  const parts = Math.max(LEAST_PARTS, Math.ceil(WANTED_PLACES / (knots.length - 1)));
  const times = knots
    .slice(1)
    .flatMap((knot, i) =>
      Array.from({ length: parts }, (_, part) => knots[i] + ((knot - knots[i]) * part) / parts),
    );
  return Float64Array.of(...times, to);
}

function ascendingOnce(numbers: readonly number[]): Float64Array {
  const ascending = Float64Array.from(numbers);
  ascending.sort();
  return ascending.filter((number, i) => i === 0 || number > ascending[i - 1]);
}
