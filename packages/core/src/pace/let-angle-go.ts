import type { Curve, Frame } from '../curve/curve.js';
import { integrate } from '../curve/integrate.js';
import { SlewcurveError } from '../errors.js';
import type { NumberStore } from '../number-store.js';
import { conjugate } from '../quaternion/conjugate.js';
import { dot } from '../quaternion/dot.js';
import { expMap } from '../quaternion/exp-map.js';
import { multiply } from '../quaternion/multiply.js';
import { normalise } from '../quaternion/normalise.js';
import { rotateVector } from '../quaternion/rotate-vector.js';
import { findSegment } from '../track/find-segment.js';
import { piecewisePeak } from './piecewise-peak.js';
import { type AddedSpeed, type PressedMotion, pressedMotion } from './pressed-motion.js';
import type { Span } from './span-retiming.js';

/** Places, about, at which the turn is summed up over the whole press, and at least in each smooth piece. */
const WANTED_PLACES = 400;
const LEAST_PARTS = 4;

/** A press that lets the angle go. Seconds, rad/s. */
export interface FreePress extends AddedSpeed {
  /** Old times beyond which nothing is pressed. Default: from start to end. */
  readonly span?: Span;
}

/** A curve that turns further, or less far, than the one it was made of: from the press on every pose is another. */
export interface FreedCurve extends Curve {
  /** Times between which it is pressed; after them it is the old motion after one turn, before them the old one. Seconds. */
  readonly pressed: Span;
  /** The turn, about parent axes, that takes the old pose at `t` to the new one: a unit quaternion that never jumps to its other sign. */
  turnAt<T extends NumberStore>(out: T, t: number): T;
}

/**
 * Presses a speed up or down and lets the angle go: every time stays, the turn goes on about the axis that it has at each moment, ω* = n·(v + b)₊ in own
 * axes, so that more or less is turned and the end is another. What follows is the old motion after one turn d about parent axes, q* = d·q: its speeds,
 * its own rates and its in-betweens are what they were. Where nothing turns, the axis is the last one that there was.
 *
 * The turn is summed up over short steps by the Magnus series to fourth order (W. Magnus 1954; S. Blanes and others 2009; from memory): 1e-6° and
 * less off. Where the motion turns back on its way, its speed touching zero, pressed speed makes a corner.
 *
 * @throws SlewcurveError `pace.bad-press`; `pace.no-turn` where nothing turns within its reach, so that there is no axis to turn about
 */
export function letAngleGo(curve: Curve, press: FreePress): FreedCurve {
  const { at, reach, span = [curve.start, curve.end] } = press;
  checkPress(curve, press, span);
  const pressed: Span = [Math.max(span[0], at - reach), Math.min(span[1], at + reach)];
  const rough = evenTimes(ascendingOnce(curve, [...curve.knots, ...pressed, at]), pressed);
  const motion = moving(pressedMotion(curve, pressed, rough, press), pressed);
  const knots = ascendingOnce(curve, [...curve.knots, ...pressed, at, ...motion.emptied]);
  const times = evenTimes(knots, pressed);
  const turns = summedTurns(curve, motion, times);
  const axes = new Float64Array(3);
  const turn = new Float64Array(4);
  const pose = new Float64Array(4);

  function turnAt<T extends NumberStore>(out: T, t: number): T {
    if (!(t > pressed[0])) return copy(out, IDENTITY);
    if (t >= pressed[1]) return copy(out, turns.subarray(-4));
    const i = findSegment(times, t);
    return advance(out, turns.subarray(4 * i, 4 * i + 4), curve, motion, times[i], t);
  }
  function orientation<T extends NumberStore>(out: T, t: number): T {
    turnAt(turn, t);
    return normalise(out, multiply(out, turn, curve.orientation(out, t)));
  }
  function derivative<T extends NumberStore>(out: T, t: number, frame: Frame, order: 1 | 2): T {
    if (order === 1) motion.rate(axes, t);
    else motion.acceleration(axes, t);
    if (frame === 'parent') rotateVector(axes, orientation(pose, t), axes);
    for (let k = 0; k < 3; k++) out[k] = axes[k];
    return out;
  }
  const speedAt = (t: number): number => {
    motion.rate(axes, t);
    return Math.hypot(axes[0], axes[1], axes[2]);
  };
  return {
    start: curve.start,
    end: curve.end,
    continuity: continuityOf(curve, motion, press, span),
    knots,
    pressed,
    turnAt,
    orientation,
    rate: (out, t, frame) => derivative(out, t, frame, 1),
    acceleration: (out, t, frame) => derivative(out, t, frame, 2),
    length: (t0, t1) => lengthOver(curve, knots, pressed, speedAt, [Math.min(t0, t1), Math.max(t0, t1)]),
    peak: (t0, t1) => piecewisePeak(speedAt, knots, t0, t1),
  };
}

const IDENTITY = Float64Array.of(0, 0, 0, 1);

function checkPress(curve: Curve, { at, reach, by }: FreePress, [from, to]: Span): void {
  const fits = from >= curve.start && to <= curve.end && at >= from && at <= to;
  if (reach > 0 && Number.isFinite(by) && fits) return;
  throw new SlewcurveError(
    'pace.bad-press',
    `A press needs a reach above 0 s and a place between ${from} s and ${to} s; got ${reach} s at ${at} s.`,
  );
}

function moving(motion: PressedMotion | undefined, [from, to]: Span): PressedMotion {
  if (motion) return motion;
  throw new SlewcurveError(
    'pace.no-turn',
    `Nothing turns between ${from} s and ${to} s, so there is no axis to turn about.`,
  );
}

/** The turn at each time, four numbers a time. */
function summedTurns(curve: Curve, motion: PressedMotion, times: Float64Array): Float64Array {
  const turns = new Float64Array(4 * times.length);
  turns.set(IDENTITY);
  for (let i = 0; i + 1 < times.length; i++)
    advance(
      turns.subarray(4 * i + 4, 4 * i + 8),
      turns.subarray(4 * i, 4 * i + 4),
      curve,
      motion,
      times[i],
      times[i + 1],
    );
  return turns;
}

const START = new Float64Array(4);
const PRESSED = new Float64Array(4);
const FREE = new Float64Array(4);
const EARLY = new Float64Array(3);
const LATE = new Float64Array(3);

/** The turn at `t1` out of that at `t0`: d₁ = d₀·q₀·E*·E⁻¹·q₀⁻¹, E and E* what the old and the pressed rate turn in between. */
function advance<T extends NumberStore>(
  out: T,
  before: Float64Array,
  curve: Curve,
  motion: PressedMotion,
  t0: number,
  t1: number,
): T {
  curve.orientation(START, t0);
  turnedBy((rate, t) => motion.rate(rate, t), PRESSED, t0, t1);
  turnedBy((rate, t) => motion.oldRate(rate, t), FREE, t0, t1);
  multiply(PRESSED, START, PRESSED);
  multiply(PRESSED, PRESSED, conjugate(FREE, FREE));
  multiply(PRESSED, PRESSED, conjugate(START, START));
  normalise(PRESSED, multiply(PRESSED, before, PRESSED));
  const sign = dot(PRESSED, before) < 0 ? -1 : 1;
  for (let k = 0; k < 4; k++) out[k] = sign * PRESSED[k];
  return out;
}

/** Exp(h(ω₁ + ω₂)/2 + h²√3/12·ω₁ × ω₂), own rates at Gauss's two points: the turn over a step from the right, an error of h⁵. */
function turnedBy(
  rateAt: (out: Float64Array, t: number) => void,
  out: Float64Array,
  t0: number,
  t1: number,
): void {
  const h = t1 - t0;
  rateAt(EARLY, t0 + h * (0.5 - Math.sqrt(3) / 6));
  rateAt(LATE, t0 + h * (0.5 + Math.sqrt(3) / 6));
  const bent = (h * h * Math.sqrt(3)) / 12;
  const [ax, ay, az] = EARLY;
  const [bx, by, bz] = LATE;
  out[0] = (h / 2) * (ax + bx) + bent * (ay * bz - az * by);
  out[1] = (h / 2) * (ay + by) + bent * (az * bx - ax * bz);
  out[2] = (h / 2) * (az + bz) + bent * (ax * by - ay * bx);
  expMap(out, out);
}

function continuityOf(
  curve: Curve,
  { stops, emptied }: PressedMotion,
  { at, reach }: FreePress,
  [from, to]: Span,
): Curve['continuity'] {
  const isCutOff = (at - reach < from && from > curve.start) || (at + reach > to && to < curve.end);
  if (curve.continuity < 1) return curve.continuity;
  if (stops || isCutOff) return 0;
  return emptied.length > 0 ? 1 : curve.continuity;
}

/** Angle turned: the old curve's own outside the press, the integral of the speed inside it. */
function lengthOver(
  curve: Curve,
  knots: Float64Array,
  [begin, end]: Span,
  speedAt: (t: number) => number,
  [t0, t1]: Span,
): number {
  let sum = t0 < begin ? curve.length(t0, Math.min(t1, begin)) : 0;
  if (t1 > end) sum += curve.length(Math.max(t0, end), t1);
  for (let i = 0; i + 1 < knots.length; i++) {
    const from = Math.max(t0, begin, knots[i]);
    const to = Math.min(t1, end, knots[i + 1]);
    if (from < to) sum += integrate(speedAt, from, to);
  }
  return sum;
}

/** Times evenly between the knots of a stretch, both its ends included. */
function evenTimes(knots: Float64Array, [from, to]: Span): Float64Array {
  const inside = [from, ...knots.filter((knot) => knot > from && knot < to), to];
  const parts = Math.max(LEAST_PARTS, Math.ceil(WANTED_PLACES / (inside.length - 1)));
  const times: number[] = [];
  for (let i = 0; i + 1 < inside.length; i++)
    for (let part = 0; part < parts; part++)
      times.push(inside[i] + ((inside[i + 1] - inside[i]) * part) / parts);
  return Float64Array.of(...times, to);
}

function ascendingOnce({ start, end }: Curve, numbers: readonly number[]): Float64Array {
  const apart = 1e-12 * (end - start);
  const ascending = Float64Array.from(numbers);
  ascending.sort();
  return ascending.filter((number, i) => i === 0 || number - ascending[i - 1] > apart);
}

function copy<T extends NumberStore>(out: T, turn: Float64Array): T {
  for (let k = 0; k < 4; k++) out[k] = turn[k];
  return out;
}
