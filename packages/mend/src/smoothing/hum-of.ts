import { type RotationTrack, expMap, logMap, multiply, relative } from '@slewcurve/core';
import { alignedKeys } from '../key-turns.js';
import { isJoined } from '../stored-key.js';
import { localFitter } from './local-fit.js';
import { type Swing, type SwingData, fitSwing, sharpened } from './swing-fit.js';

/** Sigma of the carrier's average in cycles of the hum: of the hum it passes 0.7 %. */
const CARRIER = 0.6;

/** Times that carrier, hum and the stretch over which it hums are worked out from one another. */
const PASSES = 6;

/** Numbers of hats tried: 1 is a hum of one strength. At most two a second are used. */
const NODES = [1, 2, 3, 5, 9, 17, 33, 65];

/** Standard deviations beyond which a key says nothing of the hum: an outlier, the start of a fast move. */
const OUTLYING = 6;

/** Part of a normal vector's median length: the chi distribution of three degrees of freedom. */
const MEDIAN_LENGTH = 1.538;

/** Strength of a hum against what chance makes of noise: the share of power that a swing of two numbers an axis explains, times the count of keys. */
const BEYOND_CHANCE = 30;

/** A hum as found between two keys. */
export interface Hum {
  /** First and last key that it moves. */
  readonly from: number;
  readonly to: number;
  /** Seconds. */
  readonly cycle: number;
  /** What takes it out, own axes of each key of the track, three numbers a key, radians; and how that changes, rad/s. */
  readonly turns: Float64Array;
  readonly slopes: Float64Array;
}

/**
 * The hum near a frequency between keys `begin` and `end`. Offsets d = log(carrier⁻¹q) from a local average are fitted with one swing whose strength and phase
 * change along straight lines; carrier, swing and the stretch on which it hums are worked out in turn until they agree. The stretch is the one over which the
 * swing explains most: Σ(|d|² − |d − swing|²) is greatest there. How fast strength and phase change is what Schwarz's criterion (1978) finds the keys to
 * tell. Outlying keys do not count. Undefined where the swing explains no more than chance makes of noise.
 */
export function humOf(track: RotationTrack, begin: number, end: number, near: number): Hum | undefined {
  const { times } = track;
  const keys = alignedKeys(track);
  const offsets = new Float64Array(3 * times.length);
  const counts = new Uint8Array(times.length).fill(1);
  const swung = new Float64Array(6);
  let data: SwingData = { times, vectors: offsets, counts, from: begin, to: end };
  let swing: Swing | undefined;
  let hertz = near;
  for (let pass = 0; pass < PASSES; pass++) {
    const clean = swing ? without(keys, data, swing) : keys;
    offsetsFrom(offsets, track, keys, clean, begin, end, CARRIER / near);
    hertz = sharpened(data, near, Math.min(0.05 * near, 1 / (times[data.to] - times[data.from])));
    swing = pass < 2 ? fitSwing(data, hertz, 1) : toldSwing(data, hertz);
    markOutlying(data, swing);
    const stretch = stretchOf(data, swing, begin, end);
    if (!stretch) return undefined;
    data = { ...data, ...stretch };
  }
  if (!swing || !isBeyondChance(data, swing)) return undefined;
  const turns = new Float64Array(3 * times.length);
  const slopes = new Float64Array(3 * times.length);
  for (let key = data.from; key <= data.to; key++) {
    swing.read(swung, times[key]);
    turns.set(turnOut(offsets.subarray(3 * key, 3 * key + 3), swung), 3 * key);
    for (let axis = 0; axis < 3; axis++) slopes[3 * key + axis] = -swung[3 + axis];
  }
  return { from: data.from, to: data.to, cycle: 1 / hertz, turns, slopes };
}

/** q⁻¹·(carrier·exp(d − swing)) = exp(−d)·exp(d − swing), as a rotation vector. */
function turnOut(offset: Float64Array, swung: Float64Array): Float64Array {
  const was = expMap(new Float64Array(4), offset);
  const is = expMap(
    new Float64Array(4),
    offset.map((part, axis) => part - swung[axis]),
  );
  return logMap(new Float64Array(3), relative(was, was, is));
}

/** The keys without the swing where it hums. */
function without(keys: Float64Array, { times, from, to }: SwingData, swing: Swing): Float64Array {
  const clean = Float64Array.from(keys);
  const swung = new Float64Array(6);
  for (let key = from; key <= to; key++) {
    swing.read(swung, times[key]);
    const q = clean.subarray(4 * key, 4 * key + 4);
    const back = expMap(new Float64Array(4), [-swung[0], -swung[1], -swung[2]]);
    multiply(q, q, back);
  }
  return clean;
}

/** log(carrier⁻¹q) of every key between two, the carrier averaged over the clean keys. */
function offsetsFrom(
  offsets: Float64Array,
  track: RotationTrack,
  keys: Float64Array,
  clean: Float64Array,
  begin: number,
  end: number,
  sigma: number,
): void {
  const fit = localFitter(track.times, clean, sigma, (key) => isJoined(track, key));
  const carrier = new Float64Array(4);
  for (let key = begin; key <= end; key++) {
    const q = clean.subarray(4 * key, 4 * key + 4);
    multiply(carrier, q, expMap(carrier, fit(key).turn));
    logMap(
      offsets.subarray(3 * key, 3 * key + 3),
      relative(carrier, carrier, keys.subarray(4 * key, 4 * key + 4)),
    );
  }
}

/** The swing with as many hats as the keys can tell: Schwarz's criterion, n·ln(left/n) + parameters·ln n, is least. */
function toldSwing(data: SwingData, hertz: number): Swing {
  const { times, from, to, counts } = data;
  const seconds = times[to] - times[from];
  let numbers = 0;
  for (let key = from; key <= to; key++) numbers += 3 * counts[key];
  let best: Swing | undefined;
  let least = Infinity;
  for (const nodes of NODES) {
    if (nodes > Math.max(1, 2 * seconds)) break;
    const swing = fitSwing(data, hertz, nodes);
    const cost = numbers * Math.log(swing.left / numbers) + 6 * nodes * Math.log(numbers);
    if (cost < least) [best, least] = [swing, cost];
  }
  return best ?? fitSwing(data, hertz, 1);
}

function markOutlying({ times, vectors, counts, from, to }: SwingData, swing: Swing): void {
  const swung = new Float64Array(6);
  const strays = new Float64Array(to + 1 - from);
  for (let key = from; key <= to; key++) {
    swing.read(swung, times[key]);
    strays[key - from] = Math.hypot(...[0, 1, 2].map((axis) => vectors[3 * key + axis] - swung[axis]));
  }
  const most = (OUTLYING * strays.toSorted()[strays.length >> 1]) / MEDIAN_LENGTH;
  counts.fill(1);
  strays.forEach((stray, i) => {
    if (stray > most) counts[from + i] = 0;
  });
}

/** First and last key of the stretch over which a swing explains most: the run of greatest sum, by Kadane's pass. */
function stretchOf(
  { times, vectors, counts }: SwingData,
  swing: Swing,
  begin: number,
  end: number,
): { readonly from: number; readonly to: number } | undefined {
  const swung = new Float64Array(6);
  let [sum, start, most] = [0, begin, 0];
  let found: { readonly from: number; readonly to: number } | undefined;
  for (let key = begin; key <= end; key++) {
    swing.read(swung, times[key]);
    if (counts[key] !== 0)
      for (let axis = 0; axis < 3; axis++) sum += swung[axis] * (2 * vectors[3 * key + axis] - swung[axis]);
    if (sum > most) [most, found] = [sum, { from: start, to: key }];
    if (sum <= 0) [sum, start] = [0, key + 1];
  }
  return found && found.to - found.from > 3 ? found : undefined;
}

function isBeyondChance({ vectors, counts, from, to }: SwingData, swing: Swing): boolean {
  let all = 0;
  let count = 0;
  for (let key = from; key <= to; key++) {
    if (counts[key] === 0) continue;
    count++;
    for (let axis = 0; axis < 3; axis++) all += vectors[3 * key + axis] ** 2;
  }
  return all > 0 && ((all - swing.left) / all) * count > BEYOND_CHANCE;
}
