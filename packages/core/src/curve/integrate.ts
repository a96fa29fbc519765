import type { NarrowPlace } from './greatest.js';

// Gauss–Kronrod pair of 7 and 15 points on [-1, 1], from QUADPACK (Piessens et al. 1983) by way of the published tables.
const NODES = [
  0.9914553711208126, 0.9491079123427585, 0.8648644233597691, 0.7415311855993945, 0.5860872354676911,
  0.4058451513773972, 0.20778495500789848, 0,
];
const KRONROD = [
  0.022935322010529224, 0.06309209262997856, 0.10479001032225019, 0.14065325971552592, 0.1690047266392679,
  0.19035057806478542, 0.20443294007529889, 0.20948214108472782,
];
const GAUSS = [0.1294849661688697, 0.27970539148927664, 0.3818300505051189, 0.4179591836734694];

/** Halvings that one integral may cost: a kink takes 50, so this bounds only what rounding noise would ask for without end. */
const MOST_HALVINGS = 300;

/**
 * Integral of `f` from `a` to `b`, adaptive: an interval whose error, as the two rules estimate it, is over 1e-13 of the whole,
 * or over `floor` where that is larger, is halved, so kinks (a speed that touches zero) cost steps, not digits. About a narrow place the interval is
 * cut geometrically from the start: both rules would step over a peak narrower than their points, and agree.
 */
export function integrate(
  f: (x: number) => number,
  a: number,
  b: number,
  narrow: readonly NarrowPlace[] = [],
  floor = 0,
): number {
  const edges = cuts(a, b, narrow);
  const firsts: Estimate[] = [];
  let rough = 0;
  for (let i = 0; i + 1 < edges.length; i++) {
    firsts.push(rule(f, edges[i], edges[i + 1]));
    rough += Math.abs(firsts[i].fine);
  }
  const limit = { error: Math.max(1e-13 * rough, floor), halvings: MOST_HALVINGS };
  let sum = 0;
  for (let i = 0; i + 1 < edges.length; i++) sum += refine(f, edges[i], edges[i + 1], limit, firsts[i]);
  return sum;
}

function cuts(a: number, b: number, narrow: readonly NarrowPlace[]): ArrayLike<number> {
  const edges = [a, b];
  for (const { at, width } of narrow) {
    edges.push(at);
    for (let step = Math.max(width, Number.EPSILON); step < b - a; step *= 4)
      edges.push(at - step, at + step);
  }
  if (edges.length === 2) return edges;
  // oxlint-disable-next-line unicorn/no-array-sort -- our own list: sorted where it is, no copy
  return Float64Array.from(edges.filter((x) => x >= a && x <= b)).sort();
}

function refine(
  f: (x: number) => number,
  a: number,
  b: number,
  limit: { readonly error: number; halvings: number },
  { fine, coarse }: Estimate,
): number {
  const size = Math.abs(fine);
  const difference = Math.abs(fine - coarse) / size;
  // The difference is the error of the coarser rule; that of the finer one is about its 3/2 power (QUADPACK's estimate).
  const error = size * Math.min(difference, (200 * difference) ** 1.5);
  if (!(error > limit.error) || limit.halvings === 0) return fine;
  limit.halvings--;
  const middle = (a + b) / 2;
  return refine(f, a, middle, limit, rule(f, a, middle)) + refine(f, middle, b, limit, rule(f, middle, b));
}

/** An integral by both rules. */
interface Estimate {
  readonly fine: number;
  readonly coarse: number;
}

function rule(f: (x: number) => number, a: number, b: number): Estimate {
  const middle = (a + b) / 2;
  const half = (b - a) / 2;
  const centre = f(middle);
  let fine = KRONROD[7] * centre;
  let coarse = GAUSS[3] * centre;
  for (let i = 0; i < 7; i++) {
    const pair = f(middle - half * NODES[i]) + f(middle + half * NODES[i]);
    fine += KRONROD[i] * pair;
    if (i % 2 === 1) coarse += GAUSS[(i - 1) / 2] * pair;
  }
  return { fine: fine * half, coarse: coarse * half };
}
