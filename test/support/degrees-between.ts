import { relative, type ReadonlyNumberStore } from '@slewcurve/core';

/**
 * Degrees between two unit orientations, from the vector part of a⁻¹b: it does not see the rounding of their lengths, which is
 * not a turn. Its own rounding is up to 3e-14 degrees.
 */
export function degreesBetween(a: ReadonlyNumberStore, b: ReadonlyNumberStore): number {
  const [x, y, z, w] = relative(new Float64Array(4), a, b);
  return (2 * Math.atan2(Math.hypot(x, y, z), Math.abs(w)) * 180) / Math.PI;
}
