import { type RotationTrack, SlewcurveError, VALUES_PER_KEY, replaceTrack } from '@slewcurve/core';
import { placeOf } from '../acted-keys.js';
import { sentenceOf } from '../clauses.js';
import { editResult, sameNumbers } from '../edit-result.js';
import type { Step } from '../step.js';
import type { EditResult, Verb } from '../verb.js';
import { refuseParts } from '../whole-track.js';

/**
 * Puts keys in the order of their times, those of one time in the order in which they stand, and drops what repeats a key to the bit, time and numbers.
 * Every number of a key that stays is the old one. Two keys of one time that differ both stay: which of them is meant, or whether a cut is, only people
 * know.
 */
export const sortTimes: Verb = Object.freeze({
  name: 'sort times',
  summary: 'Puts keys in the order of their times and drops exact repeats; every drop is listed.',
  alsoCalled: [
    'sort keys',
    'duplicate keys',
    'unordered times',
    'merge keys',
    'deduplicate',
    'monotonic times',
  ],
  opening: 'Sort the times of',
  reads: [] as const,
  needsAllowing: false,
  keysApart: false,
  insertsKeys: false,
  movesTimes: true,
  say: (step: Step) => sentenceOf('Sort the times of', step),
  apply(track: RotationTrack, step: Step): EditResult {
    refuseParts(track, step, ['span']);
    const { times } = track;
    const timeless = times.findIndex((time) => !Number.isFinite(time));
    if (timeless >= 0)
      throw new SlewcurveError(
        'step.bad-times',
        `Key ${timeless} has no time, so it has no place in their order. Drop it at the source.`,
        placeOf(track, timeless),
      );
    const oldKeys = keptInOrder(track, new Set(step.keep));
    const size = VALUES_PER_KEY[track.interpolation];
    const values = new Float64Array(size * oldKeys.length);
    oldKeys.forEach((old, key) =>
      values.set(track.values.subarray(old * size, (old + 1) * size), key * size),
    );
    const after = replaceTrack(track, {
      times: Float64Array.from(oldKeys, (old) => times[old]),
      values,
      breaks: breaksAmong(track, oldKeys),
    });
    return editResult(track, after, { oldKeys });
  },
});

/** Old numbers of the keys that stay, by time. */
function keptInOrder(track: RotationTrack, keep: ReadonlySet<number>): number[] {
  const { times } = track;
  const order = Array.from(times.keys());
  // Sorting is stable (ECMAScript 2019), so that keys of one time keep their order.
  order.sort((a, b) => times[a] - times[b]);
  const kept: number[] = [];
  let firstOfTime = 0;
  for (const key of order) {
    if (kept.length > 0 && times[key] !== times[kept[kept.length - 1]]) firstOfTime = kept.length;
    const repeats = kept.slice(firstOfTime).some((other) => sameNumbers(track, key, track, other));
    if (!repeats || keep.has(key)) kept.push(key);
  }
  return kept;
}

/** Cuts after the keys that had them, or after the twin that was kept; none after the last key. */
function breaksAmong(track: RotationTrack, oldKeys: readonly number[]): number[] {
  const broken = track.breaks.map((old) =>
    oldKeys.findIndex((other) => other === old || sameNumbers(track, other, track, old)),
  );
  const unique = [...new Set(broken)].filter((key) => key >= 0 && key < oldKeys.length - 1);
  // oxlint-disable-next-line unicorn/no-array-sort -- our own list: sorted where it is, no copy
  return unique.sort((a, b) => a - b);
}
