/**
 * Greatest and least of many numbers, asked for any stretch without going through them all: level 0 holds the numbers, each
 * level above holds the extremes of `FACTOR` of the one below. 1/(FACTOR − 1) of the numbers' own room, twice.
 */
export interface Pyramid {
  readonly length: number;
  readonly greatest: readonly Float32Array[];
  readonly least: readonly Float32Array[];
}

/** Extremes of a stretch. */
export interface Extremes {
  readonly greatest: number;
  readonly least: number;
}

const FACTOR = 4;

/**
 * Builds the pyramid over `greatest` (and `least`, the same numbers where left out). Numbers that are not finite are read as 0.
 * float32 rounds to nearest; a spike may move by 6e-8 of its size and never vanishes.
 */
export function buildPyramid(greatest: ArrayLike<number>, least: ArrayLike<number> = greatest): Pyramid {
  const tops = [finite(greatest)];
  const bottoms = [least === greatest ? tops[0] : finite(least)];
  while (tops[tops.length - 1].length > 1) {
    tops.push(reduce(tops[tops.length - 1], Math.max));
    bottoms.push(reduce(bottoms[bottoms.length - 1], Math.min));
  }
  return { length: greatest.length, greatest: tops, least: bottoms };
}

/** Extremes of the numbers `from` to `to`, both counted in; held to the numbers there are. 0 and 0 without any. */
export function queryPyramid(pyramid: Pyramid, from: number, to: number): Extremes {
  let low = Math.max(0, Math.floor(from));
  let high = Math.min(pyramid.length - 1, Math.floor(to));
  if (high < low) return { greatest: 0, least: 0 };
  let greatest = -Infinity;
  let least = Infinity;
  for (let level = 0; low <= high; level++) {
    const tops = pyramid.greatest[level];
    const bottoms = pyramid.least[level];
    // Edges that don't fill a whole block of the level above are read here; the rest one level up.
    while (low <= high && (low % FACTOR !== 0 || level === pyramid.greatest.length - 1)) {
      greatest = Math.max(greatest, tops[low]);
      least = Math.min(least, bottoms[low]);
      low++;
    }
    while (low <= high && high % FACTOR !== FACTOR - 1) {
      greatest = Math.max(greatest, tops[high]);
      least = Math.min(least, bottoms[high]);
      high--;
    }
    low = low / FACTOR;
    high = Math.floor(high / FACTOR);
  }
  return { greatest, least };
}

function reduce(level: Float32Array, pick: (...values: number[]) => number): Float32Array {
  const above = new Float32Array(Math.ceil(level.length / FACTOR));
  for (let i = 0; i < above.length; i++) {
    let best = level[i * FACTOR];
    const end = Math.min(level.length, (i + 1) * FACTOR);
    for (let j = i * FACTOR + 1; j < end; j++) best = pick(best, level[j]);
    above[i] = best;
  }
  return above;
}

function finite(values: ArrayLike<number>): Float32Array {
  const numbers = Float32Array.from(values);
  for (let i = 0; i < numbers.length; i++) if (!Number.isFinite(numbers[i])) numbers[i] = 0;
  return numbers;
}
