import type { ReadonlyNumberStore } from '../number-store.js';

/** Times among which a search is as quick as a guess. */
const FEW = 4;

/**
 * Number of the segment that `t` lies in: the `i` with `times[i] <= t < times[i + 1]`, the first segment before the first time,
 * the last from the last time on, 0 with fewer than two times. Times ascend. Binary search, no state; even times are guessed first.
 */
export function findSegment(times: ReadonlyNumberStore, t: number): number {
  let low = 0;
  let high = times.length - 1;
  if (high > FEW) {
    const guess = Math.floor(((t - times[0]) / (times[high] - times[0])) * high);
    if (guess > 0 && guess < high) {
      if (times[guess] <= t) {
        low = guess;
        if (times[guess + 1] > t) return guess;
      } else {
        high = guess;
        if (times[guess - 1] <= t) return guess - 1;
      }
    }
  }
  while (low + 1 < high) {
    const middle = (low + high) >>> 1;
    if (times[middle] <= t) low = middle;
    else high = middle;
  }
  return low;
}
