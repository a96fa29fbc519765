/** A key as it is drawn: a short upright with a flat cap. */
export interface Post {
  readonly key: number;
  /** CSS pixels from the row's left. */
  readonly x: number;
  /** Kept key: a double cap. */
  readonly kept: boolean;
}

/** A stretch whose keys stand too close to be told apart: a rail, with how far apart they are. */
export interface Rail {
  readonly from: number;
  readonly to: number;
  /** Mean time between its keys, seconds. */
  readonly gap: number;
}

export interface KeyLine {
  readonly posts: readonly Post[];
  readonly rails: readonly Rail[];
}

/** Posts closer than this are drawn as a rail, px. */
const TOO_CLOSE = 5;
/** A rail is at least this many keys: two close keys are still two posts. */
const RAIL_KEYS = 6;

/** Keys of `[from, to]` seconds on `width` pixels. */
export function keyLine(
  times: ArrayLike<number>,
  from: number,
  to: number,
  width: number,
  kept: readonly number[] = [],
): KeyLine {
  const posts: Post[] = [];
  const rails: Rail[] = [];
  const keptKeys = new Set(kept);
  const at = (key: number): number => ((times[key] - from) / (to - from)) * width;
  const end = firstKeyAfter(times, to);
  for (let key = firstKeyAt(times, from); key < end;) {
    let last = key;
    while (last + 1 < end && at(last + 1) - at(last) < TOO_CLOSE) last++;
    if (last - key + 1 < RAIL_KEYS)
      for (let k = key; k <= last; k++) posts.push({ key: k, x: at(k), kept: keptKeys.has(k) });
    else {
      rails.push({
        from: at(key),
        to: at(last),
        gap: (times[last] - times[key]) / (last - key),
      });
      for (const k of kept) if (k >= key && k <= last) posts.push({ key: k, x: at(k), kept: true });
    }
    key = last + 1;
  }
  return { posts, rails };
}

/** Number of the first key at or after `time`; `times.length` where there is none. */
export function firstKeyAt(times: ArrayLike<number>, time: number): number {
  return search(times, (t) => t >= time - TIE);
}

/** Number of the first key after `time`. */
export function firstKeyAfter(times: ArrayLike<number>, time: number): number {
  return search(times, (t) => t > time + TIE);
}

/** The key closest to `time`; -1 without keys. */
export function nearestKey(times: ArrayLike<number>, time: number): number {
  const after = Math.min(times.length - 1, firstKeyAt(times, time));
  const before = Math.max(0, after - 1);
  if (times.length === 0) return -1;
  return Math.abs(times[before] - time) <= Math.abs(times[after] - time) ? before : after;
}

/** Times closer than this are one, seconds: float32 holds an hour to 0.2 ms, and no file steps finer than 1e-6. */
const TIE = 1e-7;

function search(times: ArrayLike<number>, after: (time: number) => boolean): number {
  let low = 0;
  let high = times.length;
  while (low < high) {
    const middle = (low + high) >> 1;
    if (after(times[middle])) high = middle;
    else low = middle + 1;
  }
  return low;
}
