/** Mulberry32, public domain (T. Ettinger); from memory. The same numbers on every machine. */
export function seeded(seed: number): () => number {
  let state = seed >>> 0;
  return () => {
    state = (state + 0x6d2b79f5) >>> 0;
    let mixed = Math.imul(state ^ (state >>> 15), state | 1);
    mixed ^= mixed + Math.imul(mixed ^ (mixed >>> 7), mixed | 61);
    return ((mixed ^ (mixed >>> 14)) >>> 0) / 4294967296;
  };
}

/** Unit quaternion of float32 numbers, uniform over all orientations: four normal numbers made unit. */
export function randomOrientation(random: () => number): Float32Array {
  const q = Float32Array.from({ length: 4 }, () => normal(random));
  return unit(q);
}

/** `q` turned by `angle` radians about a random axis of its own. */
export function turned(q: Float32Array, angle: number, random: () => number): Float32Array {
  const [x, y, z] = [normal(random), normal(random), normal(random)];
  const sine = Math.sin(angle / 2) / Math.hypot(x, y, z);
  const [ax, ay, az, aw] = [x * sine, y * sine, z * sine, Math.cos(angle / 2)];
  const [bx, by, bz, bw] = q;
  return unit(
    Float32Array.of(
      bw * ax + bx * aw + by * az - bz * ay,
      bw * ay - bx * az + by * aw + bz * ax,
      bw * az + bx * ay - by * ax + bz * aw,
      bw * aw - bx * ax - by * ay - bz * az,
    ),
  );
}

/** A walk of `keys` orientations, 4 numbers each, `step` radians apart on average. */
export function walk(keys: number, step: number, random: () => number): Float32Array {
  const values = new Float32Array(4 * keys);
  let q = randomOrientation(random);
  for (let key = 0; key < keys; key++) {
    values.set(q, 4 * key);
    q = turned(q, step * (0.5 + random()), random);
  }
  return values;
}

/** Seconds, float32 as a file stores them: 30 a second, or steps of a sixth to one and five sixths of that. */
export function keyTimes(keys: number, even: boolean, random: () => number): Float32Array {
  const times = new Float32Array(keys);
  let time = 0;
  for (let key = 0; key < keys; key++) {
    times[key] = even ? key / 30 : time;
    time += (1 / 30) * (even ? 1 : 1 / 6 + (random() * 10) / 6);
  }
  return times;
}

/** `count` times of a playback at 60 frames a second that begins anywhere and starts over at the end. */
export function playbackTimes(times: Float32Array, count: number, random: () => number): Float64Array {
  const end = times[times.length - 1];
  const from = random() * end;
  return Float64Array.from({ length: count }, (_, i) => (from + i / 60) % end);
}

export function scrubTimes(times: Float32Array, count: number, random: () => number): Float64Array {
  const end = times[times.length - 1];
  return Float64Array.from({ length: count }, () => random() * end);
}

function normal(random: () => number): number {
  return Math.sqrt(-2 * Math.log(1 - random())) * Math.cos(2 * Math.PI * random());
}

function unit(q: Float32Array): Float32Array {
  const length = Math.hypot(...q);
  return q.map((number) => number / length);
}
