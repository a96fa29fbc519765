import type { NumberStore, ReadonlyNumberStore } from '../number-store.js';

/**
 * Unit quaternion that turns by the rotation vector `r` (axis times full angle, radians): `(n sin θ/2, cos θ/2)`. Longer than
 * 1e150 rad gives identity: no digit of such an angle tells a direction. Writes four numbers; `out` may be `r`.
 */
export function expMap<T extends NumberStore>(out: T, r: ReadonlyNumberStore): T {
  const x = r[0],
    y = r[1],
    z = r[2];
  const squared = x * x + y * y + z * z;
  const meant = squared < 1e300;
  const angle = meant ? Math.sqrt(squared) : 0;
  const scale = meant ? (angle === 0 ? 0.5 : Math.sin(angle / 2) / angle) : 0;
  out[0] = x * scale;
  out[1] = y * scale;
  out[2] = z * scale;
  out[3] = Math.cos(angle / 2);
  return out;
}
