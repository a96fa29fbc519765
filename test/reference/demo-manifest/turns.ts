// Quaternion maths of the independent reading of the demo scene: [x, y, z, w], degrees outside, textbook formulas.
export type Quat = readonly [number, number, number, number];
export type Vec = readonly [number, number, number];

const DEGREES = 180 / Math.PI;

function times(a: Quat, b: Quat): Quat {
  const [ax, ay, az, aw] = a;
  const [bx, by, bz, bw] = b;
  return [
    aw * bx + ax * bw + ay * bz - az * by,
    aw * by - ax * bz + ay * bw + az * bx,
    aw * bz + ax * by - ay * bx + az * bw,
    aw * bw - ax * bx - ay * by - az * bz,
  ];
}

function inverse([x, y, z, w]: Quat): Quat {
  return [-x, -y, -z, w];
}

export function unit(q: Quat): Quat {
  const length = Math.hypot(...q);
  return [q[0] / length, q[1] / length, q[2] / length, q[3] / length];
}

/** Shortest turn from a to b as axis times degrees, in a's own axes. */
export function turnVector(a: Quat, b: Quat): Vec {
  const [x, y, z, w] = times(inverse(a), b);
  const sine = Math.hypot(x, y, z);
  if (sine === 0) return [0, 0, 0];
  const scale = ((w < 0 ? -1 : 1) * 2 * Math.atan2(sine, Math.abs(w)) * DEGREES) / sine;
  return [x * scale, y * scale, z * scale];
}

export function turnBetween(a: Quat, b: Quat): number {
  return size(turnVector(a, b));
}

/** Where on the shortest arc from a to b a share of the turn is done. */
export function between(a: Quat, b: Quat, share: number): Quat {
  const vector = turnVector(a, b);
  const angle = size(vector);
  if (angle === 0) return a;
  const half = (angle * share) / 2 / DEGREES;
  const sine = Math.sin(half) / angle;
  return times(a, [vector[0] * sine, vector[1] * sine, vector[2] * sine, Math.cos(half)]);
}

/** A vector in own axes seen in parent axes. */
export function turned(q: Quat, v: Vec): Vec {
  const [x, y, z] = times(times(q, [v[0], v[1], v[2], 0]), inverse(q));
  return [x, y, z];
}

export function size(v: Vec): number {
  return Math.hypot(...v);
}

export function inner(a: Vec, b: Vec): number {
  return a[0] * b[0] + a[1] * b[1] + a[2] * b[2];
}

/** Degrees between two directions. */
export function spread(a: Vec, b: Vec): number {
  const cross = [a[1] * b[2] - a[2] * b[1], a[2] * b[0] - a[0] * b[2], a[0] * b[1] - a[1] * b[0]];
  return Math.atan2(Math.hypot(...cross), inner(a, b)) * DEGREES;
}

/** The sum of vectors with weights. */
export function weighted(parts: readonly (readonly [number, Vec])[]): Vec {
  const sum = [0, 0, 0];
  for (const [weight, v] of parts) for (let axis = 0; axis < 3; axis++) sum[axis] += weight * v[axis];
  return [sum[0], sum[1], sum[2]];
}

/** Two keys that are one: nothing below 1e-9° is a turn, however a product of quaternions rounds. */
export function isStill(degrees: number): boolean {
  return degrees < 1e-9;
}

export function median(values: readonly number[]): number {
  const sorted = ascending(values);
  const middle = sorted.length >> 1;
  return sorted.length % 2 ? sorted[middle] : (sorted[middle - 1] + sorted[middle]) / 2;
}

export function ascending(values: readonly number[]): number[] {
  const sorted = Float64Array.from(values);
  sorted.sort();
  return [...sorted];
}
