import type { Curve } from '../curve/curve.js';

// Gauss–Legendre with eight points on [-1, 1]; published tables (from memory, checked by a test over polynomials).
const NODES = [0.1834346424956498, 0.525532409916329, 0.7966664774136267, 0.9602898564975363];
const WEIGHTS = [0.362683783378362, 0.31370664587788727, 0.22238103445337448, 0.10122853629037626];
/** Equal parts that every segment is cut into. */
const PARTS = 8;

/**
 * Calls `visit(time, weight)` at places inside the segments of a curve, never at a knot, such that Σ weight·f(time) is the integral
 * of f over [t0, t1], seconds, for every f that is smooth inside segments: 64 places a segment, eight by eight Gauss–Legendre.
 */
export function overSegments(
  curve: Curve,
  t0: number,
  t1: number,
  visit: (time: number, weight: number) => void,
): void {
  const { knots } = curve;
  for (let i = 0; i + 1 < knots.length; i++) {
    const from = Math.max(t0, knots[i]);
    const to = Math.min(t1, knots[i + 1]);
    if (!(from < to)) continue;
    const half = (to - from) / (2 * PARTS);
    for (let part = 0; part < PARTS; part++)
      for (let n = 0; n < NODES.length; n++) {
        const middle = from + (2 * part + 1) * half;
        visit(middle - half * NODES[n], half * WEIGHTS[n]);
        visit(middle + half * NODES[n], half * WEIGHTS[n]);
      }
  }
}
