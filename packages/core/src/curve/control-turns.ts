import { SlewcurveError } from '../errors.js';
import type { ReadonlyNumberStore } from '../number-store.js';
import { normalise } from '../quaternion/normalise.js';
import { segmentTurns } from './slerp-curve.js';

/** Control orientations of a curve, made unit, and the turn from each to the next. */
export interface ControlTurns {
  /** Four numbers each. */
  readonly controls: Float64Array;
  /** Rotation vector from control k to k + 1, the short way, radians, own axes; three numbers each. */
  readonly turns: Float64Array;
}

/**
 * @throws SlewcurveError `curve.too-few-controls`, `curve.bad-control` (not finite, or of no length)
 * @internal
 */
export function controlTurns(quats: readonly ReadonlyNumberStore[], fewest: number): ControlTurns {
  if (quats.length < fewest)
    throw new SlewcurveError(
      'curve.too-few-controls',
      `This curve needs ${fewest} control orientations or more; there are ${quats.length}.`,
    );
  const controls = new Float64Array(4 * quats.length);
  quats.forEach((q, n) => {
    const length = Math.hypot(q[0], q[1], q[2], q[3]);
    if (!(length >= 1e-6 && length < Infinity))
      throw new SlewcurveError(
        'curve.bad-control',
        `Control ${n} is not an orientation: [${Array.from(q).join(', ')}].`,
        { key: n },
      );
    normalise(controls.subarray(4 * n, 4 * n + 4), q);
  });
  return { controls, turns: segmentTurns(controls) };
}
