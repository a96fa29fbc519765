/** The middle of some numbers, the mean of the middle two; NaN entries are left out, and NaN without any. */
export function median(values: Iterable<number>): number {
  const sorted = Float64Array.from(values).filter((value) => !Number.isNaN(value));
  if (sorted.length === 0) return Number.NaN;
  sorted.sort();
  const middle = sorted.length >> 1;
  const upper = sorted[middle] ?? Number.NaN;
  return sorted.length % 2 === 1 ? upper : ((sorted[middle - 1] ?? upper) + upper) / 2;
}
