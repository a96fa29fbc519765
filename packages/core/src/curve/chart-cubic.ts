import { expMap } from '../quaternion/exp-map.js';
import { multiply } from '../quaternion/multiply.js';
import { chartToRate, chartTwist } from './chart-rate.js';
import type { MotionState } from './state-curve.js';

/** Cubic rotation vectors r(t), one a segment, by their ends; three numbers a segment where not told otherwise. */
export interface ChartCubic {
  /** r at the start; absent where it starts from 0. */
  readonly from?: Float64Array;
  /** r at the end less r at the start. */
  readonly chords: Float64Array;
  /** r′ at the start, then r′ at the end, per second; six numbers a segment. */
  readonly slopes: Float64Array;
}

/**
 * The motion q = origin · Exp(r(t)) of cubics r, with exact derivatives: ω = J r′, ω′ = J r″ + N(r, r′) (see `chart-rate`). One
 * state, overwritten by every call. `origin` is a unit quaternion.
 */
export function chartCubicMotion({
  from,
  chords,
  slopes,
}: ChartCubic): (origin: Float64Array, segment: number, u: number, h: number) => MotionState {
  const orientation = new Float64Array(4);
  const rate = new Float64Array(3);
  const acceleration = new Float64Array(3);
  const [r, velocity, twist] = Array.from({ length: 3 }, () => new Float64Array(3));
  const state = { orientation, rate, acceleration };
  return (origin, segment, u, h) => {
    const v = 1 - u;
    for (let k = 0; k < 3; k++) {
      const chord = chords[3 * segment + k];
      const leave = slopes[6 * segment + k] * h - chord;
      const arrive = slopes[6 * segment + 3 + k] * h - chord;
      r[k] = u * chord + u * v * (v * leave - u * arrive);
      if (from !== undefined) r[k] += from[3 * segment + k];
      velocity[k] = (chord + v * (1 - 3 * u) * leave - u * (2 - 3 * u) * arrive) / h;
      acceleration[k] = ((6 * u - 4) * leave + (6 * u - 2) * arrive) / h / h;
    }
    multiply(orientation, origin, expMap(orientation, r));
    chartTwist(twist, r, velocity);
    chartToRate(rate, r, velocity);
    chartToRate(acceleration, r, acceleration);
    for (let k = 0; k < 3; k++) acceleration[k] += twist[k];
    return state;
  };
}
