import { pace, type Curve, type PaceLaw, type Retiming } from '@slewcurve/core';
import type { Motion, Reading, SpeedColumns } from '../chart/motion.js';
import { toDegrees } from '../chart/quantity.js';

type Span = readonly [number, number];

/** How a hand changes the speed: a pace within a span, or a press that lets the angle go. Radians. */
export type HandLaw =
  | (PaceLaw & { readonly span: Span })
  | {
      readonly kind: 'free';
      readonly at: number;
      readonly by: number;
      readonly reach: number;
      readonly span: Span;
    }
  /** A key of old time `old` at another time; both segments beside it are stretched. */
  | { readonly kind: 'moved'; readonly old: number; readonly time: number; readonly span: Span };

/** A stretch that angle is taken from, in the file's seconds before the edit. */
export interface LentStretch {
  readonly from: number;
  readonly to: number;
  /** Degrees. */
  readonly angle: number;
}

/** What an edit by hand would make of the speed, as far as a picture needs it while the hand moves. Degrees, deg/s, seconds. */
export interface PaceSketch {
  /** The whole motion at its new pace. */
  readonly motion: Motion;
  /** Old seconds between which the pace changes. */
  readonly span: Span;
  /** The same on the new clock. */
  readonly played: Span;
  /** Seconds added; below 0 where time is saved. */
  readonly seconds: number;
  /** Degrees added; 0 for all that keeps the path. */
  readonly degrees: number;
  /** Where the angle is borrowed from, left to right. */
  readonly lent: readonly LentStretch[];
  /** Where on the new clock what stands at an old time is to be seen; a press with the same ends keeps its place. */
  newTime(old: number): number;
}

/** Moments that a sketch is read at within its span. */
const SAMPLES = 480;
/** Shares of the greatest lending, and of the speed, below which nothing is shown as borrowed. */
const LITTLE = 0.01;

/**
 * Sketches a pace on the outline of a motion's speed. The laws are core's own; the outline makes them cheap.
 *
 * @throws SlewcurveError what `pace` throws where a law can't be kept
 */
export function sketchPace(motion: Motion, outline: Curve, law: HandLaw): PaceSketch {
  if (law.kind === 'free') return freeSketch(motion, outline, law);
  if (law.kind === 'moved') return movedSketch(motion, outline, law);
  const { retiming } = pace(outline, law);
  const [from, to] = law.span;
  const played: Span = [retiming.newTime(from), retiming.newTime(to)];
  const seconds = played[1] - played[0] - (to - from);
  const speeds = sampled(played, (t) => {
    const now = retiming.paceAt(t);
    return now.by === 'angle'
      ? toDegrees(now.speed)
      : now.speed * (now.speed > 0 ? outlineSpeed(outline, retiming.oldTime(t)) : 0);
  });
  const olds = oldTimes(outline, played, speeds);
  const keepsTime = law.kind === 'press' && law.ends === 'same';
  return {
    motion: repacedMotion(motion, law.span, played, speeds, olds),
    span: law.span,
    played,
    seconds: Math.abs(seconds) < 1e-9 ? 0 : seconds,
    degrees: 0,
    lent: keepsTime ? lentStretches(outline, played, speeds) : [],
    newTime: (old) => (keepsTime ? old : newTimeOf(old, retiming, law.span, seconds)),
  };
}

function newTimeOf(old: number, retiming: Retiming, [from, to]: Span, seconds: number): number {
  if (old <= from) return old;
  return old >= to ? old + seconds : retiming.newTime(old);
}

/** The press alone, added to the speed: every time stays, more or less is turned. */
function freeSketch(
  motion: Motion,
  outline: Curve,
  { at, by, reach, span }: Extract<HandLaw, { kind: 'free' }>,
): PaceSketch {
  const speeds = sampled(span, (t) =>
    Math.max(0, outlineSpeed(outline, t) + toDegrees(by) * bell(Math.abs(t - at) / reach)),
  );
  const step = (span[1] - span[0]) / SAMPLES;
  const turned = new Float64Array(SAMPLES + 1);
  for (let i = 1; i <= SAMPLES; i++) turned[i] = turned[i - 1] + (step * (speeds[i - 1] + speeds[i])) / 2;
  const degrees = turned[SAMPLES] - toDegrees(outline.length(...span));
  const same = repacedMotion(
    motion,
    span,
    span,
    speeds,
    sampled(span, (t) => t),
  );
  const start = motion.read(span[0]).odometer;
  return {
    motion: {
      ...same,
      read(time) {
        const reading = same.read(time);
        if (reading.time <= span[0]) return reading;
        const part = Math.min(SAMPLES, (reading.time - span[0]) / step);
        const i = Math.min(SAMPLES - 1, Math.floor(part));
        const inside = start + turned[i] + (part - i) * (turned[i + 1] - turned[i]);
        const odometer = reading.time < span[1] ? inside : reading.odometer + degrees;
        return { ...reading, odometer };
      },
    },
    span,
    played: span,
    seconds: 0,
    degrees,
    lent: [],
    newTime: (old) => old,
  };
}

function movedSketch(
  motion: Motion,
  outline: Curve,
  { old, time, span }: Extract<HandLaw, { kind: 'moved' }>,
): PaceSketch {
  const slopes = [(old - span[0]) / (time - span[0]), (span[1] - old) / (span[1] - time)];
  const oldTime = (t: number): number =>
    t < time ? span[0] + (t - span[0]) * slopes[0] : old + (t - time) * slopes[1];
  const speeds = sampled(span, (t) => slopes[t < time ? 0 : 1] * outlineSpeed(outline, oldTime(t)));
  return {
    motion: repacedMotion(motion, span, span, speeds, sampled(span, oldTime)),
    span,
    played: span,
    seconds: 0,
    degrees: 0,
    lent: [],
    newTime(at) {
      if (!(at > span[0] && at < span[1])) return at;
      return at < old ? span[0] + (at - span[0]) / slopes[0] : time + (at - old) / slopes[1];
    },
  };
}

/** 1 at the middle, 0 from 1 on, with no edge: one less the minimum-jerk step, as the verb has it. */
function bell(u: number): number {
  const held = Math.min(1, u);
  return 1 - held * held * held * (10 + held * (6 * held - 15));
}

function sampled([from, to]: Span, read: (t: number) => number): Float64Array {
  const step = (to - from) / SAMPLES;
  return Float64Array.from({ length: SAMPLES + 1 }, (_, i) => {
    // Just inside: at the very end the motion has ended, or the rest has begun.
    const t = i === SAMPLES ? to - 1e-6 * step : from + i * step;
    return read(t);
  });
}

/** The old time at each sample: where the outline has turned as far as the new speeds have. */
function oldTimes(outline: Curve, [begin, end]: Span, speeds: Float64Array): Float64Array {
  const step = (end - begin) / SAMPLES;
  const turned = new Float64Array(SAMPLES + 1);
  for (let i = 1; i <= SAMPLES; i++) turned[i] = turned[i - 1] + (step * (speeds[i - 1] + speeds[i])) / 2;
  const { knots } = outline;
  const whole = outline.length(outline.start, outline.end);
  const scale = turned[SAMPLES] > 0 ? whole / turned[SAMPLES] : 0;
  let piece = 0;
  let before = 0;
  let after = outline.length(knots[0], knots[1]);
  return turned.map((angle) => {
    const wanted = Math.min(whole, angle * scale);
    while (after < wanted && piece + 2 < knots.length) {
      piece++;
      before = after;
      after += outline.length(knots[piece], knots[piece + 1]);
    }
    const share = after > before ? Math.min(1, (wanted - before) / (after - before)) : 0;
    return knots[piece] + share * (knots[piece + 1] - knots[piece]);
  });
}

/** The motion with a span of it played on another clock, and what follows shifted. */
function repacedMotion(
  motion: Motion,
  [from, to]: Span,
  [begin, end]: Span,
  speeds: Float64Array,
  olds: Float64Array,
): Motion {
  const shift = end - begin - (to - from);
  const step = (end - begin) / SAMPLES;
  const between = (numbers: Float64Array, t: number): number => {
    const part = Math.min(SAMPLES, Math.max(0, (t - begin) / step));
    const i = Math.min(SAMPLES - 1, Math.floor(part));
    return numbers[i] + (part - i) * (numbers[i + 1] - numbers[i]);
  };
  const oldTime = (t: number): number =>
    t <= begin ? t : t >= end ? t - shift : Math.min(to, Math.max(from, between(olds, t)));
  const last = motion.end + shift;
  const columnAt = (a: number, b: number): readonly [number, number] => {
    if (b <= begin || a >= end) {
      const old = motion.columns(oldTime(a), oldTime(b), 1);
      return [old.greatest[0], old.least[0]];
    }
    const inside = speeds.subarray(
      Math.max(0, Math.ceil((a - begin) / step)),
      Math.min(SAMPLES, Math.floor((b - begin) / step)) + 1,
    );
    const ends = [between(speeds, a), between(speeds, b)];
    return [Math.max(...ends, ...inside), Math.min(...ends, ...inside)];
  };
  return {
    start: motion.start,
    end: last,
    columns(a, b, count): SpeedColumns {
      const columns = { greatest: new Float32Array(count), least: new Float32Array(count) };
      const width = (b - a) / count;
      for (let i = 0; i < count; i++) {
        const left = Math.max(motion.start, a + i * width);
        const right = Math.min(last, a + (i + 1) * width);
        if (right >= left) [columns.greatest[i], columns.least[i]] = columnAt(left, right);
      }
      return columns;
    },
    read(time): Reading {
      const t = Math.min(last, Math.max(motion.start, time));
      const old = motion.read(oldTime(t));
      if (t <= begin || t >= end) return { ...old, time: t };
      const speed = between(speeds, t);
      const scale = old.speed > 0 ? speed / old.speed : 0;
      const own = [old.own[0] * scale, old.own[1] * scale, old.own[2] * scale] as const;
      return { time: t, speed, own, odometer: old.odometer };
    },
    prepare: () => true,
    orientation: (time) => motion.orientation(oldTime(time)),
  };
}

/** Where the new speed is below the old one on the same clock, and by how many degrees. */
function lentStretches(outline: Curve, [from, to]: Span, speeds: Float64Array): LentStretch[] {
  const step = (to - from) / SAMPLES;
  const gaps = speeds.map(
    (speed, i) => outlineSpeed(outline, Math.min(to - 1e-6 * step, from + i * step)) - speed,
  );
  const least = LITTLE * gaps.reduce((most, gap) => Math.max(most, gap), 0);
  const stretches: { from: number; to: number; angle: number }[] = [];
  let open: { from: number; to: number; angle: number } | undefined;
  for (let i = 0; i < gaps.length; i++) {
    if (!(gaps[i] > least)) {
      open = undefined;
      continue;
    }
    if (!open) stretches.push((open = { from: from + i * step, to: 0, angle: 0 }));
    open.to = from + i * step;
    open.angle += gaps[i] * step;
  }
  const most = stretches.reduce((sum, { angle }) => Math.max(sum, angle), 0);
  return stretches.filter(({ angle }) => angle > LITTLE * most && angle > 1e-3);
}

/** The speed of an outline at a time, deg/s. */
function outlineSpeed(outline: Curve, time: number): number {
  return toDegrees(outline.rate(scratch, time, 'own')[2]);
}

const scratch = new Float64Array(3);
