import type { ReadonlyNumberStore } from '../number-store.js';
import { normalise } from '../quaternion/normalise.js';
import { controlTurns } from './control-turns.js';
import type { Curve } from './curve.js';
import { movingSlerp } from './moving-slerp.js';
import { stateCurve, type MotionState } from './state-curve.js';

/**
 * The Bezier curve of two or more control orientations by slerps within slerps, from the first control to the last in `duration`
 * seconds, leaving and arriving along the first and last leg. Controls are `[x, y, z, w]`, not necessarily unit; their signs as
 * they stand tell the way of every slerp, so put them on one side of each other first. Played backwards it is the same curve.
 *
 * K. Shoemake, "Animating Rotation with Quaternion Curves", SIGGRAPH 1985 (from memory): P. de Casteljau's construction on the
 * sphere. Rates are exact (see `movingSlerp`).
 *
 * @throws SlewcurveError `curve.too-few-controls`, `curve.bad-control`
 */
export function nestedBezier(
  controls: readonly ReadonlyNumberStore[],
  duration: number = 1,
  start: number = 0,
): Curve {
  const units = controlTurns(controls, 2).controls;
  const degree = controls.length - 1;
  const blend = movingSlerp();
  const states: MotionState[] = controls.map(() => ({
    orientation: new Float64Array(4),
    rate: new Float64Array(3),
    acceleration: new Float64Array(3),
  }));
  return stateCurve({
    times: Float64Array.of(start, start + duration),
    continuity: 2,
    breaks: [],
    key: (out, key) => void normalise(out, units.subarray(key === 0 ? 0 : 4 * degree)),
    at(_, u, h) {
      states.forEach((state, n) => {
        state.orientation.set(units.subarray(4 * n, 4 * n + 4));
        state.rate.fill(0);
        state.acceleration.fill(0);
      });
      const fraction = { value: u, slope: 1 / h, bend: 0 };
      for (let level = degree; level > 0; level--)
        for (let n = 0; n < level; n++) blend(states[n], states[n], states[n + 1], fraction);
      return states[0];
    },
  });
}
