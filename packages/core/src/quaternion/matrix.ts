import type { NumberStore, ReadonlyNumberStore } from '../number-store.js';

/**
 * The 3×3 matrix of `q`, nine numbers, columns first as gl-matrix stores it: it takes own vectors to the parent. `q` need not be
 * unit: its squared length is divided out. A quaternion of no length gives the identity. Never throws.
 * Source: Henderson, NASA TM-74839 (1977), eq. 15.
 */
export function toMat3<T extends NumberStore>(out: T, q: ReadonlyNumberStore): T {
  return writeColumns(out, q, 3);
}

/** The 4×4 matrix of `q`, sixteen numbers, columns first; nothing moved, nothing scaled. Otherwise as `toMat3`. */
export function toMat4<T extends NumberStore>(out: T, q: ReadonlyNumberStore): T {
  writeColumns(out, q, 4);
  out[3] = 0;
  out[7] = 0;
  out[11] = 0;
  out[12] = 0;
  out[13] = 0;
  out[14] = 0;
  out[15] = 1;
  return out;
}

function writeColumns<T extends NumberStore>(out: T, q: ReadonlyNumberStore, stride: 3 | 4): T {
  const x = q[0],
    y = q[1],
    z = q[2],
    w = q[3];
  const squared = x * x + y * y + z * z + w * w;
  const two = squared > 0 ? 2 / squared : 0;
  out[0] = 1 - two * (y * y + z * z);
  out[1] = two * (x * y + z * w);
  out[2] = two * (x * z - y * w);
  out[stride] = two * (x * y - z * w);
  out[stride + 1] = 1 - two * (x * x + z * z);
  out[stride + 2] = two * (y * z + x * w);
  out[2 * stride] = two * (x * z + y * w);
  out[2 * stride + 1] = two * (y * z - x * w);
  out[2 * stride + 2] = 1 - two * (x * x + y * y);
  return out;
}
