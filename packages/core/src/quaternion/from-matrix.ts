import type { NumberStore, ReadonlyNumberStore } from '../number-store.js';

/**
 * The unit quaternion of a rotation matrix, nine numbers, columns first. The matrix must be a rotation: what is scaled, sheared
 * or reflected goes through `splitMatrix`, which says so. `out` may be `matrix`. Never throws.
 * Source: Shepperd, "Quaternion from Rotation Matrix", J. Guidance and Control 1(3), 1978: divide by the largest component.
 */
export function fromMat3<T extends NumberStore>(out: T, matrix: ReadonlyNumberStore): T {
  const m = matrix;
  return fromColumns(out, m[0], m[1], m[2], m[3], m[4], m[5], m[6], m[7], m[8]);
}

/**
 * The unit quaternion of the upper 3×3 of a 4×4 matrix, sixteen numbers, columns first, with the length of each column divided
 * out. Columns must be square to each other and right-handed: `splitMatrix` checks that. `out` may be `matrix`. Never throws.
 */
export function fromMat4<T extends NumberStore>(out: T, matrix: ReadonlyNumberStore): T {
  const m = matrix;
  const x = 1 / Math.hypot(m[0], m[1], m[2]) || 0;
  const y = 1 / Math.hypot(m[4], m[5], m[6]) || 0;
  const z = 1 / Math.hypot(m[8], m[9], m[10]) || 0;
  return fromColumns(
    out,
    m[0] * x,
    m[1] * x,
    m[2] * x,
    m[4] * y,
    m[5] * y,
    m[6] * y,
    m[8] * z,
    m[9] * z,
    m[10] * z,
  );
}

/**
 * The unit quaternion whose own axes are three square unit vectors: x, then y, then z, written in the parent's axes.
 * @internal
 */
export function fromColumns<T extends NumberStore>(
  out: T,
  xx: number,
  xy: number,
  xz: number,
  yx: number,
  yy: number,
  yz: number,
  zx: number,
  zy: number,
  zz: number,
): T {
  const trace = xx + yy + zz;
  if (trace >= xx && trace >= yy && trace >= zz) return unit(out, yz - zy, zx - xz, xy - yx, 1 + trace);
  if (xx >= yy && xx >= zz) return unit(out, 1 + 2 * xx - trace, xy + yx, zx + xz, yz - zy);
  if (yy >= zz) return unit(out, xy + yx, 1 + 2 * yy - trace, yz + zy, zx - xz);
  return unit(out, zx + xz, yz + zy, 1 + 2 * zz - trace, xy - yx);
}

function unit<T extends NumberStore>(out: T, x: number, y: number, z: number, w: number): T {
  const length = Math.sqrt(x * x + y * y + z * z + w * w);
  out[0] = x / length;
  out[1] = y / length;
  out[2] = z / length;
  out[3] = w / length;
  return out;
}
