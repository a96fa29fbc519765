import { blockTridiagonal } from './block-tridiagonal.js';
import { chartToRate, chartTwist, rateToChart } from './chart-rate.js';

/** How well the rates at the keys were found. */
export interface Convergence {
  /** Whether the last pass changed no rate by more than the tolerance. */
  readonly converged: boolean;
  readonly passes: number;
  /** Largest change of a rate in the last pass, rad/s. */
  readonly change: number;
}

/**
 * The key rates (own axes, rad/s, three numbers a key) that make the acceleration continuous at every inner key of a run, with both ends at
 * the rate of their segments; `turns` and `gaps` are those of the run's segments. From equality of the two accelerations at key i
 * (SciPy 1.10.1's `RotationSpline` by N. Mayorov; derived again here):
 *
 *   (2/h₋) J(φ₋) ω₋ + 4(1/h₋ + 1/h) ω + (2/h) J⁻¹(φ) ω₊ = 6(φ₋/h₋² + φ/h²) − N(φ₋, J⁻¹(φ₋) ω)
 *
 * N depends on the unknown, hence passes over a fixed system until no rate changes by more than `tolerance`.
 */
export function smoothRates(
  turns: Float64Array,
  gaps: Float64Array,
  tolerance: number,
  mostPasses: number,
): { rates: Float64Array; convergence: Convergence } {
  const last = gaps.length;
  const rates = new Float64Array(3 * (last + 1));
  for (let k = 0; k < 3; k++) {
    rates[k] = turns[k] / gaps[0];
    rates[3 * last + k] = turns[3 * last - 3 + k] / gaps[last - 1];
  }
  if (last < 2) return { rates, convergence: { converged: true, passes: 0, change: 0 } };
  const system = smoothSystem(turns, gaps, rates);
  const right = new Float64Array(3 * (last - 1));
  const [velocity, twist] = [new Float64Array(3), new Float64Array(3)];
  let change = Infinity;
  let passes = 0;
  while (passes < mostPasses && !(change <= tolerance)) {
    right.set(system.right);
    for (let i = 1; i < last; i++) {
      const turn = turns.subarray(3 * i - 3, 3 * i);
      rateToChart(velocity, turn, rates.subarray(3 * i, 3 * i + 3));
      chartTwist(twist, turn, velocity);
      for (let k = 0; k < 3; k++) right[3 * i - 3 + k] -= twist[k];
    }
    system.solve(right);
    change = 0;
    for (let n = 0; n < right.length; n++) change = Math.max(change, Math.abs(right[n] - rates[n + 3]));
    rates.set(right, 3);
    passes++;
  }
  return { rates, convergence: { converged: change <= tolerance, passes, change } };
}

/** The matrix, eliminated, and the right side without N, for the inner keys. */
function smoothSystem(
  turns: Float64Array,
  gaps: Float64Array,
  ends: Float64Array,
): { solve: (right: Float64Array) => void; right: Float64Array } {
  const inner = gaps.length - 1;
  const diagonal = new Float64Array(inner);
  const below = new Float64Array(9 * inner);
  const above = new Float64Array(9 * inner);
  const right = new Float64Array(3 * inner);
  for (let i = 0; i < inner; i++) {
    const [h0, h1] = [gaps[i], gaps[i + 1]];
    diagonal[i] = 4 / h0 + 4 / h1;
    writeMatrix(below.subarray(9 * i, 9 * i + 9), turns.subarray(3 * i, 3 * i + 3), chartToRate, 2 / h0);
    writeMatrix(above.subarray(9 * i, 9 * i + 9), turns.subarray(3 * i + 3, 3 * i + 6), rateToChart, 2 / h1);
    for (let k = 0; k < 3; k++)
      right[3 * i + k] = 6 * (turns[3 * i + k] / h0 / h0 + turns[3 * i + 3 + k] / h1 / h1);
  }
  // The ends are known. Their rates lie along their own turns, which J and J⁻¹ leave as they are.
  for (let k = 0; k < 3; k++) {
    right[k] -= (2 / gaps[0]) * ends[k];
    right[3 * inner - 3 + k] -= (2 / gaps[inner]) * ends[3 * inner + 3 + k];
  }
  return { solve: blockTridiagonal(diagonal, below, above), right };
}

/** The matrix of a linear map of vectors at `r`, times `scale`, rows first. */
function writeMatrix(out: Float64Array, r: Float64Array, map: typeof chartToRate, scale: number): void {
  const unit = new Float64Array(3);
  for (let column = 0; column < 3; column++) {
    unit.fill(0);
    unit[column] = scale;
    map(unit, r, unit);
    for (let row = 0; row < 3; row++) out[3 * row + column] = unit[row];
  }
}
