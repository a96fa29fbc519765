import { type Curve, type RotationTrack, angleBetween, playAs } from '@slewcurve/core';
import { DEGREES, pairedKeys, reach, sameNumbers } from './edit-result.js';
import { isPlayable } from './stored-key.js';
import { provePace } from './pace/prove-pace.js';
import type { EditResult } from './verb.js';

/** What an edit is shown to have done, from the two tracks themselves, played as written. Angles in degrees. */
export interface EditProof {
  /** Every condition below holds. */
  readonly holds: boolean;
  /** Keys, numbered as before the edit, that differ though the result doesn't name them as changed. Should be none. */
  readonly strays: readonly number[];
  /** Kept keys, numbered as before the edit, that differ. Should be none. */
  readonly keptChanged: readonly number[];
  /** Whether every old key that is not named as dropped stands at its old time. */
  readonly sameTimes: boolean;
  /** Largest change of orientation where none may be, and where that is, seconds. At most 1e-7°. */
  readonly outside: number;
  readonly outsideAt: number;
  /** Largest change of orientation where there may be one, and where that is, seconds. */
  readonly inside: number;
  readonly insideAt: number;
}

/** Samples in each segment between two times that either track has. */
const SAMPLES = 16;

/** Sampling two curves that are the same numbers differs by rounding alone, 1e-13° and less; 1e-7° is what EDITS asks. */
const OUTSIDE_LIMIT = 1e-7;

/**
 * Proves an edit on one track. A change may be where the result's `span` says, and there only between the playable neighbours of a key
 * that changed; everything else counts as outside, also between two changed keys that lie apart.
 *
 * @param keep keys that the step kept, numbered as before the edit
 */
export function proveEdit(
  before: RotationTrack,
  after: RotationTrack,
  result: Pick<EditResult, 'changed' | 'inserted' | 'oldKeys' | 'dropped' | 'span' | 'repaced'>,
  keep: readonly number[] = [],
): EditProof {
  if (result.repaced) return provePace(before, after, result.repaced, keep);
  const changed = new Set(result.changed);
  const strays: number[] = [];
  const kept = new Set(keep);
  const { dropped = [] } = result;
  const keptChanged = dropped.filter((key) => kept.has(key));
  let sameTimes = after.times.length - result.inserted.length === before.times.length - dropped.length;
  for (const [key, oldKey] of pairedKeys(after, result)) {
    if (!Object.is(before.times[oldKey], after.times[key])) sameTimes = false;
    if (sameNumbers(before, oldKey, after, key)) continue;
    if (!changed.has(key)) strays.push(oldKey);
    if (kept.has(oldKey)) keptChanged.push(oldKey);
  }
  const differences = largestDifferences(before, after, touchedSpans(after, before, result));
  const holds =
    strays.length === 0 && keptChanged.length === 0 && sameTimes && differences.outside <= OUTSIDE_LIMIT;
  return { holds, strays, keptChanged, sameTimes, ...differences };
}

type Span = readonly [number, number];

/** Stretches of time that changed keys play in, within the result's span. Ascending; neighbours may touch. */
function touchedSpans(
  after: RotationTrack,
  before: RotationTrack,
  { changed, span, oldKeys }: Pick<EditResult, 'changed' | 'span' | 'oldKeys'>,
): Span[] {
  if (!span || before === after) return [];
  const spans: Span[] = [];
  // Outside its keys a track holds its end poses.
  const first = span[0] <= after.times[0] ? -Infinity : span[0];
  const end = span[1] >= after.times[after.times.length - 1] ? Infinity : span[1];
  // Between keys that changed places or lost a neighbour no key says what plays.
  if (oldKeys) return [[first, end]];
  for (const key of changed) {
    const [from, to] = reach(after, key, key);
    const last = spans.at(-1);
    if (last && from <= last[1]) spans[spans.length - 1] = [last[0], Math.max(last[1], Math.min(to, end))];
    else spans.push([Math.max(from, first), Math.min(to, end)]);
  }
  return spans;
}

function largestDifferences(
  before: RotationTrack,
  after: RotationTrack,
  spans: readonly Span[],
): Pick<EditProof, 'outside' | 'outsideAt' | 'inside' | 'insideAt'> {
  const found = { outside: 0, outsideAt: NaN, inside: 0, insideAt: NaN };
  const times = allTimes(before, after);
  if (before === after || times.length === 0) return found;
  const curves: readonly [Curve, Curve] = [playAs(before, 'as-written'), playAs(after, 'as-written')];
  const [p, q] = [new Float64Array(4), new Float64Array(4)];
  let at = 0;
  for (const time of sampleTimes(times)) {
    while (at < spans.length && spans[at][1] <= time) at++;
    const isInside = at < spans.length && time > spans[at][0];
    const angle = angleBetween(curves[0].orientation(p, time), curves[1].orientation(q, time)) * DEGREES;
    if (isInside && angle > found.inside) [found.inside, found.insideAt] = [angle, time];
    if (!isInside && angle > found.outside) [found.outside, found.outsideAt] = [angle, time];
  }
  return found;
}

/** Times at which either track has a key that plays, ascending, each once. */
function allTimes(before: RotationTrack, after: RotationTrack): Float64Array {
  const times = new Set<number>();
  for (const track of [before, after])
    track.times.forEach((time, key) => isPlayable(track, key) && times.add(time));
  const ascending = Float64Array.from(times);
  ascending.sort();
  return ascending;
}

function* sampleTimes(times: Float64Array): Generator<number> {
  for (let i = 0; i + 1 < times.length; i++)
    for (let sample = 0; sample < SAMPLES; sample++)
      yield times[i] + ((times[i + 1] - times[i]) * sample) / SAMPLES;
  yield times[times.length - 1];
}
