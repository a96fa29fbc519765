import type { NumberStore, ReadonlyNumberStore } from '../../number-store.js';
import { axisOf, handOf, hasTwoAxes, isIntrinsic } from './euler-sequence.js';

/**
 * Unit quaternion of three angles, radians, in the order of the letters of `sequence`: upper case intrinsic (`'XYZ'` is
 * x first, then about the turned y, then about the twice turned z), lower case extrinsic (about fixed axes). One of the 24 of
 * `EULER_SEQUENCES`; `eulerSequence` checks a text. `out` may be `angles` where it holds four numbers. Never throws.
 *
 * Intrinsic ABC: q = q_A(1)·q_B(2)·q_C(3); extrinsic abc: q = q_c(3)·q_b(2)·q_a(1). D. M. Henderson, NASA TM-74839, 1977, whose
 * twelve half-angle products these two are, by the sign of the permutation.
 */
export function fromEuler<T extends NumberStore>(out: T, angles: ReadonlyNumberStore, sequence: string): T {
  const intrinsic = isIntrinsic(sequence);
  const i = axisOf(sequence, intrinsic ? 0 : 2);
  const j = axisOf(sequence, 1);
  const hand = handOf(i, j);
  const half1 = angles[intrinsic ? 0 : 2] / 2,
    half2 = angles[1] / 2,
    half3 = angles[intrinsic ? 2 : 0] / 2;
  const c1 = Math.cos(half1),
    s1 = Math.sin(half1);
  const c2 = Math.cos(half2),
    s2 = Math.sin(half2);
  const c3 = Math.cos(half3),
    s3 = Math.sin(half3);
  if (hasTwoAxes(sequence)) {
    out[3] = c1 * c2 * c3 - s1 * c2 * s3;
    out[i] = s1 * c2 * c3 + c1 * c2 * s3;
    out[j] = c1 * s2 * c3 + s1 * s2 * s3;
    out[3 - i - j] = hand * (s1 * s2 * c3 - c1 * s2 * s3);
  } else {
    out[3] = c1 * c2 * c3 - hand * s1 * s2 * s3;
    out[i] = s1 * c2 * c3 + hand * c1 * s2 * s3;
    out[j] = c1 * s2 * c3 - hand * s1 * c2 * s3;
    out[3 - i - j] = c1 * c2 * s3 + hand * s1 * s2 * c3;
  }
  return out;
}
