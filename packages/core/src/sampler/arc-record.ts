/** Numbers of an arc between two keys of one track; see `writeArc`. */
export const ARC = 9;

/**
 * Writes the great arc from the quaternion at `from` in `keys` to the next into `out` at `at`, and gives its h (see half-angle):
 * h, then (q₀ + q₁)/(2 cos h), then (q₁ − q₀)·h/(2 sin h). The two keys are unit and on one side of each other, or the arc is the
 * long way. Where they are equal the sum is the key to the bit and the difference is nothing.
 */
export function writeArc(
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
  const cosine = 0.5 / Math.cos(h);
  const sine = h === 0 ? 0 : (0.5 * h) / Math.sin(h);
  out[at] = h;
  for (let i = 0; i < 4; i++) {
    out[at + 1 + i] = (keys[from + 4 + i] + keys[from + i]) * cosine;
    out[at + 5 + i] = (keys[from + 4 + i] - keys[from + i]) * sine;
  }
  return h;
}
