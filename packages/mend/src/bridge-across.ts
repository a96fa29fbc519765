import {
  type RotationTrack,
  SlewcurveError,
  angleBetween,
  cumulativeHermite,
  keyOrientation,
  logMap,
  playAs,
  relative,
  replaceTrack,
} from '@slewcurve/core';
import { placeOf } from './acted-keys.js';
import { isJoined, isPlayable, playableNeighbour, storedValue, writeKey } from './stored-key.js';
import { tangentRate } from './tangent-rate.js';

/** What a bridge spans. Where `from` is `to` there is one neighbour alone, and `keys` take its pose. */
export interface BridgeEnds {
  /** Keys that stay as stored. */
  readonly from: number;
  readonly to: number;
  /** Keys that are laid anew, ascending. */
  readonly keys: readonly number[];
}

/** A bridge may be so many times as fast as its mean: the easing of a cubic (1.5) and room for the rates at its ends (EDITS). */
const PEAK = 1.9;

/**
 * Ends of a bridge of `steps` key steps over a shelf between `key - 1` and `key`: a = k − 1 − ⌊n/2⌋, b = a + n, moved or shrunk so that
 * it crosses no end, no cut and no key that may not change.
 *
 * @throws SlewcurveError `step.nothing-between` on a STEP track, `step.no-room` where no key can be laid anew, `step.bad-key`
 */
export function shelfEnds(
  track: RotationTrack,
  key: number,
  steps: number,
  mayChange: (key: number) => boolean = () => true,
): BridgeEnds {
  const place = placeOf(track, key);
  if (key < 1 || key >= track.times.length)
    throw new SlewcurveError(
      'step.bad-key',
      `A shelf lies between two keys; name the later one, not ${key}.`,
      place,
    );
  if (track.interpolation === 'STEP' || !isJoined(track, key - 1))
    throw new SlewcurveError(
      'step.nothing-between',
      `Nothing turns from key ${key - 1} to ${key}: the track is STEP or cut there.`,
      place,
    );
  let [from, to] = shelfWindow(track, key, steps, mayChange);
  while (from < key - 1 && !isPlayable(track, from)) from++;
  while (to > key && !isPlayable(track, to)) to--;
  const keys = Array.from({ length: Math.max(0, to - from - 1) }, (_, i) => from + 1 + i);
  if (keys.length > 0 && isPlayable(track, from) && isPlayable(track, to)) return { from, to, keys };
  throw new SlewcurveError(
    'step.no-room',
    `Around keys ${key - 1} and ${key} there is no key that may be laid anew between two that stay.`,
    place,
  );
}

/** First and last key of the window, before looking whether they can be played. */
function shelfWindow(
  track: RotationTrack,
  key: number,
  steps: number,
  mayChange: (key: number) => boolean,
): [number, number] {
  let lowest = key - 1;
  while (key - lowest < steps && mayChange(lowest) && isJoined(track, lowest - 1)) lowest--;
  let highest = key;
  while (highest - key < steps && mayChange(highest) && isJoined(track, highest)) highest++;
  const from = Math.max(lowest, key - 1 - Math.floor(steps / 2));
  const to = Math.min(highest, from + steps);
  return [Math.max(lowest, Math.min(from, to - steps)), to];
}

/**
 * The track with `keys` laid anew on the cumulative Hermite curve (Kim, Kim & Shin 1995) from key `from` to key `to`. Its end rates are
 * those just outside: of the segments there, or under CUBICSPLINE what the end keys' own tangents say; at an end of the track or a cut,
 * where nothing lies outside, the bridge's mean rate. Where it would play faster than 1.9 times its mean and than both neighbouring
 * segments, both end rates are lowered by one factor, as little as that needs. (Stored tangents stay; where they alone are too fast, so do
 * the rates.)
 *
 * @throws SlewcurveError `step.time-order` where the times between the ends don't rise
 */
export function bridgeAcross(track: RotationTrack, { from, to, keys }: BridgeEnds): RotationTrack {
  if (from === to || track.interpolation === 'STEP') {
    const pose = keyOrientation(new Float64Array(4), track, from);
    return withKeys(track, from, keys, () => ({ orientation: pose, rate: new Float64Array(3) }));
  }
  checkTimes(track, [from, ...keys, to]);
  const start = keyOrientation(new Float64Array(4), track, from);
  const end = keyOrientation(new Float64Array(4), track, to);
  const seconds = track.times[to] - track.times[from];
  const mean = logMap(new Float64Array(3), relative(new Float64Array(4), start, end)).map(
    (angle) => angle / seconds,
  );
  const before = rateOutside(track, from, -1);
  const beyond = rateOutside(track, to, 1);
  const limit = Math.max(
    PEAK * Math.hypot(...mean),
    ...[before, beyond].map((rate) => (rate ? Math.hypot(...rate) : 0)),
    speedOutside(track, from, -1),
    speedOutside(track, to, 1),
  );
  const laid = (share: number): RotationTrack => {
    const rates = [before ?? mean, beyond ?? mean].map((rate) => rate.map((component) => component * share));
    const curve = cumulativeHermite(start, end, rates[0], rates[1], seconds, track.times[from]);
    return withKeys(track, from, keys, (key) => ({
      orientation: curve.orientation(new Float64Array(4), track.times[key]),
      rate: curve.rate(new Float64Array(3), track.times[key], 'own'),
    }));
  };
  const isSlowEnough = (candidate: RotationTrack): boolean => peakBetween(candidate, from, to) <= limit;
  const whole = laid(1);
  if (isSlowEnough(whole) || !isSlowEnough(laid(0))) return whole;
  let [low, high] = [0, 1];
  for (let halving = 0; halving < 20; halving++) {
    const share = (low + high) / 2;
    if (isSlowEnough(laid(share))) low = share;
    else high = share;
  }
  return laid(low);
}

function withKeys(
  track: RotationTrack,
  from: number,
  keys: readonly number[],
  keyOf: (key: number) => { readonly orientation: Float64Array; readonly rate: Float64Array },
): RotationTrack {
  const values = Float64Array.from(track.values);
  let beside = storedValue(track, from);
  for (const key of keys) {
    const { orientation, rate } = keyOf(key);
    writeKey(values, track, key, orientation, beside, rate);
    beside = storedValue(track, key, values);
  }
  return replaceTrack(track, { values });
}

/** Own-frame rate, rad/s, with which the motion outside a bridge meets its end; undefined where there is none. */
function rateOutside(track: RotationTrack, key: number, way: 1 | -1): Float64Array | undefined {
  if (track.interpolation === 'CUBICSPLINE') return tangentRate(track, key, way === -1 ? 'out' : 'in');
  const other = playableNeighbour(track, key, way);
  if (other === undefined) return undefined;
  const [earlier, later] = way === 1 ? [key, other] : [other, key];
  const turn = relative(
    new Float64Array(4),
    keyOrientation(new Float64Array(4), track, earlier),
    keyOrientation(new Float64Array(4), track, later),
  );
  const seconds = track.times[later] - track.times[earlier];
  return logMap(new Float64Array(3), turn).map((angle) => angle / seconds);
}

/** Mean speed of the segment just outside, rad/s; 0 where there is none. */
function speedOutside(track: RotationTrack, key: number, way: 1 | -1): number {
  const other = playableNeighbour(track, key, way);
  if (other === undefined) return 0;
  const angle = angleBetween(
    keyOrientation(new Float64Array(4), track, key),
    keyOrientation(new Float64Array(4), track, other),
  );
  return angle / Math.abs(track.times[other] - track.times[key]);
}

/** Greatest speed as written between two keys, rad/s, of the keys between them alone. */
function peakBetween(track: RotationTrack, from: number, to: number): number {
  const size = track.values.length / track.times.length;
  const part = replaceTrack(track, {
    times: track.times.subarray(from, to + 1),
    values: track.values.subarray(from * size, (to + 1) * size),
    breaks: [],
  });
  return playAs(part, 'as-written').peak(track.times[from], track.times[to]).rate;
}

function checkTimes(track: RotationTrack, keys: readonly number[]): void {
  const wrong = keys.find((key, i) => i > 0 && !(track.times[key] > track.times[keys[i - 1]]));
  if (wrong === undefined) return;
  throw new SlewcurveError(
    'step.time-order',
    `Key ${wrong} is not later than the key before it. Put the times in order first.`,
    placeOf(track, wrong),
  );
}
