import type { Peak } from '../curve/curve.js';
import { greatest } from '../curve/greatest.js';

/** Greatest speed between two times, looked for in every piece between `knots`, at which alone the speed may jump. */
export function piecewisePeak(
  speedAt: (t: number) => number,
  knots: Float64Array,
  t0: number,
  t1: number,
): Peak {
  const from = Math.max(knots[0], Math.min(t0, t1));
  const to = Math.min(knots[knots.length - 1], Math.max(t0, t1));
  const best: Peak = { rate: 0, time: Math.min(t0, t1) };
  for (let i = 0; i + 1 < knots.length; i++) {
    const a = Math.max(from, knots[i]);
    const b = Math.min(to, knots[i + 1]);
    if (!(a < b)) continue;
    // The later piece's speed belongs to a knot, so a piece is asked up to just before its end.
    const last = b === knots[i + 1] ? b - 1e-9 * (b - knots[i]) : b;
    const time = greatest(speedAt, a, last);
    const rate = speedAt(time);
    if (rate > best.rate) {
      best.rate = rate;
      best.time = time;
    }
  }
  return best;
}
