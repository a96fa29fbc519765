/**
 * Polynomials near functions of √u on [0, end], fitted in fixed-point integers of 200 bits, so that nothing is lost before
 * the last rounding to float64. The Taylor series is written in Chebyshev polynomials of the interval and cut at `degree`; the
 * coefficients fall so fast that this is within a few per cent of the minimax polynomial (T. J. Rivlin, The Chebyshev
 * Polynomials, 1974, chapter 3; from memory).
 */

const BITS = 200n;
const ONE = 1n << BITS;
// u is at most 0.62 for the first two and 0.08 for the third: what is left out is below 1e-25.
const TERMS = 24;

const times = (a: bigint, b: bigint): bigint => (a * b) >> BITS;

/** A float64 as fixed point: exact, its least bit is above 2^-200 for the sizes used here. */
function fixed(value: number): bigint {
  const scale = 2 ** 60;
  const high = Math.trunc(value * scale);
  return (
    (BigInt(high) << (BITS - 60n)) + (BigInt(Math.trunc((value * scale - high) * scale)) << (BITS - 120n))
  );
}

function toNumber(value: bigint): number {
  const negative = value < 0n;
  const size = negative ? -value : value;
  const shift = BigInt(Math.max(0, size.toString(2).length - 64));
  // 64 bits hold a float64's 53 and the bits that decide its rounding.
  const number = Number(size >> shift) * 2 ** (Number(shift) - Number(BITS));
  return negative ? -number : number;
}

/** cos √u, sin √u / √u and arcsin √u / √u. */
export type Fitted = 'cos' | 'sin' | 'arcsin';

/** Taylor coefficients in u. */
function taylor(of: Fitted): bigint[] {
  if (of === 'arcsin') return arcsineSeries();
  const odd = of === 'sin' ? 1 : 0;
  const terms = [ONE];
  for (let i = 1; i < TERMS; i++) terms.push(-terms[i - 1] / BigInt((2 * i - 1 + odd) * (2 * i + odd)));
  return terms;
}

/** (2n)! / (4ⁿ n!² (2n + 1)). */
function arcsineSeries(): bigint[] {
  const terms: bigint[] = [];
  let middle = ONE;
  for (let n = 0; n < TERMS; n++) {
    terms.push(middle / BigInt(2 * n + 1));
    middle = (middle * BigInt(2 * n + 1)) / BigInt(2 * n + 2);
  }
  return terms;
}

/** `p(a x + b)` for `p` in rising powers. */
function substitute(p: readonly bigint[], a: bigint, b: bigint): bigint[] {
  let sum: bigint[] = [0n];
  for (let power = p.length - 1; power >= 0; power--) {
    const next = Array.from({ length: sum.length + 1 }, () => 0n);
    sum.forEach((s, i) => {
      next[i] += times(s, b);
      next[i + 1] += times(s, a);
    });
    next[0] += p[power];
    sum = next;
  }
  return sum.slice(0, p.length);
}

/** Rising powers of T_0 … T_n on [-1, 1], whole numbers. */
function chebyshev(n: number): bigint[][] {
  const rows: bigint[][] = [[1n], [0n, 1n]];
  for (let k = 2; k <= n; k++) {
    const row = [0n, ...rows[k - 1].map((c) => 2n * c)];
    rows[k - 2].forEach((c, i) => (row[i] -= c));
    rows.push(row);
  }
  return rows;
}

/** Coefficients in rising powers of u, `degree + 1` of them. */
export function fitHalfAngle(of: Fitted, end: number, degree: number): number[] {
  const half = fixed(end) / 2n;
  const inX = substitute(taylor(of), half, half);
  const basis = chebyshev(inX.length - 1);
  const kept: bigint[] = Array.from({ length: degree + 1 }, () => 0n);
  for (let k = inX.length - 1; k >= 0; k--) {
    // The leading coefficient of T_k is 2^(k-1).
    const weight = k < 2 ? inX[k] : inX[k] >> BigInt(k - 1);
    basis[k].forEach((c, i) => {
      inX[i] -= weight * c;
      if (k <= degree) kept[i] += weight * c;
    });
  }
  const inverse = (ONE * ONE) / half;
  return substitute(kept, inverse, -ONE).map(toNumber);
}

function polynomial(p: readonly bigint[], u: bigint): bigint {
  return p.reduceRight((sum, coefficient) => times(sum, u) + coefficient, 0n);
}

/** Greatest distance of a polynomial, its float64 coefficients taken as exact, from the function on a grid of [0, end]. */
export function greatestError(of: Fitted, coefficients: readonly number[], end: number): number {
  const series = taylor(of);
  const fitted = coefficients.map(fixed);
  let worst = 0;
  for (let i = 0; i <= 400; i++) {
    const u = (fixed(end) * BigInt(i)) / 400n;
    worst = Math.max(worst, Math.abs(toNumber(polynomial(series, u) - polynomial(fitted, u))));
  }
  return worst;
}
