import type { NumberStore, ReadonlyNumberStore } from '../number-store.js';
import { fromAxisAngle } from './axis-angle.js';
import { conjugate } from './conjugate.js';
import { multiply } from './multiply.js';

/**
 * `q` turned on by `angle` radians about `axis` (three numbers, any length but 0) in its own axes: q · turn. `out` may be an
 * input. Never throws.
 */
export function turnAboutOwn<T extends NumberStore>(
  out: T,
  q: ReadonlyNumberStore,
  axis: ReadonlyNumberStore,
  angle: number,
): T {
  const turn: [number, number, number, number] = [0, 0, 0, 0];
  return multiply(out, q, fromAxisAngle(turn, axis, angle));
}

/** `q` turned on by `angle` radians about `axis` in its parent's axes: turn · q. Otherwise as `turnAboutOwn`. */
export function turnAboutParent<T extends NumberStore>(
  out: T,
  q: ReadonlyNumberStore,
  axis: ReadonlyNumberStore,
  angle: number,
): T {
  const turn: [number, number, number, number] = [0, 0, 0, 0];
  return multiply(out, fromAxisAngle(turn, axis, angle), q);
}

/**
 * `q`, which stands in a parent of world orientation `parent` (unit), turned on by `angle` radians about `axis` in world axes:
 * parent⁻¹ · turn · parent · q. The answer stands in the same parent. Otherwise as `turnAboutOwn`.
 */
export function turnAboutWorld<T extends NumberStore>(
  out: T,
  q: ReadonlyNumberStore,
  parent: ReadonlyNumberStore,
  axis: ReadonlyNumberStore,
  angle: number,
): T {
  const turn: [number, number, number, number] = [0, 0, 0, 0];
  const back: [number, number, number, number] = [0, 0, 0, 0];
  fromAxisAngle(turn, axis, angle);
  multiply(turn, turn, parent);
  multiply(turn, conjugate(back, parent), turn);
  return multiply(out, turn, q);
}
