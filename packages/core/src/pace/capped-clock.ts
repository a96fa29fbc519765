import type { Curve } from '../curve/curve.js';
import { clockAtSpeeds } from './clock-at-speeds.js';
import { type Places, crossings, nearStops, placesAlong } from './places-along.js';
import type { InnerClock, Span } from './span-retiming.js';

/** Limits of turning, rad/s and rad/s². */
export interface Limits {
  readonly rate: number;
  /** Of the whole acceleration, bends included: s̈² + (ṡ²κ)² at most its square. Default: not limited. */
  readonly acceleration?: number;
  /** With a limit of acceleration: times at which it is to stand still for a moment, as at corners. Knots of the curve, seconds. */
  readonly stops?: readonly number[];
}

/** A speed within this of what the curve has, as a share, is what it has. */
const ALIKE = 1e-6;

/** Below this share of the greatest speed it rests. */
const STILL = 1e-9;

/**
 * Slows a curve down where it is over a limit, and nowhere else; it is never made faster. Without a limit of acceleration the time grows by
 * ∫dS(1/v − 1/s) over the excess. With one, the greatest squared speeds z = ṡ² along the path with z ≤ v², z ≤ what the curve has, and
 * (z′/2)² + (zκ)² ≤ a² are found by a pass forward and a pass back over the places, as time-optimal control along a given path does (J. E. Bobrow,
 * S. Dubowsky and J. S. Gibson 1985; from memory): nothing faster keeps the limits at these places.
 *
 * Only where the curve's rate is continuous are its bends finite; at a corner the limit of acceleration means nothing. Ends keep the speed that they
 * have, as far as the limits let them; so do corners, unless they are stops.
 */
export function cappedClock(curve: Curve, span: Span, limits: Limits): InnerClock {
  const isBent = limits.acceleration !== undefined;
  const places = placesAlong(curve, span, {
    more: (rough) => [...crossings(curve, rough, limits.rate), ...(isBent ? nearStops(curve, rough) : [])],
    skipLevel: !isBent,
    skipBends: !isBent,
  });
  const speeds = places.speeds.map((speed) => Math.min(speed, limits.rate));
  if (limits.acceleration !== undefined)
    slowForAcceleration(speeds, places, limits.acceleration, new Set(limits.stops));
  const same = Uint8Array.from(places.angles, (_, i) =>
    Number([2 * i, 2 * i + 1].every((side) => speeds[side] >= places.speeds[side] * (1 - ALIKE))),
  );
  return clockAtSpeeds(curve, { ...places, speeds, same });
}

/** Lowers speeds, in place, until no piece between two places needs more acceleration than the limit. */
function slowForAcceleration(
  speeds: Float64Array,
  places: Places,
  limit: number,
  stops: ReadonlySet<number>,
): void {
  const { angles, times } = places;
  const count = angles.length;
  // Where it as good as rests, bends are rounding over nothing.
  const still = STILL * places.speeds.reduce((most, speed) => Math.max(most, speed), 0);
  const squares = speeds.map((speed, side) => {
    const across = places.across[side];
    return across > limit && places.speeds[side] > still
      ? Math.min(speed, places.speeds[side] * Math.sqrt(limit / across)) ** 2
      : speed ** 2;
  });
  const bends = places.across.map((across, side) =>
    places.speeds[side] > still ? across / places.speeds[side] ** 2 : 0,
  );
  // The rate does not jump: both sides of a place share the lower speed.
  const meet = (place: number): void => {
    if (place === 0 || place === count) return;
    const lower = stops.has(times[place]) ? 0 : Math.min(squares[2 * place - 1], squares[2 * place]);
    squares[2 * place - 1] = lower;
    squares[2 * place] = lower;
  };
  for (let place = 0; place <= count; place++) meet(place);
  for (let i = 0; i < count; i++) {
    squares[2 * i + 1] = Math.min(
      squares[2 * i + 1],
      reached(squares, bends, angles[i], 2 * i, 2 * i + 1, limit),
    );
    meet(i + 1);
  }
  for (let i = count - 1; i >= 0; i--) {
    squares[2 * i] = Math.min(squares[2 * i], reached(squares, bends, angles[i], 2 * i + 1, 2 * i, limit));
    meet(i);
  }
  squares.forEach((square, side) => (speeds[side] = Math.sqrt(square)));
}

/** The greatest squared speed at side `there` that side `here` lets: what both bends leave of the limit drives it over the angle. */
function reached(
  squares: Float64Array,
  bends: Float64Array,
  angle: number,
  here: number,
  there: number,
  limit: number,
): number {
  const left = (square: number, side: number): number =>
    Math.sqrt(Math.max(0, limit ** 2 - (square * bends[side]) ** 2));
  const from = squares[here];
  const most = from + 2 * angle * left(from, here);
  if (left(most, there) >= left(from, here)) return most;
  let low = from;
  let high = most;
  for (let i = 0; i < 40; i++) {
    const middle = (low + high) / 2;
    if (middle <= from + 2 * angle * left(middle, there)) low = middle;
    else high = middle;
  }
  return low;
}
