/**
 * Where the key times of a group lie, and how their segments are found without a search over all of them: the time axis is cut
 * into equal buckets, and a bucket knows the segment that it begins in. Plain data; nothing is remembered between calls. Every
 * lookup has the same kinds of fields: an engine that meets two shapes compiles slower code for both.
 */
export interface TimeLookup {
  readonly times: Float64Array;
  /**
   * Time of the first and of the last key, and buckets a second: 0 where the times are too close or too far apart for float64,
   * and one bucket holds them all.
   */
  readonly span: Float64Array;
  /** The last bucket. */
  readonly last: number;
  /**
   * For each bucket the last key of the buckets before it; the last key of all at the end. Empty where the steps are so even
   * that bucket `i` is segment `i` or a neighbour.
   */
  readonly firsts: Int32Array;
}

/** Buckets a segment of uneven times: with two, most buckets hold no key, and the processor guesses that right. */
const FINE = 2;

/** Keys of a bucket that are stepped over one by one. */
const STEPPED = 8;

/** For times each later than or equal to the one before; where some are equal, the last of them counts. */
export function timeLookup(times: Float64Array): TimeLookup {
  const segments = times.length - 1;
  const span = Float64Array.of(times[0], times[segments], 0);
  cut(span, segments);
  const even = times.every((time, key) => {
    const bucket = bucketOf(span, segments - 1, time);
    return key === segments || bucket === key || bucket === key - 1;
  });
  if (even) return { times, span, last: segments - 1, firsts: new Int32Array(0) };
  const last = FINE * segments - 1;
  cut(span, last + 1);
  const firsts = new Int32Array(last + 2);
  let bucket = 0;
  times.forEach((time, key) => {
    const own = bucketOf(span, last, time);
    while (bucket < own) firsts[++bucket] = key - 1;
  });
  return { times, span, last, firsts: firsts.fill(segments, bucket + 1) };
}

function cut(span: Float64Array, buckets: number): void {
  const density = buckets / (span[1] - span[0]);
  span[2] = Number.isFinite(density) ? density : 0;
}

/** `| 0`: where the difference overflows the product is NaN, which must be bucket 0. */
function bucketOf(span: Float64Array, last: number, time: number): number {
  const bucket = ((time - span[0]) * span[2]) | 0;
  return bucket < last ? bucket : last;
}

/** The last key whose time is not later than `t`, for a `t` after the first key and before the last. */
export function locate({ times, span, last, firsts }: TimeLookup, t: number): number {
  // bucketOf once more: so much, and no more, does an engine build into the loop that asks.
  let key = ((t - span[0]) * span[2]) | 0;
  if (key > last) key = last;
  if (firsts.length === 0) {
    if (t < times[key]) return key - 1;
  } else {
    // Float64 keeps order through the two operations of a bucket: keys of earlier buckets are earlier.
    const end = firsts[key + 1];
    key = firsts[key];
    if (end - key > STEPPED) return halve(times, key, end, t);
  }
  while (t >= times[key + 1]) key++;
  return key;
}

/** The last key not later than `t`, which is not before key `low` and before the one after `high`. */
function halve(times: Float64Array, low: number, high: number, t: number): number {
  while (low < high) {
    const middle = (low + high + 1) >>> 1;
    if (times[middle] <= t) low = middle;
    else high = middle - 1;
  }
  return low;
}
