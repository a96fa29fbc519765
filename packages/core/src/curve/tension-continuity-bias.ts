import type { NumberStore, ReadonlyNumberStore } from '../number-store.js';

/** How a curve passes a key; all 0 is the plain spline. Each lies between −1 and 1 as a rule, and none need to. */
export interface TensionContinuityBias {
  /** 1 stops at the key, −1 passes at twice the rate. */
  readonly tension: number;
  /** Not 0 makes the rate jump at the key. */
  readonly continuity: number;
  /** 1 goes by the segment before the key alone, −1 by the one after it. */
  readonly bias: number;
}

/**
 * The rates, rad/s, own axes, by which a curve arrives at a key and leaves it, from the rotation vectors of the segments before and
 * after it (three numbers each, radians, the short way) and their durations, seconds. Writes three numbers each. Never throws.
 *
 * D. H. U. Kochanek and R. H. Bartels, SIGGRAPH 1984 (formulae from an encyclopaedia). Both tangents times 2/(h₋ + h₊): the pairing
 * that keeps the speed continuous and steady motion steady. The paper, as quoted, prints the two factors for uneven times the
 * other way round, which makes the speed jump by the square of the ratio of the gaps.
 */
export function tensionContinuityBiasRates(
  arriving: NumberStore,
  leaving: NumberStore,
  before: ReadonlyNumberStore,
  gapBefore: number,
  after: ReadonlyNumberStore,
  gapAfter: number,
  shape: TensionContinuityBias,
): void {
  const { tension, continuity, bias } = shape;
  const scale = (1 - tension) / (gapBefore + gapAfter);
  const early = scale * (1 + bias);
  const late = scale * (1 - bias);
  for (let k = 0; k < 3; k++) {
    const phi0 = before[k];
    const phi1 = after[k];
    arriving[k] = (1 - continuity) * early * phi0 + (1 + continuity) * late * phi1;
    leaving[k] = (1 + continuity) * early * phi0 + (1 - continuity) * late * phi1;
  }
}
