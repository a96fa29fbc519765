/**
 * Where the key times of a group lie, and how their segments are found without a search over all of them: the time axis is cut
 * into one bucket a segment, and a bucket knows the first of its keys. Plain data; nothing is remembered between calls. Every
 * lookup has the same kinds of fields: an engine that meets two shapes compiles slower code for both.
 */
export interface TimeLookup {
  /** Holds the time of key `i` at `i * stride + offset`: a list of times, or the records that the times are part of. */
  readonly times: Float64Array;
  readonly stride: number;
  readonly offset: number;
  /** The last bucket: two fewer than there are keys. */
  readonly last: number;
  /**
   * Time of the first and of the last key, and buckets a second: 0 where the times are too close or too far apart for float64,
   * and one bucket holds them all.
   */
  readonly span: Float64Array;
  /** Keys before each bucket. Empty where the steps are so even that bucket `i` is segment `i` or a neighbour. */
  readonly firsts: Int32Array;
}

/** Keys of a bucket that are looked at one by one. */
const SCANNED = 4;

/** `count` times, each later than or equal to the one before; where some are equal, the last of them counts. */
export function timeLookup(times: Float64Array, stride: number, offset: number, count: number): TimeLookup {
  const start = times[offset];
  const end = times[(count - 1) * stride + offset];
  const density = (count - 1) / (end - start);
  const span = Float64Array.of(start, end, Number.isFinite(density) ? density : 0);
  const last = count - 2;
  const buckets = Int32Array.from({ length: count }, (_, key) =>
    bucketOf(span, last, times[key * stride + offset]),
  );
  const even = buckets.every((bucket, key) => key > last || bucket === key || bucket === key - 1);
  return { times, stride, offset, last, span, firsts: even ? new Int32Array(0) : firstKeys(buckets) };
}

/** `| 0`: where the difference overflows the product is NaN, which must be bucket 0. */
function bucketOf(span: Float64Array, last: number, time: number): number {
  const bucket = ((time - span[0]) * span[2]) | 0;
  return bucket < last ? bucket : last;
}

function firstKeys(buckets: Int32Array): Int32Array {
  const firsts = new Int32Array(buckets.length);
  let bucket = 0;
  buckets.forEach((own, key) => {
    while (bucket < own) firsts[++bucket] = key;
  });
  return firsts.fill(buckets.length, bucket + 1);
}

/** The last key whose time is not later than `t`, for a `t` after the first key and before the last. */
export function locate(lookup: TimeLookup, t: number): number {
  const { times, stride, offset, firsts } = lookup;
  const bucket = bucketOf(lookup.span, lookup.last, t);
  if (firsts.length === 0) {
    // Keys i - 1 and i alone can be in bucket i - 1, so that the segment is this one or a neighbour.
    if (t < times[bucket * stride + offset]) return bucket - 1;
    return t < times[(bucket + 1) * stride + offset] ? bucket : bucket + 1;
  }
  // Float64 keeps order through the two operations of bucketOf: keys of earlier buckets are earlier, of later ones later.
  let low = firsts[bucket];
  let high = firsts[bucket + 1];
  // Halving a few keys costs more in wrongly guessed branches than looking at each.
  while (high - low > SCANNED) {
    const middle = (low + high) >>> 1;
    if (times[middle * stride + offset] <= t) low = middle + 1;
    else high = middle;
  }
  while (low < high && times[low * stride + offset] <= t) low++;
  return low - 1;
}
