import type { NumberStore, ReadonlyNumberStore } from '../../number-store.js';
import { axisOf, handOf, hasTwoAxes, isIntrinsic } from './euler-sequence.js';

/** Half the distance, radians, from the pole below which the outer angles are noise: they would be wrong by 1e-4 rad and more. */
const POLE = 5e-13;

/**
 * The three angles, radians, in the order of the letters of `sequence` (see `EulerSequence`), that turn by `q`: the principal
 * ones, middle angle in [-π/2, π/2] for three axes and [0, π] for two, outer angles in (-π, π]. At the pole, where the middle
 * angle stands at an end of its range, only the sum or the difference of the outer angles is defined: the third is then 0, and
 * `poleDistance` tells. `q` need not be unit. `out` may be `q`. For a track, follow with `unwrapEuler`. Never throws.
 *
 * Source: Bernardes & Viollet, "Quaternion to Euler angles conversion", PLOS ONE 17(11) e0276302, 2022.
 */
export function toEuler<T extends NumberStore>(out: T, q: ReadonlyNumberStore, sequence: string): T {
  const two = hasTwoAxes(sequence);
  // The method is written for fixed axes; turned axes are the fixed ones in reverse.
  const head = isIntrinsic(sequence) ? 2 : 0;
  const tail = head === 2 ? 0 : 2;
  const i = axisOf(sequence, head);
  const j = axisOf(sequence, 1);
  const k = two ? 3 - i - j : axisOf(sequence, tail);
  const s = handOf(i, j);
  const a = two ? q[3] : q[3] - q[j];
  const b = two ? q[i] : q[i] + s * q[k];
  const c = two ? q[j] : q[j] + q[3];
  const d = two ? s * q[k] : s * q[k] - q[i];
  const half = Math.atan2(Math.hypot(c, d), Math.hypot(a, b));
  let plus = Math.atan2(b, a);
  let minus = Math.atan2(d, c);
  // At a pole one of the two is noise: it becomes what makes the third letter's angle 0.
  if (half < POLE) minus = (head - 1) * plus;
  else if (Math.PI / 2 - half < POLE) plus = (head - 1) * minus;
  out[head] = wrapped(plus - minus);
  out[1] = two ? 2 * half : 2 * half - Math.PI / 2;
  out[tail] = wrapped(two ? plus + minus : s * (plus + minus));
  return out;
}

/**
 * How far, radians in [0, π/2], the middle one of three angles stands from where the outer two turn about one axis and only
 * their sum or difference is defined. Noise in the outer angles is that of the orientation over the sine of this distance.
 */
export function poleDistance(angles: ReadonlyNumberStore, sequence: string): number {
  const middle = angles[1];
  const nearness = hasTwoAxes(sequence) ? Math.sin(middle) : Math.cos(middle);
  const across = hasTwoAxes(sequence) ? Math.cos(middle) : Math.sin(middle);
  return Math.atan2(Math.abs(nearness), Math.abs(across));
}

/** The angle in (-π, π] that differs by whole turns; the input is within ±3π. */
function wrapped(angle: number): number {
  if (angle > Math.PI) return angle - 2 * Math.PI;
  return angle <= -Math.PI ? angle + 2 * Math.PI : angle;
}
