import type { NumberStore } from '../number-store.js';
import { conjugate } from '../quaternion/conjugate.js';
import { expMap } from '../quaternion/exp-map.js';
import { logMapLong } from '../quaternion/log-map.js';
import { relative } from '../quaternion/relative.js';
import { rotateVector } from '../quaternion/rotate-vector.js';
import { slerpAsStored } from '../quaternion/slerp.js';
import { squad } from '../quaternion/squad.js';
import { chartToRate, chartTwist, rateToChart } from './chart-rate.js';
import type { Curve } from './curve.js';
import { withNumericLength } from './numeric-motion.js';
import { durations, segmentedCurve, type SegmentMotion } from './segmented-curve.js';
import { copyKey } from './unit-keys.js';

export interface SquadParts {
  readonly times: Float64Array;
  readonly breaks: readonly number[];
  /** Unit, each on the side of the one before, four numbers a key. */
  readonly keys: Float64Array;
  /** Inner point by which each segment leaves its first key, four numbers a segment. */
  readonly leaving: Float64Array;
  /** Inner point by which each segment arrives at its last key. */
  readonly arriving: Float64Array;
  readonly continuity: 0 | 1;
}

/** Spherical quadrangles through the keys by given inner points (see `squad`). */
export function squadCurve(parts: SquadParts): Curve {
  const gaps = durations(parts.times);
  return segmentedCurve({
    times: parts.times,
    breaks: parts.breaks,
    continuity: parts.continuity,
    key: (out, key) => copyKey(out, parts.keys, key),
    motion: withNumericLength(squadMotion(parts, gaps), gaps),
  });
}

/**
 * Exact rate and acceleration of squad, by `u`, then by time (derived for this project; checked against fifty-digit values):
 * φ = Log(q₀⁻¹q₁), γ = Log(a⁻¹b), S = q₀Exp(uφ), C = a Exp(uγ), D = S*C, δ = Log D, s = D⁻¹φD, with logs that keep the sign;
 * ω_D = γ − s, ω_D′ = ω_D × s; δ′ = J⁻¹ω_D, δ″ = J⁻¹(ω_D′ − N(δ, δ′));
 * g = 2u(1 − u), x = gδ, E = Exp(x), e = E⁻¹φE; q = S E, ω = Jx′ + e, ω′ = Jx″ + N(x, x′) − (Jx′) × e.
 */
function squadMotion(parts: SquadParts, gaps: Float64Array): Omit<SegmentMotion, 'length' | 'peakAt'> {
  const [q0, q1, a, b, outer, inner, back] = Array.from({ length: 7 }, four);
  const [phi, gamma, delta, s, turn, x, velocity, carried, change, bend, twist] = Array.from(
    { length: 11 },
    three,
  );

  function points(i: number): void {
    copyKey(q0, parts.keys, i);
    copyKey(q1, parts.keys, i + 1);
    copyKey(a, parts.leaving, i);
    copyKey(b, parts.arriving, i);
  }

  /** Fills `delta`, `turn` = ω_D, `s`, `change` = δ′, `x`, `velocity` = Jx′ and `carried` = e. */
  function load(i: number, u: number): void {
    points(i);
    logMapLong(phi, relative(back, q0, q1));
    logMapLong(gamma, relative(back, a, b));
    slerpAsStored(outer, q0, q1, u);
    slerpAsStored(inner, a, b, u);
    relative(inner, outer, inner);
    logMapLong(delta, inner);
    rotateVector(s, conjugate(back, inner), phi);
    const g = 2 * u * (1 - u);
    const slope = 2 - 4 * u;
    for (let k = 0; k < 3; k++) turn[k] = gamma[k] - s[k];
    rateToChart(change, delta, turn);
    for (let k = 0; k < 3; k++) {
      x[k] = g * delta[k];
      velocity[k] = slope * delta[k] + g * change[k];
    }
    rotateVector(carried, conjugate(back, expMap(back, x)), phi);
  }

  /** Fills `bend` = x″; call after `load`. */
  function loadBend(u: number): void {
    const g = 2 * u * (1 - u);
    const slope = 2 - 4 * u;
    cross(bend, turn, s);
    chartTwist(twist, delta, change);
    for (let k = 0; k < 3; k++) bend[k] -= twist[k];
    rateToChart(bend, delta, bend);
    for (let k = 0; k < 3; k++) bend[k] = -4 * delta[k] + 2 * slope * change[k] + g * bend[k];
  }

  return {
    orientation(out, i, u) {
      points(i);
      squad(out, q0, a, b, q1, u);
    },
    rate(out, i, u) {
      load(i, u);
      chartToRate(velocity, x, velocity);
      for (let k = 0; k < 3; k++) out[k] = (velocity[k] + carried[k]) / gaps[i];
    },
    acceleration(out, i, u) {
      load(i, u);
      loadBend(u);
      chartTwist(twist, x, velocity);
      chartToRate(bend, x, bend);
      chartToRate(velocity, x, velocity);
      cross(s, velocity, carried);
      for (let k = 0; k < 3; k++) out[k] = (bend[k] + twist[k] - s[k]) / gaps[i] / gaps[i];
    },
  };
}

const four = (): Float64Array => new Float64Array(4);
const three = (): Float64Array => new Float64Array(3);

/** `out` may be neither input. */
function cross(out: NumberStore, a: Float64Array, b: Float64Array): void {
  out[0] = a[1] * b[2] - a[2] * b[1];
  out[1] = a[2] * b[0] - a[0] * b[2];
  out[2] = a[0] * b[1] - a[1] * b[0];
}
