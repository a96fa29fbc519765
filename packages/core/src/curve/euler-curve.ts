import { keyOrientation } from '../track/key-orientation.js';
import { playableTrack } from '../track/playable-track.js';
import type { RotationTrack } from '../track/rotation-track.js';
import type { Curve } from './curve.js';
import { withNumericLength } from './numeric-motion.js';
import { durations, segmentedCurve } from './segmented-curve.js';
import { turnProduct } from './turn-product.js';

const IDENTITY = [0, 0, 0, 1];

/**
 * Three angles joined as numbers, turns kept: how a file of Euler angles is played by most programs. Not the short way and not
 * at constant speed. For EULER tracks alone. Keys that cannot be played are left out (`playableTrack`).
 *
 * A product of three turns about fixed axes (intrinsic ABC: q_A q_B q_C; extrinsic abc: q_c q_b q_a), each at a constant rate.
 */
export function eulerCurve(track: RotationTrack): Curve {
  const played = playableTrack(track);
  const { times, values, breaks, sequence = 'XYZ' } = played;
  const gaps = durations(times);
  const intrinsic = sequence === sequence.toUpperCase();
  const order = intrinsic ? [0, 1, 2] : [2, 1, 0];
  const axes = Array.from(sequence.toLowerCase(), (letter) => unitAxis('xyz'.indexOf(letter)));
  const product = turnProduct();

  function load(i: number, u: number): void {
    product.reset(IDENTITY);
    for (const k of order) {
      const from = values[3 * i + k];
      const step = values[3 * i + 3 + k] - from;
      product.turn(axes[k], from + u * step, step / gaps[i], 0);
    }
  }

  return segmentedCurve({
    times,
    breaks,
    continuity: 0,
    key: (out, key) => void keyOrientation(out, played, key),
    motion: withNumericLength(
      {
        orientation(out, i, u) {
          load(i, u);
          for (let k = 0; k < 4; k++) out[k] = product.orientation[k];
        },
        rate(out, i, u) {
          load(i, u);
          for (let axis = 0; axis < 3; axis++) out[axis] = product.rate[axis];
        },
        acceleration(out, i, u) {
          load(i, u);
          for (let axis = 0; axis < 3; axis++) out[axis] = product.acceleration[axis];
        },
      },
      gaps,
    ),
  });
}

function unitAxis(axis: number): Float64Array {
  const unit = new Float64Array(3);
  unit[axis] = 1;
  return unit;
}
