/** Even numbers in [0, 1) by M. E. O'Neill's kind of small generator (mulberry32, public domain): the same for the same seed. */
export function seededRandom(seed: number): () => number {
  let state = seed >>> 0;
  return () => {
    state = (state + 0x6d2b79f5) >>> 0;
    let mixed = Math.imul(state ^ (state >>> 15), state | 1);
    mixed ^= mixed + Math.imul(mixed ^ (mixed >>> 7), mixed | 61);
    return ((mixed ^ (mixed >>> 14)) >>> 0) / 2 ** 32;
  };
}

/** A unit quaternion, evenly spread over orientations (K. Shoemake 1992, from memory). */
export function randomQuaternion(random: () => number): number[] {
  const u = random();
  const a = 2 * Math.PI * random();
  const b = 2 * Math.PI * random();
  const s = Math.sqrt(1 - u);
  const c = Math.sqrt(u);
  return [s * Math.sin(a), s * Math.cos(a), c * Math.sin(b), c * Math.cos(b)];
}
