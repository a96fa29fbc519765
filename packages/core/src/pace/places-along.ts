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

/** What is asked of places. */
export interface PlacesWanted {
  /** Further times, by those that there are. */
  readonly more?: (rough: Float64Array) => readonly number[];
  /** Whether pieces that turn at one speed about one axis need no places inside. */
  readonly skipLevel?: boolean;
  /** Whether `across` is not needed, and left at 0. */
  readonly skipBends?: boolean;
}

/** Places at the curve's knots, evenly between them, and at the `more` times. */
export function placesAlong(
  curve: Curve,
  span: Span,
  { more, skipLevel = false, skipBends = false }: PlacesWanted = {},
): Places {
  const rough = evenTimes(curve, span, skipLevel);
  const further = more?.(rough) ?? [];
  const times = further.length > 0 ? ascendingOnce([...rough, ...further]) : rough;
  const count = Math.max(0, times.length - 1);
  const angles = new Float64Array(count);
  const speeds = new Float64Array(2 * count);
  const across = new Float64Array(2 * count);
  const rate = new Float64Array(3);
  const acceleration = new Float64Array(3);
  const look = (side: number, t: number): void => {
    curve.rate(rate, t, 'own');
    const speed = Math.hypot(rate[0], rate[1], rate[2]);
    speeds[side] = speed;
    if (skipBends || !(speed > 0)) return;
    curve.acceleration(acceleration, t, 'own');
    const along =
      (rate[0] * acceleration[0] + rate[1] * acceleration[1] + rate[2] * acceleration[2]) / (speed * speed);
    across[side] = Math.hypot(
      acceleration[0] - along * rate[0],
      acceleration[1] - along * rate[1],
      acceleration[2] - along * rate[2],
    );
  };
  for (let i = 0; i < count; i++) {
    angles[i] = curve.length(times[i], times[i + 1]);
    look(2 * i, times[i]);
    look(2 * i + 1, times[i + 1] - BEFORE * (times[i + 1] - times[i]));
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

function evenTimes(curve: Curve, [from, to]: Span, skipLevel: boolean): Float64Array {
  const inside = curve.knots.filter((knot) => knot > from && knot < to);
  const parts = Math.max(LEAST_PARTS, Math.ceil(WANTED_PLACES / (inside.length + 1)));
  const times = new Float64Array((inside.length + 1) * parts + 1);
  let count = 0;
  for (let i = 0; i <= inside.length; i++) {
    const a = i === 0 ? from : inside[i - 1];
    const b = i === inside.length ? to : inside[i];
    const own = skipLevel && isLevel(curve, a, b) ? 1 : parts;
    for (let part = 0; part < own; part++) times[count++] = a + ((b - a) * part) / own;
  }
  times[count++] = to;
  return times.subarray(0, count);
}

/** Great arcs, and rests, say exactly at every place that they do not accelerate. */
function isLevel(curve: Curve, a: number, b: number): boolean {
  const now = new Float64Array(3);
  return [0.1, 0.5, 0.8].every((u) => {
    curve.acceleration(now, a + u * (b - a), 'own');
    return now[0] === 0 && now[1] === 0 && now[2] === 0;
  });
}

function ascendingOnce(numbers: readonly number[]): Float64Array {
  const ascending = Float64Array.from(numbers);
  ascending.sort();
  return ascending.filter((number, i) => i === 0 || number > ascending[i - 1]);
}
