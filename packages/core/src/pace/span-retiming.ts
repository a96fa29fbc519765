import type { Curve } from '../curve/curve.js';
import type { AngleProfile } from './angle-profile.js';
import type { PaceAt, Retiming } from './retiming.js';
import type { TurnedAngle } from './turned-angle.js';

/** A stretch of a curve's time, seconds. */
export type Span = readonly [from: number, to: number];

/** What a clock does inside a span, by the times since the span's start. */
export interface InnerClock {
  /** New seconds that the span takes. */
  readonly seconds: number;
  /** New times since the span's start, 0 first and `seconds` last. */
  readonly knots: readonly number[];
  readonly continuity: 0 | 1 | 2;
  /** Old time, on the curve's own clock, at a new time since the span's start. */
  oldTime(since: number): number;
  /** First new time since the span's start at which an old time plays. */
  newTime(old: number): number;
  paceAt(since: number, out: PaceAt): void;
}

/** Old time before the span, the inner clock inside it, old time shifted after it. */
export function spanRetiming(
  curve: Pick<Curve, 'start' | 'end'>,
  [from, to]: Span,
  inner: InnerClock,
): Retiming {
  const shift = inner.seconds - (to - from);
  const { start } = curve;
  const innerEnd = from + inner.seconds;
  const end = to < curve.end ? curve.end + shift : innerEnd;
  const now: PaceAt = { by: 'time', speed: 1, acceleration: 0 };
  const isInside = (t: number): boolean => t >= from && (t < innerEnd || (t === innerEnd && to >= curve.end));
  const inside = inner.knots.map((knot) => (knot === inner.seconds ? innerEnd : from + knot));
  const outer = [...(start < from ? [start] : []), ...inside, ...(to < curve.end ? [end] : [])];
  return {
    start,
    end,
    knots: Float64Array.from(outer),
    continuity: start < from || to < curve.end ? 0 : inner.continuity,
    oldTime(t) {
      if (!(t > from)) return t;
      if (t >= end) return curve.end + (t - end);
      if (t >= innerEnd) return t === innerEnd ? to : Math.min(curve.end, t - shift);
      return Math.max(from, Math.min(to, inner.oldTime(t - from)));
    },
    newTime(old) {
      if (!(old > from)) return old;
      if (old >= curve.end) return end + (old - curve.end);
      if (old >= to) return old === to ? innerEnd : old + shift;
      return from + inner.newTime(old);
    },
    paceAt(t) {
      now.by = 'time';
      now.speed = 1;
      now.acceleration = 0;
      if (isInside(t)) inner.paceAt(t - from, now);
      return now;
    },
  };
}

/** The inner clock that turns a span of a curve by an angle profile. */
export function clockOfProfile(turned: TurnedAngle, [from]: Span, profile: AngleProfile): InnerClock {
  const before = turned.angleAt(from);
  return {
    seconds: profile.seconds,
    knots: profile.knots,
    continuity: profile.continuity,
    oldTime: (since) => turned.timeAt(before + profile.angleAt(since)),
    newTime: (old) => profile.timeOf(turned.angleAt(old) - before),
    paceAt(since, out) {
      out.by = 'angle';
      out.speed = profile.speedAt(since);
      out.acceleration = profile.accelerationAt(since);
    },
  };
}
