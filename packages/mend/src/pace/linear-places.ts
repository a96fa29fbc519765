import { type Curve, angleBetween, slerp } from '@slewcurve/core';

/** Halvings of one stretch at the most. */
const MOST_HALVINGS = 12;

/** The largest turn between two keys that stays well clear of half a turn, where the way is lost: 120°. */
const WIDEST = (2 * Math.PI) / 3;

/** Times between two others at which a LINEAR track needs keys to stay within `near` radians of a curve, when every key lies on it. */
export function linearPlaces(curve: Curve, from: number, to: number, near: number, halvings = 0): number[] {
  if (halvings === MOST_HALVINGS || linearMiss(curve, from, to) <= near) return [];
  const middle = (from + to) / 2;
  return [
    ...linearPlaces(curve, from, middle, near, halvings + 1),
    middle,
    ...linearPlaces(curve, middle, to, near, halvings + 1),
  ];
}

/** How far the short arc between two places of a curve is off it, radians; Infinity where the curve turns too far for two keys to say which way. */
function linearMiss(curve: Curve, from: number, to: number): number {
  if (curve.length(from, to) > WIDEST) return Infinity;
  // At a cut the end is what stands just before it.
  const end = to - 1e-12 * (to - from);
  const a = curve.orientation(new Float64Array(4), from);
  const b = curve.orientation(new Float64Array(4), end);
  const [p, q] = [new Float64Array(4), new Float64Array(4)];
  let most = 0;
  for (const u of [1 / 8, 1 / 4, 3 / 8, 1 / 2, 5 / 8, 3 / 4, 7 / 8])
    most = Math.max(most, angleBetween(slerp(p, a, b, u), curve.orientation(q, from + u * (to - from))));
  return most;
}
