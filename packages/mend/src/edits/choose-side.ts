import {
  type RotationTrack,
  SlewcurveError,
  VALUES_PER_KEY,
  dot,
  expMap,
  keyOrientation,
  logMap,
  multiply,
  relative,
  replaceTrack,
} from '@slewcurve/core';
import { actedKeys, checkQuaternions, firstKey, placeOf } from '../acted-keys.js';
import { sentenceOf } from '../clauses.js';
import { DEGREES, editResult } from '../edit-result.js';
import type { Step } from '../step.js';
import { isJoined, isPlayable, storedValue, tangentFor } from '../stored-key.js';
import type { EditResult, Verb } from '../verb.js';

/** Cosine between the asked axis and the turn's, below which the axis does not tell one way from the other. */
const TELLS = 0.1;

/** Longest way that one middle key makes safe, degrees: two turns of 165°, 15° and more from the next half turn. */
const LONGEST_WAY = 330;

/**
 * Puts a key in the middle of the chosen way between key `k - 1` and each listed key `k`: `q_{k-1}·exp(½r)`, or
 * `q_{k-1}·exp(½(r − 2π r̂))`, whichever turns about `axis` (own frame of key `k - 1`) rather than against it. Both ends stay, so no
 * rounding decides the way any more.
 *
 * The standard's cubic goes by the stored signs, which allow one of the two ways alone. Where the other is chosen, key `k` and all
 * after it are negated whole, tangents too: every orientation stands. The new key's tangents are ½·q·(ω, 0), ω the mean rate.
 */
export const chooseSide: Verb = Object.freeze({
  name: 'choose side',
  summary: 'Inserts the middle key of the wanted way where two keys lie about half a turn apart.',
  alsoCalled: ['half turn', '180', 'long way', 'shortest path', 'spin direction', 'insert middle key'],
  opening: 'Choose the side of',
  reads: ['keys', 'axis'] as const,
  needsAllowing: true,
  keysApart: true,
  insertsKeys: true,
  say: (step: Step) => sentenceOf('Choose the side of', step),
  apply(track: RotationTrack, step: Step): EditResult {
    checkQuaternions(track);
    const first = firstKey(track, step);
    if (!step.axis)
      throw new SlewcurveError(
        'step.needs-axis',
        'Both ways round are as short; say which one is meant: axis, in the own frame of the key before.',
        placeOf(track, first),
      );
    let after = track;
    const inserted: number[] = [];
    for (const key of actedKeys(track, { ...step, keep: [] })) {
      const at = key + inserted.length;
      const kept = step.keep?.find((other) => other >= key);
      after = insertMiddle(after, at, step.axis, kept);
      inserted.push(at);
    }
    return editResult(track, after, { inserted });
  },
});

/** The track with one key more, between `key - 1` and `key`. `kept`: a key of the old track, from `key` on, that must not be negated. */
function insertMiddle(
  track: RotationTrack,
  key: number,
  axis: readonly [number, number, number],
  kept: number | undefined,
): RotationTrack {
  const time = middleTime(track, key);
  const turn = chosenTurn(track, key, axis);
  const before = keyOrientation(new Float64Array(4), track, key - 1);
  const value = multiply(before, before, expMap(new Float64Array(4), scaled(turn, 0.5)));
  const size = VALUES_PER_KEY[track.interpolation];
  const values = new Float64Array(track.values.length + size);
  values.set(track.values.subarray(0, key * size));
  values.set(track.values.subarray(key * size), (key + 1) * size);
  if (track.interpolation === 'CUBICSPLINE') {
    const tangent = tangentFor(value, scaled(turn, 1 / (track.times[key] - track.times[key - 1])));
    values.set([...tangent, ...value, ...tangent], key * size);
    if (dot(value, storedValue(track, key)) < 0) {
      if (kept !== undefined) throw keptInTheWay(track, kept);
      for (let at = (key + 1) * size; at < values.length; at++) values[at] = -values[at];
    }
  } else values.set(value, key * size);
  return replaceTrack(track, {
    times: Float64Array.of(...track.times.subarray(0, key), time, ...track.times.subarray(key)),
    values,
    breaks: track.breaks.map((broken) => (broken >= key ? broken + 1 : broken)),
  });
}

/** Rotation vector of the chosen way from key `key - 1` to `key`, own frame of key `key - 1`, radians. */
function chosenTurn(
  track: RotationTrack,
  key: number,
  axis: readonly [number, number, number],
): Float64Array {
  const from = keyOrientation(new Float64Array(4), track, key - 1);
  const to = keyOrientation(new Float64Array(4), track, key);
  const short = logMap(new Float64Array(3), relative(to, from, to));
  const angle = Math.hypot(...short);
  const along =
    (short[0] * axis[0] + short[1] * axis[1] + short[2] * axis[2]) / (angle * Math.hypot(...axis));
  if (!(Math.abs(along) >= TELLS))
    throw new SlewcurveError(
      'step.axis-tells-nothing',
      `The two ways turn about (${[...short].map((n) => (n / (angle || 1)).toFixed(3)).join(', ')}) and its opposite; the axis asked for is square to both. Name one of them.`,
      placeOf(track, key),
    );
  const way = along > 0 ? angle : angle - 2 * Math.PI;
  if (Math.abs(way) * DEGREES > LONGEST_WAY)
    throw new SlewcurveError(
      'step.not-half-a-turn',
      `The chosen way is ${(Math.abs(way) * DEGREES).toFixed(1)}° long; one middle key makes up to ${LONGEST_WAY}° safe. Keys this near each other need whole turns instead.`,
      placeOf(track, key),
    );
  return scaled(short, way / angle);
}

/** Half-way between two keys; throws where nothing plays between them or no stored time lies between. */
function middleTime(track: RotationTrack, key: number): number {
  const place = placeOf(track, key);
  if (key === 0)
    throw new SlewcurveError(
      'step.bad-key',
      'Name the later key of the two; key 0 has none before it.',
      place,
    );
  if (track.interpolation === 'STEP' || !isJoined(track, key - 1))
    throw new SlewcurveError(
      'step.nothing-between',
      `Nothing turns between keys ${key - 1} and ${key}: ${track.interpolation === 'STEP' ? 'the track is STEP' : 'there is a cut'}.`,
      place,
    );
  if (!isPlayable(track, key) || !isPlayable(track, key - 1))
    throw new SlewcurveError(
      'step.no-direction',
      `Keys ${key - 1} and ${key} must both hold an orientation. Bridge the one that does not.`,
      place,
    );
  const stored = track.storage.timeComponent === 'float32' ? Math.fround : (time: number) => time;
  const from = stored(track.times[key - 1]);
  const to = stored(track.times[key]);
  const middle = stored(from + (to - from) / 2);
  if (middle > from && middle < to) return middle;
  throw new SlewcurveError(
    'step.no-room',
    `No time that can be stored lies between keys ${key - 1} and ${key}.`,
    place,
  );
}

function keptInTheWay(track: RotationTrack, kept: number): SlewcurveError {
  return new SlewcurveError(
    'step.nothing-left',
    `On a CUBICSPLINE track the chosen way needs key ${kept} negated, and it is kept. Take it out of keep.`,
    { ...placeOf(track), key: kept },
  );
}

function scaled(vector: Float64Array, by: number): Float64Array {
  return vector.map((number) => number * by);
}
