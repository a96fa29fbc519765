import { logMap, multiply } from '@slewcurve/core';

/** Rotation vector from one key to another, parent axes, radians. */
export function turnFrom(orientations: Float64Array, from: number, to: number): [number, number, number] {
  const [x = 0, y = 0, z = 0, w = 0] = orientations.subarray(4 * from, 4 * from + 4);
  const later = orientations.subarray(4 * to, 4 * to + 4);
  const turn = multiply(new Float64Array(4), later, Float64Array.of(-x, -y, -z, w));
  const [a = 0, b = 0, c = 0] = logMap(new Float64Array(3), turn);
  return [a, b, c];
}
