import { angleBetween } from '@slewcurve/core';
import type { Limits, Place, Remedy, Rule, TrackContext } from '../../rule.js';
import { sayDegrees, saySeconds } from '../../say-number.js';
import { angleApart, segmentsOf, type Segments } from '../../segments.js';
import { addressOf } from '../jump/try-remedy.js';
import { toMillisecond } from '../to-millisecond.js';
import { turnFrom } from './turn-from.js';

const DEGREES = 180 / Math.PI;
/** Seconds that one reading of the drift takes: shorter ones drown in noise. */
const READING = 0.5;

/** Share of the turn that is left when it has returned, and how often it is looked at. */
const RETURNED = 0.3;
const LOOKS = 16;

const BODY = Object.freeze({ turn: 0.5, slowest: 0.02, fastest: 1.5, seconds: 2, spread: 20 });
const CAMERA = Object.freeze({ ...BODY, turn: 0.25 });

/** What should stand still and turns slowly away. */
export const creep: Rule = Object.freeze({
  id: 'shake.creep',
  family: 'shake',
  level: 'warning',
  unit: 'deg',
  alsoCalled: ['drift', 'sensor bias', 'gyro drift', 'slow slide', 'heading drift', 'sagging'],
  summary: 'A track that nearly stands still turns steadily about one axis.',
  limits: Object.freeze({
    joint: BODY,
    prop: BODY,
    'camera-screen': CAMERA,
    'camera-headset': CAMERA,
    eye: 'off',
    machine: BODY,
  }),
  reads: 'track',
  untouched: 'all keys outside the span',
  find(context: TrackContext, limits: Limits): readonly Place[] {
    const isSpared = context.regime !== 'dense' || context.played.every(({ holds }) => holds);
    if (isSpared || context.declared.spins.length > 0) return [];
    const { times } = context.track;
    const segments = segmentsOf(context);
    const { turn = 0, seconds = 0 } = limits;
    return driftsOf(context, segments, limits).flatMap(([from, to]): Place[] => {
      const span = [times[from] ?? 0, times[to] ?? 0] as const;
      const value = between(segments, from, to);
      if (span[1] - span[0] < seconds || value < turn || returns(segments, from, to)) return [];
      const isHold = context.declared.holds.some(
        ([start, end]) => span[0] >= start - READING && span[1] <= end + READING,
      );
      const level = isHold ? 'warning' : 'note';
      return [{ keys: [from, to], time: span[0], span, value, limit: turn, level }];
    });
  },
  remedy(context: TrackContext, { span }: Place): Remedy | undefined {
    const { times } = context.track;
    const isWhole = span[0] === times[0] && span[1] === times.at(-1);
    const step = { verb: 'take out drift', ...addressOf(context) };
    return { step: isWhole ? step : { ...step, span: toMillisecond(span) } };
  },
  message({ value, limit, span, level }: Place): string {
    const seconds = span[1] - span[0];
    const what =
      level === 'warning' ? 'in a declared hold it creeps' : 'while it nearly stands still it creeps';
    return `${what} by ${sayDegrees(value)} in ${saySeconds(seconds)} (limit ${sayDegrees(limit)})`;
  },
  page: {
    what: 'The bias of a gyroscope, a mount that sags, a solver that slides.',
    trace: 'A thin steady line just above zero.',
    standard: 'glTF 2.0 says nothing about it.',
    programs: 'All play it.',
    people: 'A prop that is not where it was left; a horizon that tips; a headset whose world turns away.',
    test: 'In a dense track, read every half second: for at least 2 s it turns at 0.02 to 1.5 deg/s about one axis, to 20°, by 0.5° or more in all (cameras 0.25°). In a declared hold a warning, elsewhere a note.',
    source: 'Common practice, no source.',
    spares:
      'Breathing and other slow motion that returns within its own time. A slow pan looks the same, so that nothing outside a declared hold is more than a note. Declared spins, STEP and sparse tracks, eyes.',
    remedy:
      '`take out drift` takes the straight line off. Where motion goes on before or after, that end’s pose is kept; where it does on both sides, the drift is paid back within the span, half at each end.',
  },
});

interface Reading {
  readonly from: number;
  readonly to: number;
  /** Parent axes, deg/s. */
  readonly rate: [number, number, number];
}

/** Turns over half a second each, one after the other. */
function readingsOf({ track: { times } }: TrackContext, { orientations }: Segments): Reading[] {
  const last = times.length - 1;
  const readings: Reading[] = [];
  for (let from = 0; from < last;) {
    let to = from + 1;
    while (to < last && (times[to] ?? 0) - (times[from] ?? 0) < READING) to++;
    const [x, y, z] = turnFrom(orientations, from, to);
    const scale = DEGREES / ((times[to] ?? 0) - (times[from] ?? 0));
    readings.push({ from, to, rate: [x * scale, y * scale, z * scale] });
    from = to;
  }
  return readings;
}

/** Stretches that turn slowly about one axis, as first and last keys. */
function driftsOf(context: TrackContext, segments: Segments, limits: Limits): [number, number][] {
  const { slowest = 0, fastest = 0, spread = 0 } = limits;
  const found: [number, number][] = [];
  let axis: Reading['rate'] | undefined;
  for (const { from, to, rate } of readingsOf(context, segments)) {
    const speed = Math.hypot(...rate);
    const isSlow = speed >= slowest && speed <= fastest;
    const run = found.at(-1);
    if (isSlow && run !== undefined && axis !== undefined && angleApart(axis, rate) < spread) run[1] = to;
    else {
      axis = isSlow ? rate : undefined;
      if (isSlow) found.push([from, to]);
    }
  }
  return found;
}

/** Whether the pose comes back, or came the same way before, within as many keys again: breathing. */
function returns(segments: Segments, from: number, to: number): boolean {
  const back = RETURNED * between(segments, from, to);
  const last = segments.turns.length;
  const step = Math.max(1, Math.floor((to - from) / LOOKS));
  for (let away = step; away <= to - from; away += step) {
    if (to + away <= last && between(segments, from, to + away) < back) return true;
    if (from - away >= 0 && between(segments, from - away, to) < back) return true;
  }
  return false;
}

function between({ orientations }: Segments, from: number, to: number): number {
  const before = orientations.subarray(4 * from, 4 * from + 4);
  return angleBetween(before, orientations.subarray(4 * to, 4 * to + 4)) * DEGREES;
}
