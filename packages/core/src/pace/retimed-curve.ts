import type { Curve, Frame } from '../curve/curve.js';
import type { NumberStore } from '../number-store.js';
import { piecewisePeak } from './piecewise-peak.js';
import type { Retiming } from './retiming.js';

/** Share of a curve's time by which a place without a direction of turn is left to find one. */
const ASIDE = 1e-7;

/**
 * The curve played by another clock: the same path of orientations. With u the old time, ω_t = ω_u u̇ and ω̇_t = ω′_u u̇² + ω_u ü; where the pace is
 * given by angle, ω_t = v·n and ω̇_t = v̇·n + v²·dn/ds, with n the direction of ω and dn/ds what of ω′ is square to it, over |ω|². So a
 * path that is bent has its acceleration at constant speed, and a corner keeps its jump v·|Δn|.
 */
export function retimedCurve(curve: Curve, retiming: Retiming): Curve {
  const { start, end } = retiming;
  const oldKnots = new Map(Array.from(curve.knots, (knot) => [retiming.newTime(knot), knot]));
  const knots = knotsOf([...oldKnots.keys()], retiming);
  // Rounding must not put a knot into the piece before it.
  const oldTime = (t: number): number => oldKnots.get(t) ?? retiming.oldTime(t);
  const rateNow = new Float64Array(3);
  const accelerationNow = new Float64Array(3);
  const span = curve.end - curve.start;

  /** Writes the direction of turn at an old time, and its change by the angle turned. */
  function direct(old: number, frame: Frame): void {
    curve.rate(rateNow, old, frame);
    let speed = Math.hypot(rateNow[0], rateNow[1], rateNow[2]);
    let at = old;
    for (let step = ASIDE; !(speed > 0) && step < 1; step *= 32) {
      at = old + step * span <= curve.end ? old + step * span : old - step * span;
      curve.rate(rateNow, at, frame);
      speed = Math.hypot(rateNow[0], rateNow[1], rateNow[2]);
    }
    curve.acceleration(accelerationNow, at, frame);
    if (!(speed > 0)) {
      accelerationNow.fill(0);
      return;
    }
    let along = 0;
    for (let k = 0; k < 3; k++) {
      rateNow[k] /= speed;
      along += rateNow[k] * accelerationNow[k];
    }
    for (let k = 0; k < 3; k++)
      accelerationNow[k] = (accelerationNow[k] - along * rateNow[k]) / (speed * speed);
  }

  function derivative<T extends NumberStore>(out: T, t: number, frame: Frame, order: 1 | 2): T {
    if (!(t >= start && t <= end)) {
      for (let k = 0; k < 3; k++) out[k] = 0;
      return out;
    }
    const old = oldTime(t);
    const pace = retiming.paceAt(t);
    if (pace.by === 'time') {
      curve.rate(rateNow, old, frame);
      if (order === 2) curve.acceleration(accelerationNow, old, frame);
    } else direct(old, frame);
    for (let k = 0; k < 3; k++)
      out[k] =
        order === 1
          ? rateNow[k] * pace.speed
          : accelerationNow[k] * pace.speed ** 2 + rateNow[k] * pace.acceleration;
    return out;
  }

  const peakNow = new Float64Array(3);
  const speedAt = (t: number): number => {
    derivative(peakNow, t, 'own', 1);
    return Math.hypot(peakNow[0], peakNow[1], peakNow[2]);
  };

  return {
    start,
    end,
    continuity: smaller(curve.continuity, retiming.continuity),
    knots,
    orientation: (out, t) => curve.orientation(out, oldTime(t)),
    rate: (out, t, frame) => derivative(out, t, frame, 1),
    acceleration: (out, t, frame) => derivative(out, t, frame, 2),
    length: (t0, t1) => curve.length(oldTime(t0), oldTime(t1)),
    peak: (t0, t1) => piecewisePeak(speedAt, knots, t0, t1),
  };
}

function smaller<A extends number, B extends number>(a: A, b: B): A | B {
  return a < b ? a : b;
}

/** New times at which the path or its pace is not smooth, ascending, each once. */
function knotsOf(moved: readonly number[], { start, end, knots }: Retiming): Float64Array {
  const apart = 1e-12 * (end - start);
  const inside = [...knots, ...moved].filter((knot) => knot - start > apart && end - knot > apart);
  const all = Float64Array.from(inside);
  all.sort();
  const once = all.filter((knot, i) => i === 0 || knot - all[i - 1] > apart);
  return Float64Array.of(start, ...once, end);
}
