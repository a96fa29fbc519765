import { greatest } from '../curve/greatest.js';
import { SlewcurveError } from '../errors.js';
import type { Ease } from './ease.js';

/**
 * `cubic-bezier(x1, y1, x2, y2)` of W3C CSS Easing Functions Level 1: the curve from (0, 0) to (1, 1) by handles (x1, y1) and (x2, y2), read
 * as y over x. Its speed is infinite where it stands upright, its acceleration at an end whose handle has no length. With handles beyond 0
 * to 1 in y it may run past its ends and back; such a one is an ease, but no pace.
 *
 * Before 0 and after 1 the position goes on along the end tangents, as that text says (from memory): towards the first handle that
 * stands off the end; an upright tangent counts as level.
 *
 * @throws SlewcurveError `ease.bad-handle` where an x is outside 0 to 1 or a number is not finite
 */
export function cubicBezierEase(x1: number, y1: number, x2: number, y2: number): Ease {
  if (![x1, y1, x2, y2].every(Number.isFinite) || !(x1 >= 0 && x1 <= 1 && x2 >= 0 && x2 <= 1))
    throw new SlewcurveError(
      'ease.bad-handle',
      `The handles of cubic-bezier(${x1}, ${y1}, ${x2}, ${y2}) must be finite, with x from 0 to 1.`,
    );
  const name = `cubic-bezier(${x1}, ${y1}, ${x2}, ${y2})`;
  const straight = x1 === y1 && x2 === y2;
  const x = cubic(x1, x2);
  const y = cubic(y1, y2);
  const before = outerSlope(x1, y1, x2, y2);
  const after = outerSlope(1 - x2, 1 - y2, 1 - x1, 1 - y1);
  const derivative =
    (order: 1 | 2 | 3) =>
    (u: number): number =>
      straight ? (order === 1 ? 1 : 0) : derivatives(x, y, placeAt(x, Math.max(0, Math.min(1, u))), order);
  const speed = derivative(1);
  const peakOf = (f: (u: number) => number): number => {
    const size = (u: number): number => Math.abs(f(u));
    return size(greatest(size, 0, 1, ENDS));
  };
  return Object.freeze({
    name,
    peakSpeed: speed(greatest(speed, 0, 1, ENDS)),
    peakAcceleration: peakOf(derivative(2)),
    peakJerk: peakOf(derivative(3)),
    jumps: speed(0) === 0 && speed(1) === 0 ? 'acceleration' : 'speed',
    knots: Object.freeze([0, 1]),
    position(u) {
      if (u <= 0) return u === 0 ? 0 : u * before;
      if (u >= 1) return u === 1 ? 1 : 1 + (u - 1) * after;
      return straight ? u : y.at(placeAt(x, u));
    },
    speed,
    acceleration: derivative(2),
  } satisfies Ease);
}

const ENDS = [
  { at: 0, width: 1e-9 },
  { at: 1, width: 1e-9 },
] as const;

/** Value and derivatives of one coordinate by the curve's own parameter, 0 to 1. */
interface Cubic {
  at(s: number): number;
  first(s: number): number;
  second(s: number): number;
  readonly third: number;
}

function cubic(p: number, q: number): Cubic {
  const r = 1 - q;
  return {
    at: (s) => s * (3 * (1 - s) ** 2 * p + 3 * (1 - s) * s * q + s * s),
    first: (s) => 3 * ((1 - s) ** 2 * p + 2 * (1 - s) * s * (q - p) + s * s * r),
    second: (s) => 6 * ((1 - s) * (q - 2 * p) + s * (1 - 2 * q + p)),
    third: 6 * (1 + 3 * p - 3 * q),
  };
}

/** The parameter at which x is `u`: Newton kept inside a bracket, which halves where the slope is no help. x never falls. */
function placeAt(x: Cubic, u: number): number {
  if (u === 0 || u === 1) return u;
  let low = 0;
  let high = 1;
  let s = u;
  for (let i = 0; i < 64; i++) {
    const miss = x.at(s) - u;
    if (miss === 0) return s;
    if (miss > 0) high = s;
    else low = s;
    const next = s - miss / x.first(s);
    const after = next > low && next < high ? next : (low + high) / 2;
    if (Math.abs(after - s) <= 1e-16 * s) return after;
    s = after;
  }
  return s;
}

/** dy/dx, d²y/dx² or d³y/dx³. At an end with a handle of no length: the limits, by the curve's higher derivatives. */
function derivatives(x: Cubic, y: Cubic, s: number, order: 1 | 2 | 3): number {
  const [x1, y1, x2, y2] = [x.first(s), y.first(s), x.second(s), y.second(s)];
  if (x1 === 0) return order === 1 ? limitSlope(x, y, s) : Infinity;
  if (order === 1) return y1 / x1;
  const turn = y2 * x1 - y1 * x2;
  if (order === 2) return turn / x1 ** 3;
  return ((y.third * x1 - y1 * x.third) * x1 - 3 * turn * x2) / x1 ** 5;
}

function limitSlope(x: Cubic, y: Cubic, s: number): number {
  for (const [dx, dy] of [
    [x.first(s), y.first(s)],
    [x.second(s), y.second(s)],
    [x.third, y.third],
  ] as const) {
    if (dx !== 0) return Math.abs(dy / dx);
    if (dy !== 0) return Infinity;
  }
  return 0;
}

/** Slope outside the ends, seen from (0, 0) with the handles in order. */
function outerSlope(x1: number, y1: number, x2: number, y2: number): number {
  if (x1 > 0) return y1 / x1;
  if (y1 !== 0) return 0;
  if (x2 > 0) return y2 / x2;
  return y2 === 0 ? 1 : 0;
}
