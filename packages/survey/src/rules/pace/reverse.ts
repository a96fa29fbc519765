import { angleFloor, type Curve } from '@slewcurve/core';
import type { Level } from '../../finding.js';
import type { Limits, Place, Remedy, Rule, TrackContext } from '../../rule.js';
import { sayDegrees, saySeconds } from '../../say-number.js';
import { segmentsOf } from '../../segments.js';
import { grainOf } from '../shake/grain-of.js';
import { cubicPlayed } from './cubic-played.js';

const DEGREES = 180 / Math.PI;
/** Pieces that a segment joined by a cubic is cut into. */
const PIECES = 12;
/** Seconds on each side in which the move goes one way. */
const BESIDE = 0.5;
/** Times the way back that the move goes on each side of it. */
const ONE_WAY = 5;
/** Standard deviations of the grain by which noise alone may seem to go back. */
const NOISE = 8;

const BACK = Object.freeze({ angle: 0.3, seconds: 0.15 });

/** A move that runs back for a moment on its way. */
export const reverse: Rule = Object.freeze({
  id: 'pace.reverse',
  family: 'pace',
  level: 'warning',
  unit: 'deg',
  alsoCalled: ['backwards', 'runs back', 'hitch', 'handle error', 'retime error', 'back-turn', 'hiccup'],
  summary: 'In the middle of a move that goes one way it runs back for a moment.',
  limits: Object.freeze({
    joint: BACK,
    prop: BACK,
    'camera-screen': BACK,
    'camera-headset': BACK,
    eye: 'off',
    machine: BACK,
  }),
  reads: 'track',
  untouched: 'the way of the move',
  excusedBy: ['whips', 'marks'] as const,
  find(context: TrackContext, { angle = 0, seconds = 0 }: Limits): readonly Place[] {
    if (context.played.every(({ holds }) => holds)) return [];
    const { track } = context;
    const floor = 2 * angleFloor(track.storage, track.interpolation) * DEGREES;
    const limit = Math.max(angle, floor, NOISE * grainOf(context));
    const pieces = piecesOf(context);
    // What a joint’s muscles do by themselves looks the same.
    const level: Level = context.role === 'joint' ? 'note' : 'warning';
    return backwardRuns(pieces, seconds, limit).map(({ from, to, value }) => {
      const span = [pieces.times[from] ?? 0, pieces.times[to] ?? 0] as const;
      return { keys: keysOf(track.times, span), time: span[0], span, value, limit, level };
    });
  },
  // `shape` with a floor of zero would keep it going; where to, only a person can say.
  remedy: (): Remedy | undefined => undefined,
  message({ value, limit, span }: Place): string {
    return `in the middle of a move it runs back by ${sayDegrees(value)} within ${saySeconds(span[1] - span[0])} (limit ${sayDegrees(limit)})`;
  },
  page: {
    what: 'A tangent that points too far, a new pace laid over a move with a slip of the hand, two takes that overlap.',
    trace: 'The speed touches zero and comes back: a V, or two of them, where it should flow.',
    standard: 'glTF 2.0 says nothing about it: the file is valid, and a validator is silent.',
    programs: 'Every program plays it as it stands.',
    people: 'A hitch in a pan. On a motorised head a reversal of the gears, with all their play.',
    test: 'The rate about the axis of the move around it (half a second on each side) is backwards for less than 0.15 s and by more than 0.3°, twice the noise floor and eight times the measured grain, while on each side the move goes forward, without another reversal, by at least five times that. A warning for cameras, machines and props, a note for joints.',
    source: 'Common practice, no source.',
    spares:
      'Anticipation at the start and settling at the end, swings and cycles (their ways back are longer or as wide), marked accents, declared whips, STEP tracks, eyes. A single stray key is `jump.lone-key`.',
    remedy: '`shape` the speed so that it stays above zero; the way stays.',
  },
});

/** The motion as short straight turns: those between keys, and pieces of segments joined by cubics. */
interface Pieces {
  readonly times: Float64Array;
  /** Turn of each piece, parent axes, degrees; NaN across a break. */
  readonly turns: Float64Array;
}

const known = new WeakMap<TrackContext, Pieces>();

function piecesOf(context: TrackContext): Pieces {
  const before = known.get(context);
  if (before !== undefined) return before;
  const [cubic] = context.regime === 'dense' ? [] : cubicPlayed(context);
  const pieces = cubic === undefined ? ofKeys(context) : ofCurve(context, cubic.curve);
  known.set(context, pieces);
  return pieces;
}

function ofKeys(context: TrackContext): Pieces {
  const { times } = context.track;
  const turns = segmentsOf(context).rates.slice();
  for (let k = 0, i = 0; k + 1 < times.length; k++) {
    const gap = (times[k + 1] ?? 0) - (times[k] ?? 0);
    for (let axis = 0; axis < 3; axis++, i++) turns[i] = (turns[i] ?? 0) * gap;
  }
  return { times, turns };
}

function ofCurve({ track: { times } }: TrackContext, curve: Curve): Pieces {
  const count = PIECES * (times.length - 1);
  const at = Float64Array.from({ length: count + 1 }, (_, i) => {
    const k = Math.min(Math.floor(i / PIECES), times.length - 2);
    return (times[k] ?? 0) + (((times[k + 1] ?? 0) - (times[k] ?? 0)) * (i - PIECES * k)) / PIECES;
  });
  const turns = new Float64Array(3 * count);
  const rate = new Float64Array(3);
  for (let i = 0; i < count; i++) {
    const gap = (at[i + 1] ?? 0) - (at[i] ?? 0);
    curve.rate(rate, (at[i] ?? 0) + gap / 2, 'parent');
    for (let axis = 0; axis < 3; axis++) turns[3 * i + axis] = (rate[axis] ?? 0) * gap * DEGREES;
  }
  return { times: at, turns };
}

interface Run {
  readonly from: number;
  readonly to: number;
  readonly value: number;
}

/** Short runs of pieces that go against the move on both sides of them. */
function backwardRuns({ times, turns }: Pieces, seconds: number, limit: number): Run[] {
  const count = turns.length / 3;
  const runs: Run[] = [];
  const along = (a: number, b: number): number =>
    (turns[3 * a] ?? 0) * (turns[3 * b] ?? 0) +
    (turns[3 * a + 1] ?? 0) * (turns[3 * b + 1] ?? 0) +
    (turns[3 * a + 2] ?? 0) * (turns[3 * b + 2] ?? 0);
  for (let from = 1; from < count; from++) {
    // A reversal starts where a piece goes against the one before.
    if (!(along(from - 1, from) < 0)) continue;
    let to = from + 1;
    while (to < count && along(from - 1, to) < 0) to++;
    const lasts = (times[to] ?? 0) - (times[from] ?? 0);
    const isShort = to < count && lasts < seconds && Math.hypot(...sumOf(turns, from, to)) > limit;
    const run = isShort ? runOf({ times, turns }, from, to) : undefined;
    if (run !== undefined && run.value > limit) runs.push(run);
    if (run !== undefined) from = to;
  }
  return runs;
}

/** The way back of pieces `from` to before `to`, where the move goes one way before and after, far enough; undefined elsewhere. */
function runOf(pieces: Pieces, from: number, to: number): Run | undefined {
  const { turns } = pieces;
  const [first, end] = around(pieces, from, to);
  const before = sumOf(turns, first, from);
  const after = sumOf(turns, to, end);
  const axis = before.map((x, i) => x + (after[i] ?? 0));
  const length = Math.hypot(...axis);
  const way = ([x = 0, y = 0, z = 0]: ArrayLike<number> & Iterable<number>): number =>
    (x * (axis[0] ?? 0) + y * (axis[1] ?? 0) + z * (axis[2] ?? 0)) / length;
  const value = -way(sumOf(turns, from, to));
  if (!(value > 0 && way(before) >= ONE_WAY * value && way(after) >= ONE_WAY * value)) return undefined;
  for (let i = first; i < end; i++)
    if ((i < from || i >= to) && way(turns.subarray(3 * i, 3 * i + 3)) < 0) return undefined;
  return { from, to, value };
}

/** First piece, and the one after the last, within half a second of pieces `from` to before `to`. */
function around({ times, turns }: Pieces, from: number, to: number): readonly [number, number] {
  let first = from;
  while (first > 0 && (times[from] ?? 0) - (times[first - 1] ?? 0) <= BESIDE) first--;
  let end = to;
  while (3 * end < turns.length && (times[end + 1] ?? 0) - (times[to] ?? 0) <= BESIDE) end++;
  return [first, end];
}

function sumOf(turns: Float64Array, from: number, end: number): number[] {
  const sum = [0, 0, 0];
  for (let i = from; i < end; i++)
    for (let axis = 0; axis < 3; axis++) sum[axis] = (sum[axis] ?? 0) + (turns[3 * i + axis] ?? 0);
  return sum;
}

/** The keys that a span starts and ends at, or lies between. */
function keysOf(times: Float64Array, [from, to]: readonly [number, number]): number[] {
  const first = Math.max(
    0,
    times.findLastIndex((time) => time <= from + 1e-9),
  );
  const last = times.findIndex((time) => time >= to - 1e-9);
  return last <= first ? [first] : [first, last];
}
