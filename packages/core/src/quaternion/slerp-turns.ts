import type { NumberStore, ReadonlyNumberStore } from '../number-store.js';
import { logMap } from './log-map.js';
import { expMap } from './exp-map.js';
import { multiply } from './multiply.js';
import { normalise } from './normalise.js';
import { relative } from './relative.js';

/**
 * From `a` to `b` at constant rate with `wholeTurns` more about the short way's axis: a · Exp(t(θ + 2πk)n), θ the short angle,
 * n its axis. Negative turns go against it: −1 is the long way round, 0 is `slerp`. `t` is any finite number. Equal orientations
 * have no axis to wind about and stay as they are: wind with `spinTrack`, which is given the axis. Exactly half a turn apart,
 * `wholeTurns` counts from the way that the stored signs tell. The result is unit, follows on from `a` without a jump of sign,
 * and is `a` to the bit at `t = 0` and `b` up to sign to the bit at `t = 1`. Inputs need not be unit. `out` may be an input.
 */
export function slerpTurns<T extends NumberStore>(
  out: T,
  a: ReadonlyNumberStore,
  b: ReadonlyNumberStore,
  t: number,
  wholeTurns: number,
): T {
  const from: [number, number, number, number] = [0, 0, 0, 0];
  const turn: [number, number, number, number] = [0, 0, 0, 0];
  normalise(from, a);
  normalise(turn, b);
  const bx = turn[0],
    by = turn[1],
    bz = turn[2],
    bw = turn[3];
  relative(turn, from, turn);
  const side = turn[3] < 0 ? -1 : 1;
  logMap(turn, turn);
  const short = Math.hypot(turn[0], turn[1], turn[2]);
  if (t === 1) {
    const sign = Math.abs(wholeTurns % 2) === 1 ? -side : side;
    out[0] = sign * bx;
    out[1] = sign * by;
    out[2] = sign * bz;
    out[3] = sign * bw;
    return out;
  }
  const turned = t * (short + 2 * Math.PI * wholeTurns);
  // The axis first: whole turns over an angle next to nothing would leave float64.
  for (let k = 0; k < 3; k++) turn[k] = short > 0 ? (turn[k] / short) * turned : 0;
  return normalise(out, multiply(turn, from, expMap(turn, turn)));
}
