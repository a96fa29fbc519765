import type { ReadonlyNumberStore } from '../number-store.js';
import type { Curve } from './curve.js';
import { hermiteSpline } from './hermite-spline.js';
import { keyRate } from './key-rate.js';
import type { SplineKeys } from './spline-keys.js';
import { tensionContinuityBiasRates } from './tension-continuity-bias.js';

/** Tension, continuity and bias of a spline: one number for all keys, or one for each; default 0. */
export interface SplineShape {
  readonly tension?: number | ReadonlyNumberStore;
  readonly continuity?: number | ReadonlyNumberStore;
  readonly bias?: number | ReadonlyNumberStore;
}

/**
 * Cumulative cubics whose rates at the keys come of tension, continuity and bias (see `tensionContinuityBiasRates`). Where a key
 * has a segment on one side only, its rate is that segment's, less by the tension.
 */
export function shapedSpline(spline: SplineKeys, shape: SplineShape): Curve {
  const { times, breaks, keys, gaps, turns, before, after } = spline;
  const leaving = new Float64Array(3 * gaps.length);
  const arriving = new Float64Array(3 * gaps.length);
  const unused = new Float64Array(3);
  const turn = (i: number): Float64Array => turns.subarray(3 * i, 3 * i + 3);
  let continuous = true;

  function ratesAt(key: number, from: number, to: number, arrive: Float64Array, leave: Float64Array): void {
    const tension = at(shape.tension, key);
    const continuity = at(shape.continuity, key);
    if (from < 0 || to < 0) {
      keyRate(arrive, spline, from, to, 'secant');
      for (let k = 0; k < 3; k++) leave[k] = arrive[k] *= 1 - tension;
      return;
    }
    continuous &&= continuity === 0;
    const bias = at(shape.bias, key);
    tensionContinuityBiasRates(arrive, leave, turn(from), gaps[from], turn(to), gaps[to], {
      tension,
      continuity,
      bias,
    });
  }

  for (let i = 0; i < gaps.length; i++) {
    ratesAt(i, before[i], i, unused, leaving.subarray(3 * i, 3 * i + 3));
    ratesAt(i + 1, i, after[i], arriving.subarray(3 * i, 3 * i + 3), unused);
  }
  return hermiteSpline({ times, breaks, keys, leaving, arriving, continuity: continuous ? 1 : 0 });
}

function at(value: number | ReadonlyNumberStore | undefined, key: number): number {
  return typeof value === 'object' ? value[key] : (value ?? 0);
}
