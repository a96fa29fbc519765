import { type Curve, angleBetween, dot, normalise } from '@slewcurve/core';
import { tangentFor } from '../stored-key.js';

/** Halvings of one stretch at the most. */
const MOST_HALVINGS = 8;

/** Times between two others at which a CUBICSPLINE track needs keys to stay within `near` radians of a curve, when every key has the curve's own tangents. */
export function cubicPlaces(curve: Curve, from: number, to: number, near: number, halvings = 0): number[] {
  if (halvings === MOST_HALVINGS || cubicMiss(curve, from, to) <= near) return [];
  const middle = (from + to) / 2;
  return [
    ...cubicPlaces(curve, from, middle, near, halvings + 1),
    middle,
    ...cubicPlaces(curve, middle, to, near, halvings + 1),
  ];
}

/** How far glTF 2.0's cubic with the curve's own ends and tangents is off the curve, radians. */
function cubicMiss(curve: Curve, from: number, to: number): number {
  const h = to - from;
  const a = curve.orientation(new Float64Array(4), from);
  const b = curve.orientation(new Float64Array(4), to);
  if (dot(a, b) < 0) b.forEach((part, i) => (b[i] = -part));
  const leaving = tangentFor(a, curve.rate(new Float64Array(3), from, 'own'));
  const arriving = tangentFor(b, curve.rate(new Float64Array(3), to - 1e-9 * h, 'own'));
  let most = 0;
  for (const u of [0.25, 0.5, 0.75]) {
    const [p, q] = [u * u * (3 - 2 * u), u * (1 - u)];
    const cubic = a.map(
      (part, i) => (1 - p) * part + p * b[i] + h * q * ((1 - u) * leaving[i] - u * arriving[i]),
    );
    most = Math.max(
      most,
      angleBetween(normalise(cubic, cubic), curve.orientation(new Float64Array(4), from + u * h)),
    );
  }
  return most;
}
