/**
 * Writes h, 1/(2 cos h) and h/(2 sin h) (see half-angle) of the great arc from the quaternion at `from` in `keys` to the next into
 * `out` at `at`, and gives h. The two are unit and on one side of each other, or the arc is the long way. Where they are equal
 * both weights become exactly a half, so that the sum is the key to the bit.
 */
export function writeWeights(
  out: Float64Array | Float32Array,
  at: number,
  keys: Float64Array,
  from: number,
): number {
  let apart = 0;
  let along = 0;
  for (let i = from; i < from + 4; i++) {
    apart += (keys[i + 4] - keys[i]) ** 2;
    along += (keys[i + 4] + keys[i]) ** 2;
  }
  const h = Math.atan2(Math.sqrt(apart), Math.sqrt(along));
  out[at] = h;
  out[at + 1] = 0.5 / Math.cos(h);
  out[at + 2] = h === 0 ? 0 : (0.5 * h) / Math.sin(h);
  return h;
}
