/** A repeatable stream of random numbers. */
export interface SeededNumbers {
  /** Evenly spread in [0, 1). */
  next(): number;
  /** Mean 0, standard deviation 1. */
  normal(): number;
}

/**
 * Numbers that follow from `seed` alone: mulberry32 (T. Ettinger, public domain; from memory), a Weyl sequence put through two
 * multiply-and-shift rounds. Integer arithmetic only, hence equal on every machine. It passes for noise in a demo and is fit for
 * nothing else.
 */
export function seededNumbers(seed: number): SeededNumbers {
  let state = seed | 0;
  const next = (): number => {
    state = (state + 0x6d2b79f5) | 0;
    let mixed = Math.imul(state ^ (state >>> 15), state | 1);
    mixed ^= mixed + Math.imul(mixed ^ (mixed >>> 7), mixed | 61);
    return ((mixed ^ (mixed >>> 14)) >>> 0) / 2 ** 32;
  };
  return { next, normal: () => sumOfTwelve(next) - 6 };
}

/** Twelve even draws have variance 12/12 = 1 and need additions only, where other recipes call on the machine's logarithm. */
function sumOfTwelve(next: () => number): number {
  let sum = 0;
  for (let draw = 0; draw < 12; draw++) sum += next();
  return sum;
}
