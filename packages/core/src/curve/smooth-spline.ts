import { chartCubicMotion } from './chart-cubic.js';
import { rateToChart } from './chart-rate.js';
import type { Curve } from './curve.js';
import { smoothRates, type Convergence } from './smooth-rates.js';
import { splineRuns, type SplineKeys, type SplineRun } from './spline-keys.js';
import { stateCurve } from './state-curve.js';
import { copyKey } from './unit-keys.js';

/** A curve whose key rates were found by passes, and how well. */
export interface SmoothSpline extends Curve {
  /** Of the run between breaks that converged worst. */
  readonly convergence: Convergence;
}

/**
 * Segments that a loop is carried on round the seam on each side, before the ends are set: an end's influence falls to 0.27 of itself a
 * key (2 − √3, the cubic spline's), to 1e-17 over thirty.
 */
const ROUND_THE_SEAM = 30;

/**
 * The spline through the keys whose acceleration is continuous: q = q_i Exp(r(t)) with r a cubic, r(0) = 0, r(h) = φ, r′(0) = ω_i,
 * r′(h) = J⁻¹(φ) ω_{i+1}, the rates from `smoothRates`. About one axis it is the ordinary cubic spline clamped to the end chords. Not
 * symmetric in time: played backwards it is another curve through the same keys.
 */
export function smoothSpline(spline: SplineKeys, tolerance: number, mostPasses: number): SmoothSpline {
  const { times, breaks, keys, turns } = spline;
  const rates = new Float64Array(2 * turns.length);
  let convergence: Convergence = { converged: true, passes: 0, change: 0 };
  for (const run of splineRuns(spline)) {
    const found = runRates(spline, run, tolerance, mostPasses);
    for (let i = run.first; i < run.last; i++)
      rates.set(found.rates.subarray(3 * (i - run.first), 3 * (i - run.first) + 6), 6 * i);
    if (!(found.convergence.change <= convergence.change)) convergence = found.convergence;
  }
  const origin = new Float64Array(4);
  const motion = chartCubicMotion({ chords: turns, slopes: chartSlopes(turns, rates) });
  const curve = stateCurve({
    times,
    breaks,
    continuity: 2,
    key: (out, key) => copyKey(out, keys, key),
    at(segment, u, h) {
      copyKey(origin, keys, segment);
      return motion(origin, segment, u, h);
    },
  });
  return { ...curve, convergence };
}

/** Rates at the keys of one run, three numbers a key. A loop's are those of a longer run that goes round the seam. */
function runRates(
  { turns, gaps, loop }: SplineKeys,
  { first, last }: SplineRun,
  tolerance: number,
  mostPasses: number,
): ReturnType<typeof smoothRates> {
  const count = last - first;
  const margin = loop ? ROUND_THE_SEAM : 0;
  const around = Array.from(
    { length: count + 2 * margin },
    (_, n) => first + ((((n - margin) % count) + count) % count),
  );
  const found = smoothRates(
    Float64Array.from(around.flatMap((i) => [turns[3 * i], turns[3 * i + 1], turns[3 * i + 2]])),
    Float64Array.from(around, (i) => gaps[i]),
    tolerance,
    mostPasses,
  );
  return { ...found, rates: found.rates.subarray(3 * margin, 3 * (margin + count + 1)) };
}

/** r′ at both ends of every segment from the rates there, six numbers a segment: at the start r is 0, and the rate is r′ itself. */
function chartSlopes(turns: Float64Array, rates: Float64Array): Float64Array {
  const slopes = rates.slice();
  for (let i = 0; 3 * i < turns.length; i++) {
    const arriving = slopes.subarray(6 * i + 3, 6 * i + 6);
    rateToChart(arriving, turns.subarray(3 * i, 3 * i + 3), arriving);
  }
  return slopes;
}
