import type { ReadonlyNumberStore } from '../number-store.js';

/**
 * Number of the segment that `t` lies in: the `i` with `times[i] <= t < times[i + 1]`, the first segment before the first time,
 * the last from the last time on, 0 with fewer than two times. Times ascend. Binary search, no state.
 */
export function findSegment(times: ReadonlyNumberStore, t: number): number {
  let low = 0;
  let high = times.length - 1;
  while (low + 1 < high) {
    const middle = (low + high) >>> 1;
    if (times[middle] <= t) low = middle;
    else high = middle;
  }
  return low;
}
