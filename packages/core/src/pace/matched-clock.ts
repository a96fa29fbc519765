import type { Curve } from '../curve/curve.js';
import { SlewcurveError } from '../errors.js';
import { clockAtSpeeds } from './clock-at-speeds.js';
import { areaUnder, drawnProfile } from './drawn-profile.js';
import { EASES } from './eases.js';
import { joinedClocks } from './joined-clocks.js';
import { placesAlong } from './places-along.js';
import { type InnerClock, type Span, clockOfProfile } from './span-retiming.js';
import type { TurnedAngle } from './turned-angle.js';

/** One side of a join and the speed that it is to have there. */
export interface MatchedSide {
  /** Old seconds. */
  readonly at: number;
  /** Whether what comes before that time is shaped, or what comes after it. */
  readonly side: 'before' | 'after';
  /** rad/s. */
  readonly rate: number;
  /** Old seconds from the join over which it is shaped, more than 0. */
  readonly reach: number;
}

/** Sides of joins that are to have given speeds. */
export interface Match {
  readonly sides: readonly MatchedSide[];
  /** `same` (default): each side takes the time that it took, so that both its ends stay. `run`: what follows comes earlier or later. */
  readonly ends?: 'same' | 'run';
}

/** The most that the speed may be lowered on the way to make up for a faster join, as a share. */
const MOST_LENT = 0.95;

/**
 * Brings the speed at sides of joins to what is asked, and nothing else: v* = ((1 − e)·v + e·V)·(1 − k·w), e the minimum-jerk step up to the join and w
 * a bell between both ends of the reach. With `same` ends k is such that the area, the angle, stays; where time may run k is 0 and T* = ∫dS/v*(S). At
 * the join v* is level, so that what is stored on frames has the speed too.
 *
 * @throws SlewcurveError `pace.bad-match`, `pace.no-turn`, `pace.too-little-to-borrow`, `pace.stands-still`
 */
export function matchedClock(
  curve: Curve,
  turned: TurnedAngle,
  span: Span,
  { sides, ends = 'same' }: Match,
): InnerClock {
  const stretches = sides.map((side) => stretchOf(curve, span, side));
  stretches.sort((a, b) => a.span[0] - b.span[0]);
  const overlap = stretches.find((stretch, i) => i > 0 && stretch.span[0] < stretches[i - 1].span[1]);
  if (overlap)
    throw new SlewcurveError(
      'pace.bad-match',
      `Two sides would both be shaped at ${overlap.span[0]} s. Let them reach less far.`,
    );
  const parts = stretches.map((stretch) => ({
    span: stretch.span,
    clock: ends === 'run' ? runningClock(curve, stretch) : keepingClock(curve, turned, stretch),
  }));
  return joinedClocks(span, parts);
}

/** A stretch that is shaped, `join` at one of its ends. */
interface Stretch {
  readonly span: Span;
  readonly join: number;
  readonly rate: number;
}

function stretchOf(curve: Curve, [start, end]: Span, { at, side, rate, reach }: MatchedSide): Stretch {
  const from = side === 'before' ? Math.max(start, at - reach) : at;
  const to = side === 'before' ? at : Math.min(end, at + reach);
  if (!(reach > 0 && rate >= 0 && Number.isFinite(rate) && at >= start && at <= end && from < to))
    throw new SlewcurveError(
      'pace.bad-match',
      `Speeds are matched at a time between ${start} s and ${end} s, over a reach above 0 s, to a speed of 0 or more; got ${at} s, ${reach} s and ${rate} rad/s.`,
    );
  if (!(curve.length(from, to) > 0))
    throw new SlewcurveError(
      'pace.no-turn',
      `Nothing turns between ${from} s and ${to} s, so there is no speed to shape. Reach further.`,
    );
  return { span: [from, to], join: at, rate };
}

function keepingClock(curve: Curve, turned: TurnedAngle, stretch: Stretch): InnerClock {
  const [from, to] = stretch.span;
  const middle = (from + to) / 2;
  const { times: places, speeds: olds } = placesAlong(curve, stretch.span, {
    more: () => [middle],
    skipBends: true,
  });
  const times: number[] = [];
  const speeds: number[] = [];
  const lent: number[] = [];
  olds.forEach((old, side) => {
    const t = places[(side + 1) >> 1];
    times.push(t - from);
    speeds.push(towards(stretch, t, old));
    lent.push(speeds[side] * bell(stretch, t));
  });
  const angle = turned.angleAt(to) - turned.angleAt(from);
  const share = (areaUnder({ times, speeds }) - angle) / areaUnder({ times, speeds: lent });
  if (!(share <= MOST_LENT))
    throw new SlewcurveError(
      'pace.too-little-to-borrow',
      `Between ${from} s and ${to} s too little is turned to run at that speed and still take the time it takes. Reach further, ask for less, or let time run.`,
    );
  const drawn = { times, speeds: speeds.map((speed, side) => speed - share * lent[side]) };
  // Where the old speed jumped at a key the new one does, at that time, though the key passes at another.
  const knots = [...curve.knots.filter((knot) => knot > from && knot < to && knot !== middle), middle];
  knots.sort((a, b) => a - b);
  const profile = drawnProfile(drawn, angle, [0, ...knots.map((knot) => knot - from), to - from]);
  return clockOfProfile(turned, stretch.span, profile);
}

/** @throws SlewcurveError `pace.stands-still` */
function runningClock(curve: Curve, stretch: Stretch): InnerClock {
  if (!(stretch.rate > 0))
    throw new SlewcurveError(
      'pace.stands-still',
      `Brought to no speed at ${stretch.join} s, time would run for ever. Keep the same ends, or ease in or out.`,
    );
  const places = placesAlong(curve, stretch.span, { skipBends: true });
  const speeds = places.speeds.map((speed, side) => towards(stretch, places.times[(side + 1) >> 1], speed));
  return clockAtSpeeds(curve, { ...places, speeds, same: new Uint8Array(places.angles.length) });
}

function towards({ span, join, rate }: Stretch, t: number, speed: number): number {
  const near = step(1 - Math.abs(t - join) / (span[1] - span[0]));
  return (1 - near) * speed + near * rate;
}

function bell({ span: [from, to] }: Stretch, t: number): number {
  const across = (t - from) / (to - from);
  return step(2 * Math.min(across, 1 - across));
}

function step(u: number): number {
  return EASES['minimum-jerk'].position(Math.max(0, Math.min(1, u)));
}
