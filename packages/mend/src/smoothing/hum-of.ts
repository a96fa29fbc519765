import {
  type RotationTrack,
  conjugate,
  expMap,
  logMap,
  multiply,
  relative,
  rotateVector,
} from '@slewcurve/core';
import { alignedKeys } from '../key-turns.js';
import { isJoined } from '../stored-key.js';
import { localFitter } from './local-fit.js';
import { type Swing, type SwingData, fitSwing, sharpened } from './swing-fit.js';

/** Sigma of the carrier's average in cycles of the hum: of the hum it passes 0.7 %. */
const CARRIER = 0.6;

/** Times that carrier, hum and the stretch over which it hums are worked out from one another. */
const PASSES = 4;

/** Numbers of hats tried: 1 is a hum of one strength. At most two a second are used. */
const NODES = [1, 2, 3, 5, 9, 17, 33, 65];

/** How many times Schwarz's penalty a parameter costs: what keys barely tell is left as it is. */
const CAUTION = 2;

/** Share of the given frequency on either side within which the hum is looked for. */
const BESIDE = 0.05;

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
 * change along straight lines, in own axes or in the parent's, whichever tells it more simply; carrier, swing and the stretch on which it hums are worked
 * out in turn until they agree. The stretch is the one over which the swing explains most: Σ(|d|² − |d − swing|²) is greatest there. How fast
 * strength and phase change is what Schwarz's criterion (1978) finds the keys to tell. Outlying keys do not count. Undefined where the swing explains no
 * more than chance makes of noise.
 */
export function humOf(track: RotationTrack, begin: number, end: number, near: number): Hum | undefined {
  const { times } = track;
  const keys = alignedKeys(track);
  const carried = carrierFor(track, keys, begin, end, CARRIER / near);
  const turns = new Float64Array(3 * times.length);
  const slopes = new Float64Array(3 * times.length);
  let stretch = { from: begin, to: end };
  let hertz = near;
  for (let pass = 0; pass < PASSES; pass++) {
    const { own, parent } = carried.offsets(turns);
    const swings = [own, parent].map((vectors): Told => {
      const counts = new Uint8Array(times.length).fill(1);
      return told({ times, vectors, counts, ...stretch }, hertz, pass);
    });
    const isParents = swings[1].cost < swings[0].cost;
    const { data, swing } = swings[Number(isParents)];
    const found = stretchOf(data, swing, begin, end);
    if (!found || (pass === PASSES - 1 && !isBeyondChance(data, swing))) return undefined;
    stretch = found;
    hertz = swing.hertz;
    turns.fill(0);
    slopes.fill(0);
    for (let key = stretch.from; key <= stretch.to; key++)
      carried.takeOut(turns, slopes, key, swing, isParents);
  }
  return { ...stretch, cycle: 1 / near, turns, slopes };
}

/** A swing that was fitted, to what, and its cost by Schwarz's criterion. */
interface Told {
  readonly data: SwingData;
  readonly swing: Swing;
  readonly cost: number;
}

/** The swing near a frequency; of one strength in the first passes, which look for the stretch alone. Outlying keys are left out of a second fit. */
function told(data: SwingData, hertz: number, pass: number): Told {
  const toldApart = 1 / (data.times[data.to] - data.times[data.from]);
  const beside = Math.min(BESIDE * hertz, pass === 0 ? toldApart : toldApart / 4);
  const sharp = sharpened(data, hertz, beside);
  markOutlying(data, fitSwing(data, sharp, 1));
  return { data, ...simplest(data, sharp, pass < 2 ? [1] : NODES) };
}

/** What keys stand off from while they hum, and how the hum is taken out of them. */
interface Carried {
  /** log(carrier⁻¹q) of every key, the carrier averaged over the keys with `turns` taken along; in own axes and in the parent's. */
  offsets(turns: Float64Array): { readonly own: Float64Array; readonly parent: Float64Array };
  /** Writes what turns a key to carrier·exp(d − swing), and its change per second, own axes. */
  takeOut(turns: Float64Array, slopes: Float64Array, key: number, swing: Swing, isParents: boolean): void;
}

function carrierFor(
  track: RotationTrack,
  keys: Float64Array,
  begin: number,
  end: number,
  sigma: number,
): Carried {
  const { times } = track;
  const clean = Float64Array.from(keys);
  const own = new Float64Array(3 * times.length);
  const parent = new Float64Array(3 * times.length);
  const carriers = new Float64Array(4 * times.length);
  const rates = new Float64Array(3 * times.length);
  // Told by the others alone, so that a key wrongly taken to hum does not pull the carrier along.
  const fit = localFitter(times, clean, sigma, (key) => isJoined(track, key), false);
  const swung = new Float64Array(6);
  return {
    offsets: (turns) => {
      for (let key = 0; key < times.length; key++)
        multiply(
          clean.subarray(4 * key, 4 * key + 4),
          keys.subarray(4 * key, 4 * key + 4),
          expMap(new Float64Array(4), turns.subarray(3 * key, 3 * key + 3)),
        );
      for (let key = begin; key <= end; key++) {
        const carrier = carriers.subarray(4 * key, 4 * key + 4);
        const { turn, rate } = fit(key);
        multiply(carrier, clean.subarray(4 * key, 4 * key + 4), expMap(new Float64Array(4), turn));
        rates.set(rate, 3 * key);
        const offset = own.subarray(3 * key, 3 * key + 3);
        const q = keys.subarray(4 * key, 4 * key + 4);
        logMap(offset, relative(new Float64Array(4), carrier, q));
        rotateVector(parent.subarray(3 * key, 3 * key + 3), carrier, offset);
      }
      return { own, parent };
    },
    takeOut: (turns, slopes, key, swing, isParents) => {
      swing.read(swung, times[key]);
      const [value, slope] = [swung.slice(0, 3), swung.slice(3)];
      if (isParents) {
        const back = conjugate(new Float64Array(4), carriers.subarray(4 * key, 4 * key + 4));
        rotateVector(value, back, value);
        rotateVector(slope, back, slope);
        // Own axes turn under what stands still in the parent's: −ω × value.
        const [x, y, z] = rates.subarray(3 * key, 3 * key + 3);
        slope[0] -= y * value[2] - z * value[1];
        slope[1] -= z * value[0] - x * value[2];
        slope[2] -= x * value[1] - y * value[0];
      }
      turns.set(turnOut(own.subarray(3 * key, 3 * key + 3), value), 3 * key);
      for (let axis = 0; axis < 3; axis++) slopes[3 * key + axis] = -slope[axis];
    },
  };
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

/**
 * The swing with as many hats as the keys can tell: Schwarz's criterion, n·ln(left/n) + parameters·ln n, is least, with parameters at twice the price.
 */
function simplest(
  data: SwingData,
  hertz: number,
  hats: readonly number[],
): { readonly swing: Swing; readonly cost: number } {
  const { times, from, to, counts } = data;
  const seconds = times[to] - times[from];
  let numbers = 0;
  for (let key = from; key <= to; key++) numbers += 3 * counts[key];
  const costed = hats
    .filter((nodes) => nodes === 1 || nodes <= 2 * seconds)
    .map((nodes) => {
      const swing = fitSwing(data, hertz, nodes);
      const cost = numbers * Math.log(swing.left / numbers) + CAUTION * 6 * nodes * Math.log(numbers);
      return { swing, cost };
    });
  return costed.reduce((best, one) => (one.cost < best.cost ? one : best));
}

/** Strikes keys further off than noise explains, and than the swing's own strength: nearer ones may only begin or end to hum. */
function markOutlying({ times, vectors, counts, from, to }: SwingData, swing: Swing): void {
  const swung = new Float64Array(6);
  const strays = new Float64Array(to + 1 - from);
  let square = 0;
  for (let key = from; key <= to; key++) {
    swing.read(swung, times[key]);
    strays[key - from] = Math.hypot(...[0, 1, 2].map((axis) => vectors[3 * key + axis] - swung[axis]));
    square += swung[0] ** 2 + swung[1] ** 2 + swung[2] ** 2;
  }
  const noise = (OUTLYING * strays.toSorted()[strays.length >> 1]) / MEDIAN_LENGTH;
  const most = Math.max(noise, Math.sqrt((2 * square) / strays.length));
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
