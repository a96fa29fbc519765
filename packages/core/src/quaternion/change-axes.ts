import { SlewcurveError } from '../errors.js';
import type { NumberStore, ReadonlyNumberStore } from '../number-store.js';
import { conjugate } from './conjugate.js';
import { multiply } from './multiply.js';

/**
 * The matrix of a change of axes, nine numbers, columns first, from words: `'x z -y'` makes the new x from the old x, the new y
 * from the old z, the new z from the old y reversed. An odd change, as `'x y -z'`, changes the hand.
 *
 * @throws SlewcurveError `axes.unknown` where the words are not x, y and z once each, with or without a minus
 */
export function axisChange(words: string): readonly number[] {
  const matrix = [0, 0, 0, 0, 0, 0, 0, 0, 0];
  const parts = words.trim().split(/\s+/);
  const old = parts.map((part) => 'xyz'.indexOf(part.replace(/^-/, '')));
  if (parts.some((part) => !/^-?[xyz]$/.test(part)) || new Set(old).size !== 3 || parts.length !== 3)
    throw new SlewcurveError(
      'axes.unknown',
      `"${words}" is not a change of axes: name x, y and z once each, as in "x z -y".`,
    );
  parts.forEach((part, row) => (matrix[3 * old[row] + row] = part.startsWith('-') ? -1 : 1));
  return Object.freeze(matrix);
}

/**
 * The orientation `q` in changed axes: the turn M q M⁻¹, where `change` is the square, unscaled matrix M (nine numbers, columns
 * first; see `axisChange`). A change of hand (determinant −1) is allowed: the axis goes over as det(M)·M·axis, the angle stays.
 * Both the parent's and the thing's own axes change. `out` may be `q`. Never throws.
 */
export function changeAxes<T extends NumberStore>(
  out: T,
  q: ReadonlyNumberStore,
  change: ReadonlyNumberStore,
): T {
  const w = q[3];
  changeAxesOfRate(out, q, change);
  out[3] = w;
  return out;
}

/** As `changeAxes`, for an angular rate, an acceleration or a rotation vector (three numbers, parent or own frame). */
export function changeAxesOfRate<T extends NumberStore>(
  out: T,
  rate: ReadonlyNumberStore,
  change: ReadonlyNumberStore,
): T {
  const m = change;
  const x = rate[0],
    y = rate[1],
    z = rate[2];
  const hand =
    m[0] * (m[4] * m[8] - m[5] * m[7]) +
    m[3] * (m[7] * m[2] - m[8] * m[1]) +
    m[6] * (m[1] * m[5] - m[2] * m[4]);
  const sign = hand < 0 ? -1 : 1;
  out[0] = sign * (m[0] * x + m[3] * y + m[6] * z);
  out[1] = sign * (m[1] * x + m[4] * y + m[7] * z);
  out[2] = sign * (m[2] * x + m[5] * y + m[8] * z);
  return out;
}

/**
 * The turn `q` seen in the mirror that stands square to the unit vector `normal` (three numbers, the axes that `q` is written
 * in): same angle, axis reflected and reversed. `out` may be an input. Never throws.
 */
export function mirror<T extends NumberStore>(
  out: T,
  q: ReadonlyNumberStore,
  normal: ReadonlyNumberStore,
): T {
  const x = normal[0],
    y = normal[1],
    z = normal[2];
  const twice = 2 * (q[0] * x + q[1] * y + q[2] * z);
  out[0] = twice * x - q[0];
  out[1] = twice * y - q[1];
  out[2] = twice * z - q[2];
  out[3] = q[3];
  return out;
}

/**
 * The turn `q` written in the axes of the unit quaternion `basis` (which stands in the axes `q` is written in now):
 * basis⁻¹ · q · basis. `out` may be an input. Never throws.
 */
export function changeBasis<T extends NumberStore>(
  out: T,
  q: ReadonlyNumberStore,
  basis: ReadonlyNumberStore,
): T {
  const back: [number, number, number, number] = [0, 0, 0, 0];
  conjugate(back, basis);
  multiply(back, back, q);
  return multiply(out, back, basis);
}
