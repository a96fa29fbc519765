/**
 * Where the key times of a group lie, and how their segments are found without a search over all of them: the time axis is cut
 * into one bucket a segment, and a bucket knows the first of its keys. Plain data; nothing is remembered between calls.
 */
export interface TimeLookup {
  /** Holds the time of key `i` at `i * stride + offset`: a list of times, or the records that the times are part of. */
  readonly times: Float64Array;
  readonly stride: number;
  readonly offset: number;
  /** Keys. */
  readonly count: number;
  readonly start: number;
  readonly end: number;
  /** Buckets a second; 0 where the times are too close or too far apart for float64, and one bucket holds them all. */
  readonly scale: number;
  /** Keys in the buckets before bucket `b`. Absent where the steps are so even that bucket `i` is segment `i` or a neighbour. */
  readonly firsts: Int32Array | undefined;
}

/** `count` times, each later than or equal to the one before; where some are equal, the last of them counts. */
export function timeLookup(times: Float64Array, stride: number, offset: number, count: number): TimeLookup {
  const start = times[offset];
  const end = times[(count - 1) * stride + offset];
  const density = (count - 1) / (end - start);
  const scale = Number.isFinite(density) ? density : 0;
  const lookup: TimeLookup = { times, stride, offset, count, start, end, scale, firsts: undefined };
  return isEven(lookup) ? lookup : { ...lookup, firsts: firstKeys(lookup) };
}

/** `| 0`: an overflow in the line above makes the product NaN, which must be bucket 0. */
function bucketOf(lookup: TimeLookup, time: number): number {
  const bucket = ((time - lookup.start) * lookup.scale) | 0;
  return bucket < lookup.count - 1 ? bucket : lookup.count - 2;
}

function isEven(lookup: TimeLookup): boolean {
  for (let key = 0; key < lookup.count - 1; key++) {
    const ahead = key - bucketOf(lookup, lookup.times[key * lookup.stride + lookup.offset]);
    if (ahead !== 0 && ahead !== 1) return false;
  }
  return lookup.count > 1;
}

function firstKeys(lookup: TimeLookup): Int32Array {
  const firsts = new Int32Array(Math.max(2, lookup.count));
  let bucket = 0;
  for (let key = 0; key < lookup.count; key++) {
    const own = bucketOf(lookup, lookup.times[key * lookup.stride + lookup.offset]);
    while (bucket < own) firsts[++bucket] = key;
  }
  return firsts.fill(lookup.count, bucket + 1);
}

/** The last key whose time is not later than `t`, for `start < t < end`. */
export function locate(lookup: TimeLookup, t: number): number {
  const { times, stride, offset, firsts } = lookup;
  const bucket = bucketOf(lookup, t);
  if (firsts === undefined) {
    // Keys i - 1 and i alone can be in bucket i - 1, so that the segment is this one or a neighbour.
    if (t < times[bucket * stride + offset]) return bucket - 1;
    return t < times[(bucket + 1) * stride + offset] ? bucket : bucket + 1;
  }
  // Float64 keeps order through the two operations of bucketOf: keys of earlier buckets are earlier, of later ones later.
  let low = firsts[bucket];
  let high = firsts[bucket + 1];
  while (low < high) {
    const middle = (low + high) >>> 1;
    if (times[middle * stride + offset] <= t) low = middle + 1;
    else high = middle;
  }
  return low - 1;
}
