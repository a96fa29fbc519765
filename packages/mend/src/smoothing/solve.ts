/**
 * Solves A·X = B for a symmetric positive definite A by Cholesky's factors; a direction that A does not hold gets 0. Both are overwritten.
 *
 * @param a `size` × `size`, row by row
 * @param b `size` × `columns`, row by row; holds X afterwards
 */
export function solveSymmetric(a: Float64Array, b: Float64Array, size: number, columns: number): void {
  const scale = Math.max(...Array.from({ length: size }, (_, i) => a[i * size + i]));
  for (let j = 0; j < size; j++) {
    for (let i = j; i < size; i++) {
      let sum = a[i * size + j];
      for (let k = 0; k < j; k++) sum -= a[i * size + k] * a[j * size + k];
      if (i > j) a[i * size + j] = a[j * size + j] === Infinity ? 0 : sum / a[j * size + j];
      else a[j * size + j] = sum > 1e-12 * scale ? Math.sqrt(sum) : Infinity;
    }
  }
  for (let column = 0; column < columns; column++) {
    for (let i = 0; i < size; i++) {
      let sum = b[i * columns + column];
      for (let k = 0; k < i; k++) sum -= a[i * size + k] * b[k * columns + column];
      b[i * columns + column] = sum / a[i * size + i];
    }
    for (let i = size - 1; i >= 0; i--) {
      let sum = b[i * columns + column];
      for (let k = i + 1; k < size; k++) sum -= a[k * size + i] * b[k * columns + column];
      b[i * columns + column] = sum / a[i * size + i];
    }
  }
}
