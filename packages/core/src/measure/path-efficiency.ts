import type { Curve } from '../curve/curve.js';
import { angleBetween } from '../quaternion/angle-between.js';

/**
 * The shortest angle between the orientations at `t0` and `t1` over the angle turned between them: 1 for a great arc, toward 0 for
 * detours and whole turns. 1 where nothing turns.
 */
export function pathEfficiency(curve: Curve, t0: number = curve.start, t1: number = curve.end): number {
  const travelled = curve.length(t0, t1);
  const from = curve.orientation([0, 0, 0, 0], t0);
  const shortest = angleBetween(from, curve.orientation([0, 0, 0, 0], t1));
  return travelled > 0 ? Math.min(1, shortest / travelled) : 1;
}
