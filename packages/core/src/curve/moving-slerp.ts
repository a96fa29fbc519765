import { conjugate } from '../quaternion/conjugate.js';
import { expMap } from '../quaternion/exp-map.js';
import { logMapLong } from '../quaternion/log-map.js';
import { multiply } from '../quaternion/multiply.js';
import { relative } from '../quaternion/relative.js';
import { rotateVector } from '../quaternion/rotate-vector.js';
import { chartToRate, chartTwist, rateToChart } from './chart-rate.js';
import type { MotionState } from './state-curve.js';

/** A fraction that moves: its value, first and second derivative. */
export interface MovingFraction {
  readonly value: number;
  readonly slope: number;
  readonly bend: number;
}

/**
 * Great-arc interpolation between two motions by a moving fraction, with exact rate and acceleration; signs as they stand tell
 * the way. Derivatives of the answer are by what those of the inputs are by. `out` may be `a` or `b`.
 *
 * With D = a⁻¹b, δ = Log D, s = D⁻¹ω_a D: ω_D = ω_b − s, ω_D′ = ω_b′ − D⁻¹ω_a′D − s × ω_D; δ′ = J⁻¹ω_D, δ″ = J⁻¹(ω_D′ − N(δ, δ′));
 * x = gδ and its derivatives; E = Exp(x), e = E⁻¹ω_a E: q = aE, ω = e + Jx′, ω′ = E⁻¹ω_a′E + e × Jx′ + Jx″ + N(x, x′). Derived here.
 */
export function movingSlerp(): (out: MotionState, a: MotionState, b: MotionState, g: MovingFraction) => void {
  const [d, back, from] = Array.from({ length: 3 }, () => new Float64Array(4));
  const [delta, s, turn, change, bend, twist, x, velocity, carried, carriedTurn] = Array.from(
    { length: 10 },
    () => new Float64Array(3),
  );
  return (out, a, b, g) => {
    relative(d, a.orientation, b.orientation);
    logMapLong(delta, d);
    conjugate(back, d);
    rotateVector(s, back, a.rate);
    rotateVector(carriedTurn, back, a.acceleration);
    for (let k = 0; k < 3; k++) turn[k] = b.rate[k] - s[k];
    for (let k = 0; k < 3; k++) bend[k] = b.acceleration[k] - carriedTurn[k];
    addCross(bend, turn, s);
    rateToChart(change, delta, turn);
    chartTwist(twist, delta, change);
    for (let k = 0; k < 3; k++) bend[k] -= twist[k];
    rateToChart(bend, delta, bend);
    for (let k = 0; k < 3; k++) {
      x[k] = g.value * delta[k];
      velocity[k] = g.slope * delta[k] + g.value * change[k];
      bend[k] = g.bend * delta[k] + 2 * g.slope * change[k] + g.value * bend[k];
    }
    conjugate(back, expMap(d, x));
    rotateVector(carried, back, a.rate);
    rotateVector(carriedTurn, back, a.acceleration);
    from.set(a.orientation);
    multiply(out.orientation, from, d);
    chartTwist(twist, x, velocity);
    chartToRate(velocity, x, velocity);
    chartToRate(bend, x, bend);
    for (let k = 0; k < 3; k++) {
      out.rate[k] = carried[k] + velocity[k];
      out.acceleration[k] = carriedTurn[k] + bend[k] + twist[k];
    }
    addCross(out.acceleration, carried, velocity);
  };
}

/** out + a × b, in place. */
function addCross(out: Float64Array, a: Float64Array, b: Float64Array): void {
  const x = a[1] * b[2] - a[2] * b[1];
  const y = a[2] * b[0] - a[0] * b[2];
  const z = a[0] * b[1] - a[1] * b[0];
  out[0] += x;
  out[1] += y;
  out[2] += z;
}
