import type { NumberStore, ReadonlyNumberStore } from '../number-store.js';
import { largestOnDiagonal, symmetricEigen } from './symmetric-eigen.js';

/**
 * The chordal mean of orientations: the unit quaternion whose squared chord distances to `quats` (4 numbers each, unit), each
 * weighed by `weights` (default 1 each, not negative), add up to least. Signs do not matter. The answer lies on the side of the
 * first orientation. For two it is not slerp where their weights differ. Nothing to average gives the identity; where no mean
 * stands out (as for two orientations half a turn apart) one of the best is returned. `out` may be `quats`. Never throws.
 *
 * Source: Markley, Cheng, Crassidis & Oshman, "Averaging Quaternions", JGCD 30(4) 1193–1197, 2007: the eigenvector of the
 * largest eigenvalue of Σ w q qᵀ.
 */
export function mean<T extends NumberStore>(
  out: T,
  quats: ReadonlyNumberStore,
  weights?: ReadonlyNumberStore,
): T {
  const sum = new Float64Array(16);
  for (let n = 0; 4 * n + 3 < quats.length; n++) {
    const weight = weights === undefined ? 1 : weights[n];
    for (let row = 0; row < 4; row++)
      for (let column = 0; column < 4; column++)
        sum[4 * row + column] += weight * quats[4 * n + row] * quats[4 * n + column];
  }
  const empty = quats.length < 4 || sum[0] + sum[5] + sum[10] + sum[15] === 0;
  return empty ? writeSide(out, IDENTITY, 0, IDENTITY) : writeLargest(out, sum, quats);
}

/** The unit eigenvector of the largest eigenvalue of a 4×4 symmetric matrix, on the side of `near`. @internal */
export function writeLargest<T extends NumberStore>(
  out: T,
  matrix: Float64Array,
  near: ReadonlyNumberStore,
): T {
  const vectors = new Float64Array(16);
  symmetricEigen(matrix, vectors, 4);
  return writeSide(out, vectors, 4 * largestOnDiagonal(matrix, 4), near);
}

const IDENTITY: readonly number[] = Object.freeze([0, 0, 0, 1]);

function writeSide<T extends NumberStore>(
  out: T,
  from: ReadonlyNumberStore,
  at: number,
  near: ReadonlyNumberStore,
): T {
  const x = from[at],
    y = from[at + 1],
    z = from[at + 2],
    w = from[at + 3];
  const sign = x * near[0] + y * near[1] + z * near[2] + w * near[3] < 0 ? -1 : 1;
  const scale = sign / Math.hypot(x, y, z, w);
  out[0] = x * scale;
  out[1] = y * scale;
  out[2] = z * scale;
  out[3] = w * scale;
  return out;
}
