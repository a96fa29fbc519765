import type { NumberStore } from '../number-store.js';
import { unitScale } from '../quaternion/unit-scale.js';
import { greatest, type NarrowPlace } from './greatest.js';
import { integrate } from './integrate.js';
import type { SegmentMotion } from './segmented-curve.js';

/** One cubic of four components a segment, 16 numbers: the four of the constant, then those of u, u², u³, u from 0 to 1. */
export type CubicCoefficients = Float64Array;

/**
 * Cubic Hermite coefficients of one segment from its two values and its two tangents per unit of `u` (glTF 2.0 Appendix C,
 * sorted by powers). Scaled to numbers near 1: an orientation does not change with the length of its quaternion.
 */
export function hermiteCoefficients(
  out: CubicCoefficients,
  segment: number,
  from: ReadonlyFour,
  leaving: ReadonlyFour,
  to: ReadonlyFour,
  arriving: ReadonlyFour,
): void {
  let largest = 0;
  for (let k = 0; k < 4; k++)
    largest = Math.max(
      largest,
      Math.abs(from[k]),
      Math.abs(to[k]),
      Math.abs(leaving[k]),
      Math.abs(arriving[k]),
    );
  const scale = largest > 1e50 || largest < 1e-50 ? 1 / largest : 1;
  const at = 16 * segment;
  for (let k = 0; k < 4; k++) {
    const p0 = from[k] * scale;
    const p1 = to[k] * scale;
    const m0 = leaving[k] * scale;
    const m1 = arriving[k] * scale;
    out[at + k] = p0;
    out[at + 4 + k] = m0;
    out[at + 8 + k] = 3 * (p1 - p0) - 2 * m0 - m1;
    out[at + 12 + k] = 2 * (p0 - p1) + m0 + m1;
  }
}

type ReadonlyFour = Readonly<Pick<Float64Array, number>>;

/**
 * Motion of a cubic of the four components, made unit at every time, no care taken of signs. For any 4-vector curve p, with
 * primes by time: ω = 2 vec(p*p′)/|p|² and ω′ = 2 vec(p*p″)/|p|² − 2 (p·p′)/|p|²·ω, own axes.
 *
 * Near a sign change |p| comes close to zero and the speed has a peak as narrow as |p|/|p′|: it is looked for at the least |p|.
 * Where p has no length at all the orientation of the key before stands, and |p|² counts as 1e-60 so that rates stay finite.
 */
export function componentCubicMotion(coefficients: CubicCoefficients, gaps: Float64Array): SegmentMotion {
  const p = new Float64Array(4);
  const slope = new Float64Array(4);
  const bend = new Float64Array(4);
  const now = new Float64Array(3);

  function load(segment: number, u: number): void {
    const at = 16 * segment;
    for (let k = 0; k < 4; k++) {
      const c1 = coefficients[at + 4 + k];
      const c2 = coefficients[at + 8 + k];
      const c3 = coefficients[at + 12 + k];
      p[k] = coefficients[at + k] + u * (c1 + u * (c2 + u * c3));
      slope[k] = c1 + u * (2 * c2 + 3 * u * c3);
      bend[k] = 2 * c2 + 6 * u * c3;
    }
  }

  /** Rate by `u`, own axes; call after `load`. */
  function turning(out: NumberStore): void {
    const factor = 2 / squaredLength(p);
    out[0] = factor * (p[3] * slope[0] - p[0] * slope[3] - (p[1] * slope[2] - p[2] * slope[1]));
    out[1] = factor * (p[3] * slope[1] - p[1] * slope[3] - (p[2] * slope[0] - p[0] * slope[2]));
    out[2] = factor * (p[3] * slope[2] - p[2] * slope[3] - (p[0] * slope[1] - p[1] * slope[0]));
  }

  const speed =
    (segment: number) =>
    (u: number): number => {
      load(segment, u);
      turning(now);
      return Math.sqrt(now[0] ** 2 + now[1] ** 2 + now[2] ** 2);
    };

  return {
    orientation(out, segment, u) {
      load(segment, u);
      let scale = unitScale(p[0], p[1], p[2], p[3]);
      if (scale === 0) {
        load(segment, 0);
        scale = unitScale(p[0], p[1], p[2], p[3]);
      }
      for (let k = 0; k < 4; k++) out[k] = p[k] * scale;
    },
    rate(out, segment, u) {
      load(segment, u);
      turning(now);
      for (let axis = 0; axis < 3; axis++) out[axis] = now[axis] / gaps[segment];
    },
    acceleration(out, segment, u) {
      load(segment, u);
      turning(now);
      const factor = 2 / squaredLength(p);
      const drag = factor * (p[0] * slope[0] + p[1] * slope[1] + p[2] * slope[2] + p[3] * slope[3]);
      const x = factor * (p[3] * bend[0] - p[0] * bend[3] - (p[1] * bend[2] - p[2] * bend[1]));
      const y = factor * (p[3] * bend[1] - p[1] * bend[3] - (p[2] * bend[0] - p[0] * bend[2]));
      const z = factor * (p[3] * bend[2] - p[2] * bend[3] - (p[0] * bend[1] - p[1] * bend[0]));
      const gap = gaps[segment];
      out[0] = (x - drag * now[0]) / gap / gap;
      out[1] = (y - drag * now[1]) / gap / gap;
      out[2] = (z - drag * now[2]) / gap / gap;
    },
    length: (segment, u0, u1) =>
      integrate(speed(segment), u0, u1, narrowPlaces(coefficients, segment), 1e-16),
    peakAt: (segment, u0, u1) => greatest(speed(segment), u0, u1, narrowPlaces(coefficients, segment)),
  };
}

function squaredLength(p: Float64Array): number {
  return Math.max(1e-60, p[0] * p[0] + p[1] * p[1] + p[2] * p[2] + p[3] * p[3]);
}

/**
 * Where a segment's |p| has a minimum small enough to make the speed peak narrower than a search grid, and how narrow. The
 * minima are the roots, from negative to positive, of (|p|²)′/2 = p·p′, of degree 5.
 */
function narrowPlaces(coefficients: CubicCoefficients, segment: number): NarrowPlace[] {
  const at = 16 * segment;
  const squared = new Float64Array(7);
  for (let i = 0; i < 4; i++)
    for (let j = 0; j < 4; j++)
      for (let k = 0; k < 4; k++)
        squared[i + j] += coefficients[at + 4 * i + k] * coefficients[at + 4 * j + k];
  if (staysLong(squared)) return [];
  const slope = Array.from({ length: 6 }, (_, i) => (i + 1) * squared[i + 1]);
  return rootsWithin(slope, 0, 1).map((u) => ({ at: u, width: width(coefficients, at, u) }));
}

/** |p|/|p′| at `u`: the stretch of `u` over which a passing by zero takes place. */
function width(coefficients: CubicCoefficients, at: number, u: number): number {
  let long = 0;
  let fast = 0;
  for (let k = 0; k < 4; k++) {
    const [c0, c1, c2, c3] = [0, 4, 8, 12].map((power) => coefficients[at + power + k]);
    long += (c0 + u * (c1 + u * (c2 + u * c3))) ** 2;
    fast += (c1 + u * (2 * c2 + 3 * u * c3)) ** 2;
  }
  return fast > 0 ? Math.sqrt(long / fast) : 1;
}

const BINOMIAL_6 = [1, 6, 15, 20, 15, 6, 1];

/**
 * Whether |p|² (powers of u) surely stays above half of its largest Bernstein coefficient: the least coefficient on [0, 1] bounds the polynomial
 * from below. Then no minimum is narrow.
 */
function staysLong(squared: Float64Array): boolean {
  let least = Infinity;
  let most = 0;
  for (let i = 0; i <= 6; i++) {
    let bound = 0;
    // b_i = Σ_j C(i, j)/C(6, j) c_j
    let choose = 1;
    for (let j = 0; j <= i; j++) {
      bound += (choose / BINOMIAL_6[j]) * squared[j];
      choose = (choose * (i - j)) / (j + 1);
    }
    least = Math.min(least, bound);
    most = Math.max(most, bound);
  }
  return least > 0.5 * most;
}

/**
 * Real roots of a polynomial (coefficients from the constant up) in `[a, b]`, ascending: between the roots of its derivative it
 * is monotone, so each sign change is halved down to float64. Touching roots without a sign change are left out.
 */
function rootsWithin(polynomial: readonly number[], a: number, b: number): number[] {
  if (polynomial.length < 2) return [];
  const slope = polynomial.slice(1).map((c, i) => c * (i + 1));
  const edges = [a, ...rootsWithin(slope, a, b), b];
  const value = (x: number): number => polynomial.reduceRight((sum, c) => sum * x + c, 0);
  const roots: number[] = [];
  for (let i = 0; i + 1 < edges.length; i++) {
    let low = edges[i];
    let high = edges[i + 1];
    const rising = value(high) > 0;
    if (value(low) > 0 === rising) continue;
    for (let step = 0; step < 60 && low < high; step++) {
      const middle = (low + high) / 2;
      if (value(middle) > 0 === rising) high = middle;
      else low = middle;
    }
    roots.push((low + high) / 2);
  }
  return roots;
}
