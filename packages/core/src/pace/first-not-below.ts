import type { ReadonlyNumberStore } from '../number-store.js';

/** First index whose number is at least `wanted`, of numbers that never fall; the last one where none is. */
export function firstNotBelow(numbers: ReadonlyNumberStore, wanted: number): number {
  let low = 0;
  let high = numbers.length - 1;
  while (low < high) {
    const middle = (low + high) >> 1;
    if (numbers[middle] >= wanted) high = middle;
    else low = middle + 1;
  }
  return low;
}
