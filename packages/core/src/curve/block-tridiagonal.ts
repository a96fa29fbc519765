/**
 * A system of linear equations in vectors x_1 … x_n of three numbers: below_i x_{i−1} + d_i x_i + above_i x_{i+1} = b_i, `below` and
 * `above` 3×3 matrices (nine numbers each, rows first; `below` of the first and `above` of the last are not read), d_i numbers.
 * Eliminated once; `solve` then takes any right side, in place (three numbers each).
 *
 * Block elimination without exchange of rows (L. H. Thomas 1949, from memory): sound where the diagonal outweighs the rest, as in
 * splines.
 * @internal
 */
export function blockTridiagonal(
  diagonal: Float64Array,
  below: Float64Array,
  above: Float64Array,
): (right: Float64Array) => void {
  const count = diagonal.length;
  const inverses = new Float64Array(9 * count);
  const factors = new Float64Array(9 * count);
  const pivot = new Float64Array(9);
  for (let i = 0; i < count; i++) {
    pivot.fill(0);
    pivot[0] = pivot[4] = pivot[8] = diagonal[i];
    if (i > 0) {
      const factor = factors.subarray(9 * i, 9 * i + 9);
      addProduct(factor, below.subarray(9 * i), inverses.subarray(9 * i - 9), 1);
      addProduct(pivot, factor, above.subarray(9 * i - 9), -1);
    }
    invert(inverses.subarray(9 * i, 9 * i + 9), pivot);
  }
  const vector = new Float64Array(3);
  return (right) => {
    for (let i = 1; i < count; i++) subtractApplied(right, 3 * i, factors, 9 * i, right, 3 * i - 3);
    for (let i = count - 1; i >= 0; i--) {
      if (i + 1 < count) subtractApplied(right, 3 * i, above, 9 * i, right, 3 * i + 3);
      vector.set(right.subarray(3 * i, 3 * i + 3));
      right.fill(0, 3 * i, 3 * i + 3);
      subtractApplied(right, 3 * i, inverses, 9 * i, vector, 0, -1);
    }
  };
}

/** out += sign · a b */
function addProduct(out: Float64Array, a: Float64Array, b: Float64Array, sign: 1 | -1): void {
  for (let row = 0; row < 3; row++)
    for (let column = 0; column < 3; column++)
      for (let k = 0; k < 3; k++) out[3 * row + column] += sign * a[3 * row + k] * b[3 * k + column];
}

/** out −= sign · m v */
function subtractApplied(
  out: Float64Array,
  at: number,
  m: Float64Array,
  mAt: number,
  v: Float64Array,
  vAt: number,
  sign: 1 | -1 = 1,
): void {
  for (let row = 0; row < 3; row++)
    for (let k = 0; k < 3; k++) out[at + row] -= sign * m[mAt + 3 * row + k] * v[vAt + k];
}

function invert(out: Float64Array, m: Float64Array): void {
  for (let row = 0; row < 3; row++)
    for (let column = 0; column < 3; column++) {
      // The cofactor of (column, row), its sign by going round.
      const [a, b] = [3 * ((column + 1) % 3), 3 * ((column + 2) % 3)];
      const [c, d] = [(row + 1) % 3, (row + 2) % 3];
      out[3 * row + column] = m[a + c] * m[b + d] - m[a + d] * m[b + c];
    }
  const determinant = m[0] * out[0] + m[1] * out[3] + m[2] * out[6];
  for (let n = 0; n < 9; n++) out[n] /= determinant;
}
