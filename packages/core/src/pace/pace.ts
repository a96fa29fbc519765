import type { Curve } from '../curve/curve.js';
import { greatest } from '../curve/greatest.js';
import { SlewcurveError } from '../errors.js';
import { type Limits, cappedClock } from './capped-clock.js';
import { copiedProfile } from './copied-profile.js';
import type { DrawnSpeed } from './drawn-profile.js';
import type { Ease } from './ease.js';
import { easedProfile } from './eased-profile.js';
import { EASES } from './eases.js';
import { joinedClocks } from './joined-clocks.js';
import { type Match, matchedClock } from './matched-clock.js';
import { marksProfile } from './marks-profile.js';
import { retimedCurve } from './retimed-curve.js';
import type { Retiming } from './retiming.js';
import { type Press, drawnClock, pressedClock } from './shaped-speed.js';
import { type InnerClock, type Span, clockOfProfile, spanRetiming } from './span-retiming.js';
import { type Stretch, rampSeconds, stretchesClock } from './stretches-clock.js';
import { type TurnedAngle, turnedAngle } from './turned-angle.js';

/** How a path is to be travelled. Seconds, radians. */
export type PaceLaw = {
  /** Old times between which the pace changes; what follows is shifted. Default: from start to end. */
  readonly span?: Span;
} & (
  | { readonly kind: 'constant'; readonly seconds?: number }
  /** `stops`: old times, inside the span, at which it comes to rest as well; each stretch is eased by itself in the time that it took. */
  | {
      readonly kind: 'ease';
      readonly ease: Ease;
      readonly seconds?: number;
      readonly stops?: readonly number[];
    }
  /** From rest over the first `rise` old seconds, to rest over the last `fall`; the pace between stays, but for `seconds`. */
  | { readonly kind: 'ramps'; readonly rise?: number; readonly fall?: number; readonly seconds?: number }
  | ({ readonly kind: 'cap' } & Limits)
  | ({ readonly kind: 'press' } & Press)
  | ({ readonly kind: 'drawn' } & DrawnSpeed)
  /** To rest at the old time `at` for `seconds`; `shoulders`: old seconds in which it slows down and gets going again. */
  | {
      readonly kind: 'hold';
      readonly at: number;
      readonly seconds: number;
      readonly shoulders?: number;
    }
  /** What stands at an old time is to stand at a new one; both ascend. The span's ends stay where no mark names them. */
  | { readonly kind: 'marks'; readonly marks: readonly { readonly old: number; readonly time: number }[] }
  | { readonly kind: 'stretch'; readonly seconds: number }
  | ({ readonly kind: 'match' } & Match)
  | ({ readonly kind: 'copy' } & Copied)
);

/** The pace of another curve, between two of its times: default from its start to its end. */
export interface Copied {
  readonly of: Curve;
  readonly ofSpan?: Span;
  readonly seconds?: number;
}

/** A curve on another clock. */
export interface PacedCurve extends Curve {
  readonly retiming: Retiming;
}

/**
 * The same path of orientations at another pace, with exact rate and acceleration. No orientation is left out or visited twice.
 *
 * @throws SlewcurveError `pace.bad-span`, `pace.bad-number`, `pace.no-turn`, `pace.runs-back`, `pace.bad-marks`, `pace.unknown-law`,
 * `pace.bad-press`, `pace.too-little-to-borrow`, `pace.stands-still`, `pace.bad-match`
 */
export function pace(curve: Curve, law: PaceLaw): PacedCurve {
  const span = law.span ?? ([curve.start, curve.end] as const);
  checkWithin(curve, span);
  const retiming = spanRetiming(curve, span, clockOf(curve, span, law));
  return { ...retimedCurve(curve, retiming), retiming };
}

function checkWithin({ start, end }: Curve, [from, to]: Span): void {
  if (from >= start && to <= end && from < to) return;
  throw new SlewcurveError(
    'pace.bad-span',
    `The span from ${from} s to ${to} s does not lie within the curve's ${start} s to ${end} s.`,
  );
}

function clockOf(curve: Curve, span: Span, law: PaceLaw): InnerClock {
  const old = span[1] - span[0];
  switch (law.kind) {
    case 'constant':
      return easedClock(curve, span, EASES.constant, law.seconds);
    case 'ease':
      return stoppingClock(curve, span, law);
    case 'ramps':
      return rampsClock(span, law.rise ?? 0, law.fall ?? 0, law.seconds);
    case 'cap':
      return limitedClock(curve, span, law);
    case 'press':
      return pressedClock(curve, turnedAngle(curve), span, law);
    case 'drawn':
      return drawnClock(turnedAngle(curve), span, law);
    case 'hold':
      return holdClock(span, law);
    case 'marks':
      return marksClock(curve, span, law.marks);
    case 'stretch':
      return stretchesClock(span[0], [{ kind: 'steady', seconds: positive('The time', law.seconds), old }]);
    case 'match':
      return matchedClock(curve, turnedAngle(curve), span, law);
    case 'copy':
      return copiedClock(curve, span, law);
    default:
      throw new SlewcurveError(
        'pace.unknown-law',
        'The kind of a pace is one of constant, ease, ramps, cap, press, drawn, hold, marks, stretch, match, copy.',
      );
  }
}

function limitedClock(curve: Curve, span: Span, limits: Limits): InnerClock {
  positive('The limit of the rate', limits.rate);
  if (limits.acceleration !== undefined) positive('The limit of the acceleration', limits.acceleration);
  return cappedClock(curve, span, limits);
}

function easedClock(curve: Curve, span: Span, ease: Ease, seconds = span[1] - span[0]): InnerClock {
  positive('The time', seconds);
  const back = (u: number): number => -ease.speed(u);
  if (back(greatest(back, 0, 1)) > 1e-9)
    throw new SlewcurveError('pace.runs-back', `${ease.name} runs back for a while, which a pace cannot.`);
  const turned = turnedAngle(curve);
  return clockOfProfile(turned, span, easedProfile(angleOver(turned, span), seconds, ease));
}

/** Eased from stop to stop. */
function stoppingClock(
  curve: Curve,
  span: Span,
  {
    ease,
    seconds = span[1] - span[0],
    stops = [],
  }: { ease: Ease; seconds?: number; stops?: readonly number[] },
): InnerClock {
  const inside = stops.filter((stop) => stop > span[0] && stop < span[1]);
  if (inside.length === 0) return easedClock(curve, span, ease, seconds);
  const edges = [span[0], ...inside, span[1]];
  edges.sort((a, b) => a - b);
  const longer = seconds / (span[1] - span[0]);
  const parts = edges.slice(1).map((to, i) => {
    const stretch: Span = [edges[i], to];
    const old = to - edges[i];
    const took = longer === 1 ? old : old * longer;
    return {
      span: stretch,
      clock:
        curve.length(...stretch) > 0
          ? easedClock(curve, stretch, ease, took)
          : stretchesClock(edges[i], [{ kind: 'steady' as const, seconds: took, old }]),
    };
  });
  return joinedClocks(span, parts);
}

function copiedClock(
  curve: Curve,
  span: Span,
  { of, ofSpan = [of.start, of.end], seconds = span[1] - span[0] }: Copied,
): InnerClock {
  positive('The time', seconds);
  checkWithin(of, ofSpan);
  const [turned, other] = [turnedAngle(curve), turnedAngle(of)];
  angleOver(other, ofSpan);
  return clockOfProfile(turned, span, copiedProfile(of, other, ofSpan, angleOver(turned, span), seconds));
}

function angleOver(turned: TurnedAngle, [from, to]: Span): number {
  const angle = turned.angleAt(to) - turned.angleAt(from);
  if (angle > 0) return angle;
  throw new SlewcurveError('pace.no-turn', `Nothing turns between ${from} s and ${to} s.`);
}

function rampsClock([from, to]: Span, rise: number, fall: number, seconds: number | undefined): InnerClock {
  const old = to - from;
  if (!(rise >= 0 && fall >= 0 && rise + fall > 0 && rise + fall <= old))
    throw new SlewcurveError(
      'pace.bad-number',
      `Ramps of ${rise} s and ${fall} s do not fit into ${old} s; they must be above 0 and fit.`,
    );
  const steady = old - rise - fall;
  const stretches: Stretch[] = [
    { kind: 'rise' as const, seconds: rampSeconds(rise), old: rise },
    { kind: 'steady' as const, seconds: steady, old: steady },
    { kind: 'fall' as const, seconds: rampSeconds(fall), old: fall },
  ].filter((stretch) => stretch.old > 0);
  const natural = stretches.reduce((sum, stretch) => sum + stretch.seconds, 0);
  const scale = seconds === undefined ? 1 : positive('The time', seconds) / natural;
  return stretchesClock(
    from,
    stretches.map((stretch) => ({ ...stretch, seconds: stretch.seconds * scale })),
  );
}

function holdClock(
  [from, to]: Span,
  { at, seconds, shoulders = 0 }: { at: number; seconds: number; shoulders?: number },
): InnerClock {
  positive('The hold', seconds);
  if (!(at >= from && at <= to) || !(shoulders >= 0))
    throw new SlewcurveError(
      'pace.bad-number',
      `A hold at ${at} s with shoulders of ${shoulders} s does not lie between ${from} s and ${to} s.`,
    );
  const before = Math.min(shoulders, at - from);
  const after = Math.min(shoulders, to - at);
  const stretches: Stretch[] = [
    { kind: 'steady' as const, seconds: at - from - before, old: at - from - before },
    { kind: 'fall' as const, seconds: rampSeconds(before), old: before },
    { kind: 'rest' as const, seconds, old: 0 },
    { kind: 'rise' as const, seconds: rampSeconds(after), old: after },
    { kind: 'steady' as const, seconds: to - at - after, old: to - at - after },
  ];
  return stretchesClock(
    from,
    stretches.filter((stretch) => stretch.seconds > 0),
  );
}

function marksClock(
  curve: Curve,
  span: Span,
  marks: readonly { readonly old: number; readonly time: number }[],
): InnerClock {
  const named = marks.map(({ old, time }) => [old, time] as const);
  const first = named.some(([old]) => old === span[0]) ? [] : [[span[0], span[0]] as const];
  const last = named.some(([old]) => old === span[1]) ? [] : [[span[1], span[1]] as const];
  const all = [...first, ...named, ...last];
  all.sort((a, b) => a[0] - b[0]);
  const fits = all.every(([old, time], i) => i === 0 || (old > all[i - 1][0] && time > all[i - 1][1]));
  if (!fits || all[0][0] < span[0] || all[all.length - 1][0] > span[1] || all[0][1] !== span[0])
    throw new SlewcurveError(
      'pace.bad-marks',
      `Marks must lie within ${span[0]} s to ${span[1]} s, leave its start where it is, and come in the same order as before.`,
    );
  const turned = turnedAngle(curve);
  const before = turned.angleAt(span[0]);
  return clockOfProfile(
    turned,
    span,
    marksProfile(
      all.map(([, time]) => time - span[0]),
      all.map(([old]) => turned.angleAt(old) - before),
    ),
  );
}

function positive(what: string, number: number): number {
  if (Number.isFinite(number) && number > 0) return number;
  throw new SlewcurveError('pace.bad-number', `${what} must be a finite number above 0; it is ${number}.`);
}
