/**
 * The cumulative cubic B-spline basis over uneven knots, between the knots `at` and `at + 1`: fills `out` with, for each of the
 * three turns between the four controls in force, the cumulative sum and its first and second derivative. `knot(n)` gives the
 * knots, ascending. The derivative of a cumulative sum is one basis function of lower degree (the others cancel).
 * Source: C. de Boor's recursion (1972, from memory). For even knots: (5+3u−3u²+u³)/6, (1+3u+3u²−2u³)/6, u³/6.
 * @internal
 */
export function cumulativeCubicBasis(
  out: Float64Array,
  knot: (n: number) => number,
  at: number,
  t: number,
): void {
  const a = knot(at - 2),
    b = knot(at - 1),
    c = knot(at),
    d = knot(at + 1),
    e = knot(at + 2),
    f = knot(at + 3);
  // Degree 1: two hats; degree 2: three; degree 3: four, named by the knot they start from.
  const hatB = (d - t) / (d - c);
  const hatC = (t - c) / (d - c);
  const arcA = ((d - t) / (d - b)) * hatB;
  const arcB = ((t - b) / (d - b)) * hatB + ((e - t) / (e - c)) * hatC;
  const arcC = ((t - c) / (e - c)) * hatC;
  const last = ((t - c) / (f - c)) * arcC;
  const third = ((t - b) / (e - b)) * arcB + ((f - t) / (f - c)) * arcC;
  const first = ((d - t) / (d - a)) * arcA;
  write(out, 0, 1 - first, (3 * arcA) / (d - a), (-6 * hatB) / (d - b) / (d - a));
  write(out, 3, third + last, (3 * arcB) / (e - b), (6 * (hatB / (d - b) - hatC / (e - c))) / (e - b));
  write(out, 6, last, (3 * arcC) / (f - c), (6 * hatC) / (e - c) / (f - c));
}

function write(out: Float64Array, at: number, value: number, slope: number, bend: number): void {
  out[at] = value;
  out[at + 1] = slope;
  out[at + 2] = bend;
}
