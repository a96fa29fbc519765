import { type RotationTrack, VALUES_PER_KEY, angleBetween, keyOrientation } from '@slewcurve/core';
import { isPlayable } from './stored-key.js';
import type { EditResult } from './verb.js';

/** Degrees in a radian. */
export const DEGREES: number = 180 / Math.PI;

/**
 * What an edit did, read off the two tracks and not off what the verb meant to do. `inserted`: keys of `after` that `before` lacks,
 * ascending. `oldKeys`: where keys were dropped or changed places, the old number of every key of `after`, -1 for one that was put in; `inserted`
 * is then read off it. `moves`: whether the motion as written may differ.
 */
export function editResult(
  before: RotationTrack,
  after: RotationTrack,
  options: {
    readonly inserted?: readonly number[];
    readonly oldKeys?: readonly number[];
    readonly moves?: boolean;
  } = {},
): EditResult {
  const { oldKeys, moves = true } = options;
  const inserted = oldKeys?.flatMap((old, key) => (old < 0 ? [key] : [])) ?? options.inserted ?? [];
  const keys = { inserted, ...(oldKeys && orderOf(before, oldKeys)) };
  const { changed, largest } = changedKeys(before, after, keys);
  if (changed.length === 0 && staysInOrder(keys))
    return { track: before, changed, inserted, largest: 0, added: 0 };
  return {
    track: after,
    changed,
    ...keys,
    largest: largest * DEGREES,
    added: lengthOf(after) - lengthOf(before),
    ...(moves && after.times.length > 0 && { span: spanOf(before, after, changed, keys) }),
  };
}

type KeyOrder = Pick<EditResult, 'oldKeys' | 'dropped'>;

function orderOf(before: RotationTrack, oldKeys: readonly number[]): KeyOrder {
  return { oldKeys, dropped: droppedKeys(before.times.length, oldKeys) };
}

function staysInOrder({ oldKeys, dropped = [] }: KeyOrder): boolean {
  return !oldKeys || (dropped.length === 0 && oldKeys.every((old, key) => old === key));
}

function spanOf(
  before: RotationTrack,
  after: RotationTrack,
  changed: readonly number[],
  { oldKeys, dropped = [] }: KeyOrder,
): readonly [number, number] {
  const [first, last] = oldKeys
    ? movedReach(after, oldKeys, changed, dropped.at(-1) === before.times.length - 1)
    : [changed[0], changed[changed.length - 1]];
  return withinKeys(after, reach(after, first, last));
}

/** Keys of `after` that differ or were put in, ascending, and the largest turn of any that was there, radians. */
function changedKeys(
  before: RotationTrack,
  after: RotationTrack,
  keys: Pick<EditResult, 'inserted' | 'oldKeys'>,
): { readonly changed: readonly number[]; readonly largest: number } {
  const changed = [...keys.inserted];
  let largest = 0;
  const was = new Float64Array(4);
  const is = new Float64Array(4);
  for (const [key, oldKey] of pairedKeys(after, keys)) {
    if (sameNumbers(before, oldKey, after, key)) continue;
    changed.push(key);
    if (isPlayable(before, oldKey))
      largest = Math.max(
        largest,
        angleBetween(keyOrientation(was, before, oldKey), keyOrientation(is, after, key)),
      );
  }
  changed.sort((a, b) => a - b);
  return { changed, largest };
}

function droppedKeys(count: number, oldKeys: readonly number[]): number[] {
  const kept = new Set(oldKeys);
  return Array.from({ length: count }, (_, key) => key).filter((key) => !kept.has(key));
}

/** First and last key of `after` that differs, was put in, or does not follow the key that it followed. */
function movedReach(
  after: RotationTrack,
  oldKeys: readonly number[],
  changed: readonly number[],
  lostItsEnd: boolean,
): readonly [number, number] {
  const last = after.times.length - 1;
  const moved = oldKeys.flatMap((old, key) => (old === (key === 0 ? -1 : oldKeys[key - 1]) + 1 ? [] : [key]));
  // What is gone from the end is felt at the key that is last now.
  const all = [...moved, ...changed, ...(lostItsEnd ? [last] : [])];
  return [Math.min(last, ...all), all.length === 0 ? last : Math.max(...all)];
}

/** Every key of `after` that `before` has too, with its number there. */
export function* pairedKeys(
  after: RotationTrack,
  { inserted, oldKeys }: Pick<EditResult, 'inserted' | 'oldKeys'>,
): Generator<[number, number]> {
  if (oldKeys) {
    for (const [key, old] of oldKeys.entries()) if (old >= 0) yield [key, old];
    return;
  }
  let passed = 0;
  for (let key = 0; key < after.times.length; key++) {
    if (inserted[passed] === key) passed++;
    else yield [key, key - passed];
  }
}

/** Whether two keys are stored alike to the bit, time included, and mean the same. */
export function sameNumbers(a: RotationTrack, keyA: number, b: RotationTrack, keyB: number): boolean {
  const size = VALUES_PER_KEY[a.interpolation];
  if (a.interpolation !== b.interpolation || a.sequence !== b.sequence) return false;
  if (!Object.is(a.times[keyA], b.times[keyB])) return false;
  for (let i = 0; i < size; i++)
    if (!Object.is(a.values[keyA * size + i], b.values[keyB * size + i])) return false;
  return true;
}

/**
 * Times between which playing hangs on keys `first` to `last`, seconds: out to the nearest playable key on either side, cuts or not (the
 * pose before a cut is held up to it). ∓Infinity where there is none, as the ends are held.
 */
export function reach(track: RotationTrack, first: number, last: number): readonly [number, number] {
  const { times } = track;
  let from = first - 1;
  while (from >= 0 && !(times[from] < times[first] && isPlayable(track, from))) from--;
  let to = last + 1;
  while (to < times.length && !(times[to] > times[last] && isPlayable(track, to))) to++;
  return [from < 0 ? -Infinity : times[from], to < times.length ? times[to] : Infinity];
}

function withinKeys(
  { times }: RotationTrack,
  [from, to]: readonly [number, number],
): readonly [number, number] {
  return [Math.max(from, times[0]), Math.min(to, times[times.length - 1])];
}

function lengthOf({ times }: RotationTrack): number {
  return times.length === 0 ? 0 : times[times.length - 1] - times[0];
}
