/**
 * Turns a symmetric matrix (`size`², rows or columns alike) in place into its eigenvalues, on the diagonal, and fills `vectors`
 * (`size`², columns first) with its unit eigenvectors, column n belonging to diagonal number n. Cyclic Jacobi: C. G. J. Jacobi
 * 1846, as in every textbook of numerical algebra (from memory); for these 3×3 and 4×4 matrices six sweeps reach rounding.
 * @internal
 */
export function symmetricEigen(matrix: Float64Array, vectors: Float64Array, size: number): void {
  vectors.fill(0);
  for (let n = 0; n < size; n++) vectors[n * size + n] = 1;
  for (let sweep = 0; sweep < 12; sweep++)
    for (let p = 0; p < size - 1; p++)
      for (let q = p + 1; q < size; q++) rotatePair(matrix, vectors, size, p, q);
}

/** Column of the largest eigenvalue on the diagonal. @internal */
export function largestOnDiagonal(matrix: Float64Array, size: number): number {
  let best = 0;
  for (let n = 1; n < size; n++) if (matrix[n * size + n] > matrix[best * size + best]) best = n;
  return best;
}

/** The plane rotation that makes element (p, q) zero. */
function rotatePair(matrix: Float64Array, vectors: Float64Array, size: number, p: number, q: number): void {
  const off = matrix[p * size + q];
  if (off === 0) return;
  const theta = (matrix[q * size + q] - matrix[p * size + p]) / (2 * off);
  const tangent = (theta < 0 ? -1 : 1) / (Math.abs(theta) + Math.hypot(theta, 1));
  const cosine = 1 / Math.hypot(tangent, 1);
  const sine = tangent * cosine;
  for (let n = 0; n < size; n++) rotateNumbers(matrix, n * size + p, n * size + q, cosine, sine);
  for (let n = 0; n < size; n++) rotateNumbers(matrix, p * size + n, q * size + n, cosine, sine);
  for (let n = 0; n < size; n++) rotateNumbers(vectors, p * size + n, q * size + n, cosine, sine);
  matrix[p * size + q] = 0;
  matrix[q * size + p] = 0;
}

function rotateNumbers(numbers: Float64Array, a: number, b: number, cosine: number, sine: number): void {
  const x = numbers[a];
  const y = numbers[b];
  numbers[a] = cosine * x - sine * y;
  numbers[b] = sine * x + cosine * y;
}
