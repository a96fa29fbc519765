import type { NumberStore, ReadonlyNumberStore } from '../number-store.js';

const AXES = 'xyz';

/**
 * Unit quaternion of three angles, radians, in the order of the letters of `sequence`: upper case intrinsic (`'XYZ'` is
 * x first, then about the turned y, then about the twice turned z), lower case extrinsic (about fixed axes). `out` may be
 * `angles` where it holds four numbers.
 *
 * Intrinsic ABC: q = q_A(1)·q_B(2)·q_C(3); extrinsic abc: q = q_c(3)·q_b(2)·q_a(1). D. M. Henderson, NASA TM-74839, 1977.
 */
export function fromEuler<T extends NumberStore>(out: T, angles: ReadonlyNumberStore, sequence: string): T {
  const intrinsic = sequence === sequence.toUpperCase();
  const letters = sequence.toLowerCase();
  const q = [0, 0, 0, 1];
  for (let i = 0; i < 3; i++) {
    const at = intrinsic ? i : 2 - i;
    turnOwn(q, AXES.indexOf(letters[at]), angles[at] / 2);
  }
  for (let i = 0; i < 4; i++) out[i] = q[i];
  return out;
}

/** `q` followed by a turn of twice `half` about its own axis 0, 1 or 2. */
function turnOwn(q: number[], axis: number, half: number): void {
  const next = (axis + 1) % 3;
  const last = (axis + 2) % 3;
  const s = Math.sin(half);
  const c = Math.cos(half);
  const along = q[axis] * c + q[3] * s;
  const second = q[next] * c + q[last] * s;
  const third = q[last] * c - q[next] * s;
  q[3] = q[3] * c - q[axis] * s;
  q[axis] = along;
  q[next] = second;
  q[last] = third;
}
