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

/** Halvings before an interval is taken as it is: 2^-60 of the whole is below the spacing of float64 inside it. */
const DEEPEST = 60;

/**
 * Integral of `f` from `a` to `b`, adaptive: an interval whose two rules differ by more than 1e-13 of the sum found so far is
 * halved, so kinks (a speed that touches zero) and narrow peaks cost steps, not digits. `splits` are places, ascending, where a
 * peak is known to be.
 */
export function integrate(
  f: (x: number) => number,
  a: number,
  b: number,
  splits: readonly number[] = [],
): number {
  const edges = [a, ...splits.filter((x) => x > a && x < b), b];
  let rough = 0;
  for (let i = 0; i + 1 < edges.length; i++) rough += Math.abs(rule(f, edges[i], edges[i + 1]).fine);
  let sum = 0;
  for (let i = 0; i + 1 < edges.length; i++) sum += refine(f, edges[i], edges[i + 1], 1e-13 * rough, 0);
  return sum;
}

function refine(f: (x: number) => number, a: number, b: number, tolerance: number, depth: number): number {
  const { fine, coarse } = rule(f, a, b);
  const error = Math.abs(fine - coarse);
  if (error <= tolerance || error <= 1e-14 * Math.abs(fine) || depth >= DEEPEST) return fine;
  const middle = (a + b) / 2;
  return refine(f, a, middle, tolerance / 2, depth + 1) + refine(f, middle, b, tolerance / 2, depth + 1);
}

function rule(f: (x: number) => number, a: number, b: number): { fine: number; coarse: number } {
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
