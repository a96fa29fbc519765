import type { NumberStore } from '../number-store.js';
import { fromEuler } from '../quaternion/euler/from-euler.js';
import { axisOf, handOf, hasTwoAxes, isIntrinsic } from '../quaternion/euler/euler-sequence.js';
import { keyOrientation } from '../track/key-orientation.js';
import { playableTrack } from '../track/playable-track.js';
import type { RotationTrack } from '../track/rotation-track.js';
import type { Curve } from './curve.js';
import { integrate } from './integrate.js';
import { durations, segmentedCurve, type SegmentMotion } from './segmented-curve.js';

/** Radians: less than the rounding of one orientation. */
const ROUNDING = 1e-16;

/**
 * Three angles joined as numbers, turns kept: how a file of Euler angles is played by most programs. Not the short way and not
 * at constant speed. For EULER tracks alone. Keys that cannot be played are left out (`playableTrack`).
 */
export function eulerCurve(track: RotationTrack): Curve {
  const played = playableTrack(track);
  const { times, values, breaks, sequence = 'XYZ' } = played;
  return segmentedCurve({
    times,
    breaks,
    continuity: 0,
    key: (out, key) => void keyOrientation(out, played, key),
    motion: eulerMotion(values, durations(times), sequence),
  });
}

/**
 * A product of three turns about fixed axes A, B, C, each at a constant rate p, q, r (intrinsic ABC: q_A q_B q_C; extrinsic the
 * letters in reverse). With v = R_B⁻¹A, seen after the first two turns: ω₁ = p v + q B, ω₁′ = p q v × B, and in own axes
 * ω = R_C⁻¹ω₁ + r C, ω′ = R_C⁻¹(ω₁′ + ω₁ × r C). The speed hangs on the middle angle b alone: ω² = p² + q² + r² + 2pr·g, g = ±sin b
 * (three axes, + where they follow as x, y, z do) or cos b (two). Derived for this project.
 */
function eulerMotion(values: Float64Array, gaps: Float64Array, sequence: string): SegmentMotion {
  const first = isIntrinsic(sequence) ? 0 : 2;
  const last = first === 0 ? 2 : 0;
  const A = axisOf(sequence, first);
  const B = axisOf(sequence, 1);
  const C = axisOf(sequence, last);
  const third = 3 - A - B;
  const handBA = handOf(B, A);
  const two = hasTwoAxes(sequence);
  const hand = two ? 1 : handOf(A, B);
  const angles = new Float64Array(3);
  const before = new Float64Array(3);
  const v = new Float64Array(3);

  const step = (i: number, part: number): number => values[3 * i + 3 + part] - values[3 * i + part];
  const slope = (i: number, part: number): number => step(i, part) / gaps[i];
  const angle = (i: number, part: number, u: number): number => values[3 * i + part] + u * step(i, part);
  /** Angle whose sine is g without its hand. */
  const phase = (i: number, u: number): number => angle(i, 1, u) + (two ? Math.PI / 2 : 0);

  /** `v`, and in `before` the rate ω₁. */
  function load(i: number, u: number): void {
    const b = angle(i, 1, u);
    v.fill(0);
    v[A] = Math.cos(b);
    v[third] = -handBA * Math.sin(b);
    const p = slope(i, first);
    for (let axis = 0; axis < 3; axis++) before[axis] = p * v[axis];
    before[B] += slope(i, 1);
  }

  /** R_C⁻¹x, by a turn of −c in the plane across C. */
  function turnBack(out: NumberStore, x: Float64Array, c: number): void {
    const j = (C + 1) % 3;
    const k = (C + 2) % 3;
    const cosine = Math.cos(c);
    const sine = Math.sin(c);
    const xj = x[j];
    const xk = x[k];
    out[C] = x[C];
    out[j] = cosine * xj + sine * xk;
    out[k] = cosine * xk - sine * xj;
  }

  /** Twice the product of the outer rates, signed so that a greater sine of the phase makes it faster; of steps, not rates. */
  const coupling = (i: number): number => 2 * hand * step(i, first) * step(i, last);

  /** Radians turned per unit of `u`. A sum of squares, so that nothing cancels where the outer turns undo each other. */
  function speed(i: number, u: number): number {
    const outer = Math.abs(step(i, first)) - Math.abs(step(i, last));
    const quarter = phase(i, u) / 2 + Math.PI / 4;
    const k = coupling(i);
    const half = k >= 0 ? Math.sin(quarter) : Math.cos(quarter);
    return Math.sqrt(outer * outer + step(i, 1) ** 2 + 2 * Math.abs(k) * half * half);
  }

  return {
    orientation(out, i, u) {
      for (let part = 0; part < 3; part++) angles[part] = angle(i, part, u);
      fromEuler(out, angles, sequence);
    },
    rate(out, i, u) {
      load(i, u);
      turnBack(out, before, angle(i, last, u));
      out[C] += slope(i, last);
    },
    acceleration(out, i, u) {
      load(i, u);
      const pq = slope(i, first) * slope(i, 1);
      const r = slope(i, last);
      addCross(before, v, B, pq, before, C, r);
      turnBack(out, before, angle(i, last, u));
    },
    length(i, u0, u1) {
      if (coupling(i) === 0 || step(i, 1) === 0) return (u1 - u0) * speed(i, u0);
      return integrate((u) => speed(i, u), u0, u1, [], ROUNDING);
    },
    peakAt(i, u0, u1) {
      const k = coupling(i);
      const middle = step(i, 1);
      if (k === 0 || middle === 0) return u0;
      const crest = k > 0 ? Math.PI / 2 : -Math.PI / 2;
      const from = phase(i, u0);
      const turns = (from - crest) / (2 * Math.PI);
      const whole = middle > 0 ? Math.ceil(turns) : Math.floor(turns);
      const u = u0 + (crest + 2 * Math.PI * whole - from) / middle;
      if (u <= u1) return u;
      return speed(i, u1) > speed(i, u0) ? u1 : u0;
    },
  };
}

/** Writes s·(a × unit axis m) + t·(b × unit axis n). `out` may be `a` or `b`. */
function addCross(
  out: Float64Array,
  a: Float64Array,
  m: number,
  s: number,
  b: Float64Array,
  n: number,
  t: number,
): void {
  const m1 = (m + 1) % 3;
  const m2 = (m + 2) % 3;
  const n1 = (n + 1) % 3;
  const n2 = (n + 2) % 3;
  const am1 = s * a[m1];
  const am2 = s * a[m2];
  const bn1 = t * b[n1];
  const bn2 = t * b[n2];
  out.fill(0);
  out[m1] += am2;
  out[m2] -= am1;
  out[n1] += bn2;
  out[n2] -= bn1;
}
