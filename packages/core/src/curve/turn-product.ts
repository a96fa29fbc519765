import type { NumberStore } from '../number-store.js';
import { expMap } from '../quaternion/exp-map.js';
import { conjugate } from '../quaternion/conjugate.js';
import { multiply } from '../quaternion/multiply.js';
import { rotateVector } from '../quaternion/rotate-vector.js';

/** Orientation, and rate and acceleration in own axes, of a product of turns that is being multiplied up. */
export interface TurnProduct {
  readonly orientation: Float64Array;
  readonly rate: Float64Array;
  readonly acceleration: Float64Array;
  /** Starts from a fixed orientation. */
  reset(q: NumberStore): void;
  /** Multiplies by Exp(b·r) from the right, `b` changing at `slope` and `bend` (first and second derivative). */
  turn(r: Float64Array, b: number, slope: number, bend: number): void;
}

/**
 * Products q₀ Π Exp(b_k(t) r_k) with fixed r_k, and their exact derivatives. For each factor E = Exp(b r), with w = E⁻¹ω and
 * v = b′r: ω′ ← E⁻¹ω′ + w × v + b″r, ω ← w + v (the recursion of Sommer et al., CVPR 2020, arXiv 1911.08860; derived again here).
 */
export function turnProduct(): TurnProduct {
  const orientation = new Float64Array(4);
  const rate = new Float64Array(3);
  const acceleration = new Float64Array(3);
  const factor = new Float64Array(4);
  const scaled = new Float64Array(3);
  return {
    orientation,
    rate,
    acceleration,
    reset(q) {
      for (let k = 0; k < 4; k++) orientation[k] = q[k];
      rate.fill(0);
      acceleration.fill(0);
    },
    turn(r, b, slope, bend) {
      for (let k = 0; k < 3; k++) scaled[k] = b * r[k];
      expMap(factor, scaled);
      multiply(orientation, orientation, factor);
      conjugate(factor, factor);
      rotateVector(rate, factor, rate);
      rotateVector(acceleration, factor, acceleration);
      const vx = slope * r[0];
      const vy = slope * r[1];
      const vz = slope * r[2];
      acceleration[0] += rate[1] * vz - rate[2] * vy + bend * r[0];
      acceleration[1] += rate[2] * vx - rate[0] * vz + bend * r[1];
      acceleration[2] += rate[0] * vy - rate[1] * vx + bend * r[2];
      rate[0] += vx;
      rate[1] += vy;
      rate[2] += vz;
    },
  };
}
