import { angleFloor } from '../track/noise-floor.js';
import { keyOrientation } from '../track/key-orientation.js';
import { medianGap } from '../track/regime.js';
import type { RotationTrack } from '../track/rotation-track.js';
import { candidateKeys } from './candidate-keys.js';
import { FOURTH, dividedWeights, isEven } from './fourth-difference.js';

/** What may explain a local break: one key beside its neighbours, a step that stays, a change of rate at one key. */
export const BREAK_KINDS: readonly ['lone-key', 'shelf', 'corner'] = ['lone-key', 'shelf', 'corner'];
/** What can explain a local break: a key that stands off, a step that stays, a change of speed. */
export type BreakKind = (typeof BREAK_KINDS)[number];

/** How `localRoughness` looks at a track. */
export interface LocalRoughnessOptions {
  /** The track repeats, its last key being its first: windows wrap. */
  readonly loop?: boolean;
}

/** The three fits around the key that `fit` was called with last; every call overwrites them. */
export interface LocalRoughness {
  /**
   * Fit the three explanations around `key`: a lone key at `key`, a shelf between the key before and `key`, a corner at `key`.
   * False, and all gains 0, where fewer than seven positions of the window can be used: nothing is claimed there.
   */
  fit(key: number): boolean;
  /** How many times the local roughness falls when explained away; in the order of `BREAK_KINDS`. */
  readonly gains: Float64Array;
  /**
   * Fitted rotation vectors, own axes of the key, radians, three numbers a kind: how far the lone key stands off its neighbours; the
   * offset of everything from the key on; the change of turn per median gap.
   */
  readonly vectors: Float64Array;
  /**
   * Keys, ascending, at which a lone key or a shelf of `size` radians or more may stand: a cheap bound that leaves none out. With
   * `gains`, the least of a lone key and of a shelf, keys are left out too that can reach neither.
   */
  candidates(size: number, gains?: readonly [number, number]): number[];
}

/** Keys that a window reaches to either side, positions likewise, and the fewest positions that allow a claim. */
const REACH = 6;
const POSITIONS = 4;
const FEWEST = 7;
/** A gap beyond this many medians is no neighbourhood. */
const HOLE = 1.5;

/**
 * Local roughness of a track and what explains it. Around key k: y_j = log(q_k⁻¹q_{k+j}), j = −6 … 6, carried on past half a turn from
 * key to key; d_i the fourth difference of y about i, i = −4 … 4, zero for any motion that is cubic there; where the gaps differ by more
 * than 2 %, the fourth divided difference times 24h⁴, h the track's median gap. Positions that reach past an end, across a break or a
 * gap over 1.5h are left out. R = Σ|d_i|². Each explanation is a least-squares fit of one vector times the pattern that it makes in
 * d: lone key 1 −4 6 −4 1, shelf 1 −3 3 −1, corner 1 −2 1 (on uneven gaps the same differences of a unit pulse, step and ramp).
 * gain = R/(R left + 70nf²), n positions, f the angle floor: 70 = 1 + 16 + 36 + 16 + 1 is what white noise gives.
 *
 * The track must be playable (see `playableTrack`). One scratch for the whole track; nothing is allocated per key.
 */
export function localRoughness(track: RotationTrack, options: LocalRoughnessOptions = {}): LocalRoughness {
  const window = keyWindow(track, options.loop === true);
  const gains = new Float64Array(3);
  const vectors = new Float64Array(9);
  const noise = 70 * angleFloor(track.storage, track.interpolation) ** 2;
  return {
    gains,
    vectors,
    fit: (key) => {
      gains.fill(0);
      vectors.fill(0);
      const positions = window.differences(key);
      if (positions < FEWEST) return false;
      explain(window, positions * noise, gains, vectors);
      return true;
    },
    candidates: (size, least) => window.candidates(size, least, noise),
  };
}

interface KeyWindow {
  /** d_i, three numbers each, and the patterns of the three kinds, one number each, by position + 4. */
  readonly d: Float64Array;
  readonly patterns: readonly Float64Array[];
  /** Fill both around a key; how many positions could be used (the others are zero in both). */
  differences(key: number): number;
  candidates(size: number, gains: readonly [number, number] | undefined, noise: number): number[];
}

function explain(window: KeyWindow, noise: number, gains: Float64Array, vectors: Float64Array): void {
  const { d, patterns } = window;
  let roughness = 0;
  for (let i = 0; i < d.length; i++) roughness += d[i] * d[i];
  if (roughness === 0) return;
  for (let kind = 0; kind < 3; kind++) {
    const pattern = patterns[kind];
    let x = 0,
      y = 0,
      z = 0,
      square = 0;
    for (let i = 0; i < pattern.length; i++) {
      const p = pattern[i];
      x += p * d[3 * i];
      y += p * d[3 * i + 1];
      z += p * d[3 * i + 2];
      square += p * p;
    }
    if (square === 0) continue;
    // Rounding may leave less than nothing of a break that is explained whole.
    const left = Math.max(0, roughness - (x * x + y * y + z * z) / square) + noise;
    gains[kind] = left > 0 ? roughness / left : Number.MAX_VALUE;
    vectors[3 * kind] = x / square;
    vectors[3 * kind + 1] = y / square;
    vectors[3 * kind + 2] = z / square;
  }
}

function keyWindow(track: RotationTrack, loop: boolean): KeyWindow {
  const count = track.times.length;
  // Wrapping needs a whole window of different keys.
  const period = loop && count - 1 > 2 * REACH ? count - 1 : 0;
  const orientations = unitOrientations(track);
  const gap = medianGap(track);
  const broken = new Uint8Array(count);
  for (const key of track.breaks) broken[key] = 1;

  const size = 2 * REACH + 1;
  const keys = new Int32Array(size);
  const times = new Float64Array(size);
  const y = new Float64Array(3 * size);
  const weights = new Float64Array(5);
  const d = new Float64Array(3 * (2 * POSITIONS + 1));
  const patterns = [0, 1, 2].map(() => new Float64Array(2 * POSITIONS + 1));

  const place = (slot: number, index: number): void => {
    const wraps = period > 0 ? Math.floor(index / period) : 0;
    const key = index - wraps * period;
    const there = key >= 0 && key < count;
    keys[slot] = there ? key : -1;
    times[slot] = there ? track.times[key] + wraps * (track.times[period] - track.times[0]) : Number.NaN;
  };
  /** Whether slot and the next are neighbours. */
  const joined = (slot: number): boolean =>
    keys[slot] >= 0 &&
    keys[slot + 1] >= 0 &&
    broken[keys[slot]] === 0 &&
    times[slot + 1] - times[slot] <= HOLE * gap;
  const usable = (slot: number): boolean =>
    joined(slot - 2) && joined(slot - 1) && joined(slot) && joined(slot + 1);

  return {
    d,
    patterns,
    differences: (key) => {
      for (let slot = 0; slot < size; slot++) place(slot, key + slot - REACH);
      d.fill(0);
      for (const pattern of patterns) pattern.fill(0);
      let positions = 0;
      for (let i = 0; i <= 2 * POSITIONS; i++) if (usable(i + 2)) positions++;
      if (positions < FEWEST) return positions;
      turnsFrom(orientations, keys, y);
      const even = isEven(times, 0, size, gap);
      for (let i = 0; i <= 2 * POSITIONS; i++) {
        if (!usable(i + 2)) continue;
        if (even) weights.set(FOURTH);
        else dividedWeights(weights, times, i, gap);
        difference(i, weights, times, gap, y, d, patterns, even);
      }
      return positions;
    },
    candidates: (least, gainsOf, noise) =>
      candidateKeys({ times: track.times, orientations, broken, gap, period }, least, gainsOf, noise),
  };
}

/** Fourth difference of y and of a unit pulse, step and ramp at position `i` (slots i … i + 4; the window's key is slot 6). */
function difference(
  i: number,
  weights: Float64Array,
  times: Float64Array,
  gap: number,
  y: Float64Array,
  d: Float64Array,
  patterns: readonly Float64Array[],
  even: boolean,
): void {
  const [pulse, step, ramp] = patterns;
  for (let m = 0; m < 5; m++) {
    const slot = i + m;
    const weight = weights[m];
    d[3 * i] += weight * y[3 * slot];
    d[3 * i + 1] += weight * y[3 * slot + 1];
    d[3 * i + 2] += weight * y[3 * slot + 2];
    if (slot < REACH) continue;
    if (slot === REACH) pulse[i] = weight;
    step[i] += weight;
    ramp[i] += weight * (even ? slot - REACH : (times[slot] - times[REACH]) / gap);
  }
}

/**
 * Rotation vectors from the window's middle key to every other key, own axes of the middle, radians. From the middle outwards each
 * is the turn nearest to the one before it among those that differ by whole turns, so that a spin goes on past half a turn.
 */
function turnsFrom(orientations: Float64Array, keys: Int32Array, y: Float64Array): void {
  y.fill(0);
  const at = 4 * keys[REACH];
  for (const way of [1, -1])
    for (let j = 1; j <= REACH; j++) {
      const slot = REACH + way * j;
      if (keys[slot] < 0) break;
      carriedTurn(orientations, at, 4 * keys[slot], y, 3 * slot, 3 * (slot - way));
    }
}

function carriedTurn(
  q: Float64Array,
  from: number,
  to: number,
  y: Float64Array,
  at: number,
  before: number,
): void {
  const ax = q[from],
    ay = q[from + 1],
    az = q[from + 2],
    aw = q[from + 3];
  const bx = q[to],
    by = q[to + 1],
    bz = q[to + 2],
    bw = q[to + 3];
  let x = aw * bx - ax * bw - (ay * bz - az * by),
    u = aw * by - ay * bw - (az * bx - ax * bz),
    v = aw * bz - az * bw - (ax * by - ay * bx),
    w = ax * bx + ay * by + az * bz + aw * bw;
  if (w < 0) {
    x = -x;
    u = -u;
    v = -v;
    w = -w;
  }
  const sine = Math.sqrt(x * x + u * u + v * v);
  // Below 1e-9 the axis says nothing; the axis of the turn before is taken, and the turn itself is that small.
  const held = Math.hypot(y[before], y[before + 1], y[before + 2]);
  if (sine < 1e-9) {
    const whole = held > Math.PI ? (2 * Math.PI * Math.round(held / (2 * Math.PI))) / held : 0;
    y[at] = 2 * x + whole * y[before];
    y[at + 1] = 2 * u + whole * y[before + 1];
    y[at + 2] = 2 * v + whole * y[before + 2];
    return;
  }
  let angle = 2 * Math.atan2(sine, w);
  if (held + angle > Math.PI) {
    const along = (x * y[before] + u * y[before + 1] + v * y[before + 2]) / sine;
    angle += 2 * Math.PI * Math.round((along - angle) / (2 * Math.PI));
  }
  y[at] = (x / sine) * angle;
  y[at + 1] = (u / sine) * angle;
  y[at + 2] = (v / sine) * angle;
}

/** Each on the side of the one before. */
function unitOrientations(track: RotationTrack): Float64Array {
  const all = new Float64Array(4 * track.times.length);
  const one = new Float64Array(4);
  for (let at = 0; at < all.length; at += 4) {
    keyOrientation(one, track, at / 4);
    let along = 0;
    if (at > 0) for (let i = 0; i < 4; i++) along += one[i] * all[at - 4 + i];
    for (let i = 0; i < 4; i++) all[at + i] = along < 0 ? -one[i] : one[i];
  }
  return all;
}
