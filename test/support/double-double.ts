/**
 * A number as the unevaluated sum of two float64, some 32 digits: T. J. Dekker's and D. E. Knuth's exact sums and products
 * (from memory). For checking float64 results against; slow, allocates.
 */
export type Double2 = readonly [number, number];

const SPLITTER = 2 ** 27 + 1;

function quickSum(a: number, b: number): Double2 {
  const sum = a + b;
  return [sum, b - (sum - a)];
}

function exactSum(a: number, b: number): Double2 {
  const sum = a + b;
  const part = sum - a;
  return [sum, a - (sum - part) + (b - part)];
}

function exactProduct(a: number, b: number): Double2 {
  const product = a * b;
  const [ah, bh] = [SPLITTER * a - (SPLITTER * a - a), SPLITTER * b - (SPLITTER * b - b)];
  const [al, bl] = [a - ah, b - bh];
  return [product, ah * bh - product + ah * bl + al * bh + al * bl];
}

export function add(a: Double2, b: Double2): Double2 {
  const [high, low] = exactSum(a[0], b[0]);
  const [high2, low2] = exactSum(a[1], b[1]);
  const [sum, rest] = quickSum(high, low + high2);
  return quickSum(sum, rest + low2);
}

export function negate(a: Double2): Double2 {
  return [-a[0], -a[1]];
}

export function times(a: Double2, b: Double2): Double2 {
  const [high, low] = exactProduct(a[0], b[0]);
  return quickSum(high, low + (a[0] * b[1] + a[1] * b[0]));
}

export function over(a: Double2, b: Double2): Double2 {
  const first = a[0] / b[0];
  const rest = add(a, negate(times(b, [first, 0])));
  const second = rest[0] / b[0];
  const rest2 = add(rest, negate(times(b, [second, 0])));
  return add(quickSum(first, second), [rest2[0] / b[0], 0]);
}

export function root(a: Double2): Double2 {
  if (a[0] === 0) return [0, 0];
  const guess: Double2 = [Math.sqrt(a[0]), 0];
  // Newton twice: 16 digits to 32, and once more for the last of them.
  const once = times([0.5, 0], add(guess, over(a, guess)));
  return times([0.5, 0], add(once, over(a, once)));
}

/** Sine and cosine, |a| ≤ 4: the series at a/64, doubled six times. */
export function sineAndCosine(a: Double2): { sine: Double2; cosine: Double2 } {
  const x: Double2 = [a[0] / 64, a[1] / 64];
  const square = negate(times(x, x));
  let term: Double2 = [1, 0];
  let sine: Double2 = [0, 0];
  // 1 − cos, which keeps its digits where the angle is small.
  let versine: Double2 = [0, 0];
  for (let n = 0; n < 26; n += 2) {
    const odd = over(times(term, x), [n + 1, 0]);
    sine = add(sine, odd);
    term = over(times(term, square), [(n + 1) * (n + 2), 0]);
    versine = add(versine, negate(term));
  }
  for (let n = 0; n < 6; n++) {
    const doubled = times([2, 0], times(sine, sine));
    sine = times([2, 0], times(sine, add([1, 0], negate(versine))));
    versine = doubled;
  }
  return { sine, cosine: add([1, 0], negate(versine)) };
}

/** The angle of the point (x, y): float64's own, corrected by one Newton step on its sine and cosine. */
export function angleOf(y: Double2, x: Double2): Double2 {
  const length = root(add(times(x, x), times(y, y)));
  const guess: Double2 = [Math.atan2(y[0], x[0]), 0];
  const { sine, cosine } = sineAndCosine(guess);
  const off = add(times(y, cosine), negate(times(x, sine)));
  return add(guess, over(off, length));
}
