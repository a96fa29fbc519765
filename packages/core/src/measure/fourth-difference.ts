/** Gaps that differ by more than this share of the median need divided differences. */
export const EVEN = 0.02;
/** Weights of the fourth difference on even gaps. */
export const FOURTH: Float64Array = Float64Array.of(1, -4, 6, -4, 1);

/** Weights of the fourth divided difference over five slots from `first`, times 24h⁴: 1 −4 6 −4 1 on even gaps. */
export function dividedWeights(weights: Float64Array, times: Float64Array, first: number, gap: number): void {
  for (let m = 0; m < 5; m++) {
    let product = 1;
    for (let other = 0; other < 5; other++)
      if (other !== m) product *= (times[first + m] - times[first + other]) / gap;
    weights[m] = 24 / product;
  }
}

/** Whether the known gaps between slots differ by at most 2 % of the median gap. */
export function isEven(times: Float64Array, first: number, size: number, gap: number): boolean {
  let least = Infinity,
    most = -Infinity;
  for (let slot = first; slot + 1 < first + size; slot++) {
    const between = times[slot + 1] - times[slot];
    if (between < least) least = between;
    if (between > most) most = between;
  }
  return !(most - least > EVEN * gap);
}
