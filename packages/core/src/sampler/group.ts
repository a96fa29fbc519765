import type { NumberStore } from '../number-store.js';

/**
 * Tracks that share their key times, compiled: writes the orientation of each at `t` seconds into `out`, four numbers at
 * `at` + the track's slot. Allocates nothing, keeps nothing.
 */
export type WriteGroup = (t: number, out: NumberStore, at: number) => void;

/** Key values of tracks that share their times, before they are laid out for sampling. */
export interface SharedTimes {
  /** Seconds, none earlier than the one before. At least one. */
  readonly times: Float64Array;
  /** For each track its numbers, key after key: 4 a key, CUBICSPLINE 12. */
  readonly values: readonly Float64Array[];
  /** For each track where its four numbers go in a pose. */
  readonly slots: Int32Array;
}

/** Copy of the orientations of one key, from `from` on. */
export function writeKeys(
  numbers: Float64Array | Float32Array,
  from: number,
  slots: Int32Array,
  out: NumberStore,
  at: number,
): void {
  for (let i = 0; i < slots.length; i++, from += 4) {
    const to = at + slots[i];
    out[to] = numbers[from];
    out[to + 1] = numbers[from + 1];
    out[to + 2] = numbers[from + 2];
    out[to + 3] = numbers[from + 3];
  }
}
