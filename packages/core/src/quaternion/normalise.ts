import type { NumberStore, ReadonlyNumberStore } from '../number-store.js';
import { unitScale } from './unit-scale.js';

/**
 * `q` made unit, its sign kept. Numbers that are unit to float64 rounding are copied to the bit; a quaternion of no length
 * (shorter than 1e-300) gives identity. `out` may be `q`.
 */
export function normalise<T extends NumberStore>(out: T, q: ReadonlyNumberStore): T {
  const x = q[0],
    y = q[1],
    z = q[2],
    w = q[3];
  const scale = unitScale(x, y, z, w);
  out[0] = x * scale;
  out[1] = y * scale;
  out[2] = z * scale;
  out[3] = scale === 0 ? 1 : w * scale;
  return out;
}
