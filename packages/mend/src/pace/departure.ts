import { type Curve, angleBetween } from '@slewcurve/core';
import { DEGREES } from '../edit-result.js';

/** Largest angle between two curves on one clock, degrees: at 8 places between each two knots of the first. */
export function departure(a: Curve, b: Curve): number {
  const [p, q] = [new Float64Array(4), new Float64Array(4)];
  let most = 0;
  for (let i = 0; i + 1 < a.knots.length; i++)
    for (let part = 0; part < 8; part++) {
      const t = a.knots[i] + ((a.knots[i + 1] - a.knots[i]) * part) / 8;
      most = Math.max(most, angleBetween(a.orientation(p, t), b.orientation(q, t)));
    }
  return most * DEGREES;
}
