import { angleFloor } from '../track/noise-floor.js';
import { keyOrientation } from '../track/key-orientation.js';
import { medianGap } from '../track/regime.js';
import type { RotationTrack } from '../track/rotation-track.js';

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
  /** Keys, ascending, at which a lone key or a shelf of `size` radians or more may stand: a cheap bound that leaves none out. */
  candidates(size: number): number[];
}

/** Keys that a window reaches to either side, positions likewise, and the fewest positions that allow a claim. */
const REACH = 6;
const POSITIONS = 4;
const FEWEST = 7;
/** Gaps that differ by more than this share of the median need divided differences. */
const EVEN = 0.02;
/** A gap beyond this many medians is no neighbourhood. */
const HOLE = 1.5;
const FOURTH = Float64Array.of(1, -4, 6, -4, 1);

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
    candidates: (size) => window.candidates(size),
  };
}

interface KeyWindow {
  /** d_i, three numbers each, and the patterns of the three kinds, one number each, by position + 4. */
  readonly d: Float64Array;
  readonly patterns: readonly Float64Array[];
  /** Fill both around a key; how many positions could be used (the others are zero in both). */
  differences(key: number): number;
  candidates(size: number): number[];
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
    candidates: (least) => {
      const found: number[] = [];
      let before = -1;
      const first = period > 0 ? 0 : 2;
      const last = period > 0 ? period : count - 2;
      for (let key = first; key < last; key++) {
        for (let slot = 0; slot < 5; slot++) place(slot, key + slot - 2);
        if (isEven(times, 0, 5, gap)) weights.set(FOURTH);
        else dividedWeights(weights, times, 0, gap);
        // A lone key of size a that a fit must explain 16 times over leaves |d| ≥ 3.8a at its own position, a shelf explained 8
        // times ≥ 1.8a at its key or the one before. Turns are twice the chord here; a quarter of the bound is asked for.
        if (2 * chordDifference(orientations, keys, weights) < 0.45 * least) continue;
        if (key !== before) found.push(key);
        const next = period > 0 ? (key + 1) % period : key + 1;
        if (next > key) found.push(next);
        before = next;
      }
      if (period > 0 && found.length > 0 && found[0] !== 0) found.unshift(0);
      return found;
    },
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

/** Weights of the fourth divided difference over five slots from `first`, times 24h⁴: 1 −4 6 −4 1 on even gaps. */
function dividedWeights(weights: Float64Array, times: Float64Array, first: number, gap: number): void {
  for (let m = 0; m < 5; m++) {
    let product = 1;
    for (let other = 0; other < 5; other++)
      if (other !== m) product *= (times[first + m] - times[first + other]) / gap;
    weights[m] = 24 / product;
  }
}

/** Whether the known gaps between slots differ by at most 2 % of the median gap. */
function isEven(times: Float64Array, first: number, size: number, gap: number): boolean {
  let least = Infinity,
    most = -Infinity;
  for (let slot = first; slot + 1 < first + size; slot++) {
    const between = times[slot + 1] - times[slot];
    if (between < least) least = between;
    if (between > most) most = between;
  }
  return !(most - least > EVEN * gap);
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

/** Length of the weighted sum of five quaternions; 0 where one is missing. */
function chordDifference(q: Float64Array, keys: Int32Array, weights: Float64Array): number {
  let x = 0,
    y = 0,
    z = 0,
    w = 0;
  let side = 1;
  for (let m = 0; m < 5; m++) {
    if (keys[m] < 0) return 0;
    const at = 4 * keys[m];
    if (m > 0) {
      const last = 4 * keys[m - 1];
      const along =
        q[at] * q[last] + q[at + 1] * q[last + 1] + q[at + 2] * q[last + 2] + q[at + 3] * q[last + 3];
      if (along < 0) side = -side;
    }
    const weight = side * weights[m];
    x += weight * q[at];
    y += weight * q[at + 1];
    z += weight * q[at + 2];
    w += weight * q[at + 3];
  }
  return Math.sqrt(x * x + y * y + z * z + w * w);
}

function unitOrientations(track: RotationTrack): Float64Array {
  const all = new Float64Array(4 * track.times.length);
  const one = new Float64Array(4);
  for (let key = 0; key < track.times.length; key++) all.set(keyOrientation(one, track, key), 4 * key);
  return all;
}
