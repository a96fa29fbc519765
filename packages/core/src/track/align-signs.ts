import { valueOffset } from './key-orientation.js';
import { replaceTrack } from './replace-track.js';
import { VALUES_PER_KEY, type RotationTrack } from './rotation-track.js';

/** How `alignSigns` goes about it. */
export interface AlignSignsOptions {
  /** The track repeats: say whether its last key meets its first on the same side. */
  readonly loop?: boolean;
}

/** A track whose neighbouring keys lie on one side, and what that took. */
export interface AlignedTrack {
  readonly track: RotationTrack;
  /** Keys that were negated, ascending. */
  readonly negated: readonly number[];
  /**
   * With `loop`: whether last and first key still lie on opposite sides. No negation can close that: the loop is an odd number
   * of full turns, or its seam is over half a turn wide. False without `loop`.
   */
  readonly seamOpposed: boolean;
}

/**
 * Puts every key on the same side as the key before it (dot ≥ 0; K. Shoemake 1985's hemisphere choice, from memory), by negating
 * whole keys: under CUBICSPLINE the value and both tangents, so that the curve stays what it is up to its sign. Every
 * orientation is unchanged to the bit. The first key keeps its sign. Keys that are not finite or have no length are passed over; EULER tracks have
 * no signs and come back as they are.
 */
export function alignSigns(track: RotationTrack, options: AlignSignsOptions = {}): AlignedTrack {
  const size = VALUES_PER_KEY[track.interpolation];
  const negated: number[] = [];
  let side = 1;
  eachDot(track, (key, dot) => {
    if (dot < 0) side = -side;
    if (side < 0) negated.push(key);
  });
  const seamOpposed = options.loop === true && seamDot(track) * side < 0;
  if (negated.length === 0) return { track, negated, seamOpposed };
  const values = Float64Array.from(track.values);
  for (const key of negated) for (let i = key * size; i < (key + 1) * size; i++) values[i] = -values[i];
  return { track: replaceTrack(track, { values }), negated, seamOpposed };
}

/** Keys, ascending, that lie on the other side of the key before them (dot < 0 as stored): the later key's number. */
export function signChanges(track: RotationTrack): number[] {
  const changes: number[] = [];
  eachDot(track, (key, dot) => {
    if (dot < 0) changes.push(key);
  });
  return changes;
}

/** Tells the dot of each usable key with the usable key before it. */
function eachDot(track: RotationTrack, tell: (key: number, dot: number) => void): void {
  if (track.interpolation === 'EULER') return;
  let before = -1;
  for (let key = 0; key < track.times.length; key++) {
    if (!isUsable(track, key)) continue;
    if (before >= 0) tell(key, keyDot(track, before, key));
    before = key;
  }
}

function seamDot(track: RotationTrack): number {
  if (track.interpolation === 'EULER') return 0;
  let first = 0;
  let last = track.times.length - 1;
  while (first < last && !isUsable(track, first)) first++;
  while (last > first && !isUsable(track, last)) last--;
  return last > first ? keyDot(track, last, first) : 0;
}

function isUsable(track: RotationTrack, key: number): boolean {
  const squared = keyDot(track, key, key);
  return squared > 0 && squared < Infinity;
}

function keyDot(track: RotationTrack, a: number, b: number): number {
  const { values } = track;
  const i = valueOffset(track, a);
  const j = valueOffset(track, b);
  return (
    values[i] * values[j] +
    values[i + 1] * values[j + 1] +
    values[i + 2] * values[j + 2] +
    values[i + 3] * values[j + 3]
  );
}
