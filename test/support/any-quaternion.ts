import { normalise } from '@slewcurve/core';
import * as fc from 'fast-check';

const part = fc.double({ min: -1, max: 1, noNaN: true });

/** Unit quaternions; half turns, identities and single axes come often, because parts of 0 do. */
export const anyQuaternion: fc.Arbitrary<readonly number[]> = fc
  .tuple(part, part, part, part)
  .filter((parts) => Math.hypot(...parts) > 1e-3)
  .map((parts) => normalise<number[]>([], parts));

/** Vectors up to `length` long, none shorter than a thousandth of it. */
export function anyVector(length: number): fc.Arbitrary<readonly number[]> {
  return fc
    .tuple(part, part, part)
    .filter((parts) => Math.hypot(...parts) > 1e-3)
    .map((parts) => parts.map((number) => (number * length) / Math.sqrt(3)));
}

/** Unit vectors. */
export const anyDirection: fc.Arbitrary<readonly number[]> = anyVector(1).map((vector) => {
  const length = Math.hypot(...vector);
  return vector.map((number) => number / length);
});
