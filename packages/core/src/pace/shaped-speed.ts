import type { Curve } from '../curve/curve.js';
import { SlewcurveError } from '../errors.js';
import { clockAtSpeeds } from './clock-at-speeds.js';
import { type DrawnSpeed, areaUnder, drawnProfile } from './drawn-profile.js';
import { EASES } from './eases.js';
import { type Places, placesAlong } from './places-along.js';
import { type InnerClock, type Span, clockOfProfile } from './span-retiming.js';
import type { TurnedAngle } from './turned-angle.js';

/** A speed trace pressed at one place, up or down, with soft shoulders. */
export interface Press {
  /** Where, old seconds. */
  readonly at: number;
  /** How far the press reaches on either side, seconds, more than 0. */
  readonly reach: number;
  /** Change of the speed at `at`, rad/s; less than nothing is left of no speed. */
  readonly by: number;
  /**
   * `same`: both ends of the span keep their time and their orientation, and the angle is borrowed from, or lent to, the rest of the span in proportion
   * to its speed. `run`: the path stays and what follows comes earlier or later.
   */
  readonly ends: 'same' | 'run';
  /** Seconds at both ends of the span over which borrowing fades in. Default `reach`, at most half the span. */
  readonly shoulders?: number;
}

/** The speed of a curve over a span as straight pieces, by seconds since the span's start. */
function speedOver({ times, speeds }: Places): {
  readonly times: number[];
  readonly speeds: number[];
} {
  const drawn = { times: [] as number[], speeds: [] as number[] };
  for (let i = 0; i + 1 < times.length; i++) {
    drawn.times.push(times[i] - times[0], times[i + 1] - times[0]);
    drawn.speeds.push(speeds[2 * i], speeds[2 * i + 1]);
  }
  return drawn;
}

/**
 * The clock of a pressed speed. With b the press and w the rest of the span, `same` makes it v* = (v + b)₊·(1 − k·w), k such that the area under it,
 * the angle, stays; `run` makes the time T* = ∫dS/v*(S) with v* = v + b.
 *
 * @throws SlewcurveError `pace.too-little-to-borrow`, `pace.stands-still`, `pace.bad-press`
 */
export function pressedClock(curve: Curve, turned: TurnedAngle, span: Span, press: Press): InnerClock {
  const [from, to] = span;
  const { at, reach, by } = press;
  if (!(reach > 0) || !Number.isFinite(by) || !(at >= from && at <= to))
    throw new SlewcurveError(
      'pace.bad-press',
      `A press needs a reach above 0 s and a place between ${from} s and ${to} s; got ${reach} s at ${at} s.`,
    );
  const places = placesAlong(curve, span, {
    more: () => [at, at - reach, at + reach].filter((t) => t > from && t < to),
    skipBends: true,
  });
  const bell = (t: number): number => 1 - step(Math.abs(t - at) / reach);
  const drawn = speedOver(places);
  const pressed = drawn.speeds.map((speed, i) => Math.max(0, speed + by * bell(from + drawn.times[i])));
  if (press.ends === 'run') return runningClock(curve, places, pressed, at);
  const shoulders = Math.min(press.shoulders ?? reach, (to - from) / 2);
  const rest = drawn.times.map(
    (since) => (1 - bell(from + since)) * step(Math.min(since, to - from - since) / shoulders),
  );
  const angle = turned.angleAt(to) - turned.angleAt(from);
  const taken = areaUnder({ times: drawn.times, speeds: pressed }) - angle;
  const lendable = areaUnder({ times: drawn.times, speeds: pressed.map((speed, i) => speed * rest[i]) });
  const share = taken / lendable;
  if (!(share <= 1))
    throw new SlewcurveError(
      'pace.too-little-to-borrow',
      `The press takes ${degrees(taken)}° and the rest of the span has ${degrees(lendable)}° to lend. Press less, widen the span, or let time run.`,
    );
  const speeds = pressed.map((speed, i) => speed * (1 - share * rest[i]));
  // Of the many pieces these alone are told as knots: there the press has its corners, and the old speed its jumps.
  const bends = [at - reach - from, at - from, at + reach - from, shoulders, to - from - shoulders];
  const emptied = drawn.times.filter((_, i) => i > 0 && (pressed[i] === 0) !== (pressed[i - 1] === 0));
  const jumps = Array.from(curve.knots, (knot) => knot - from);
  const inside = [...bends, ...emptied, ...jumps].filter((since) => since > 0 && since < to - from);
  inside.sort((a, b) => a - b);
  const profile = drawnProfile({ times: drawn.times, speeds }, angle, [0, ...inside, to - from]);
  return clockOfProfile(turned, span, profile);
}

/** The clock of a speed drawn over a span, scaled to the angle that the span turns by; its time is the span's unless the drawing's is another. */
export function drawnClock(turned: TurnedAngle, span: Span, drawn: DrawnSpeed): InnerClock {
  const angle = turned.angleAt(span[1]) - turned.angleAt(span[0]);
  return clockOfProfile(turned, span, drawnProfile(drawn, angle));
}

function runningClock(curve: Curve, places: Places, pressed: readonly number[], at: number): InnerClock {
  const speeds = Float64Array.from(pressed);
  const stuck = places.angles.some((angle, i) => angle > 0 && !(speeds[2 * i] + speeds[2 * i + 1] > 0));
  if (stuck)
    throw new SlewcurveError(
      'pace.stands-still',
      `Pressed down to no speed at ${at} s, time would run for ever. Press less, or put a hold there.`,
    );
  const same = Uint8Array.from(places.angles, (_, i) =>
    Number(speeds[2 * i] === places.speeds[2 * i] && speeds[2 * i + 1] === places.speeds[2 * i + 1]),
  );
  return clockAtSpeeds(curve, { ...places, speeds, same });
}

function step(u: number): number {
  return EASES['minimum-jerk'].position(Math.max(0, Math.min(1, u)));
}

function degrees(radians: number): string {
  return ((radians * 180) / Math.PI).toFixed(1);
}
