import { type Curve, findSegment, measure } from '@slewcurve/core';
import { type Limits, type Place, type Remedy, type Rule, type TrackContext, everyRole } from '../../rule.js';
import { triedStep } from '../../tried-step.js';
import { DEGREES, TOLERANCE, claimedFrom, levelFor, sayOver, timeOver } from './over-limit.js';
import { accelerationSteps } from './step-acceleration.js';

/** An acceleration beyond what the house rules allow. */
export const accelLimit: Rule = Object.freeze({
  id: 'limit.accel',
  family: 'limit',
  level: 'warning',
  unit: 'deg/s²',
  alsoCalled: ['too abrupt', 'maximum acceleration', 'torque limit', 'overcurrent', 'lurch', 'g-force'],
  summary: 'It gathers or loses speed, or changes its axis, faster than the house rules allow.',
  limits: everyRole({ acceleration: Infinity }),
  reads: 'track',
  untouched: 'the path of orientations, but for its corners; its time grows',
  excusedBy: ['whips', 'marks'] as const,
  find(context: TrackContext, { acceleration = Infinity }: Limits): readonly Place[] {
    if (!Number.isFinite(acceleration)) return [];
    const places = context.played.flatMap(({ playback, curve, holds }): Place[] => {
      if (holds) return [];
      const { peakAcceleration, peakAccelerationAt: time, accelerationIs } = measure(curve);
      const value = peakAcceleration * DEGREES;
      if (!(value > claimedFrom(context, acceleration, time, 2))) return [];
      const { seconds, span } = over(curve, accelerationIs, (acceleration * TOLERANCE) / DEGREES);
      const key = findSegment(context.track.times, time);
      const around = [Math.min(span[0], time), Math.max(span[1], time)] as const;
      const facts = {
        seconds,
        stretch: Math.sqrt(value / acceleration),
        exact: Number(accelerationIs === 'exact'),
      };
      const level = levelFor(context);
      return [
        { keys: [key], time, span: around, value, limit: acceleration, level, playback: playback.id, facts },
      ];
    });
    return places.length === 0 ? [] : [places.reduce((a, b) => (b.value > a.value ? b : a))];
  },
  remedy(context: TrackContext, { limit }: Place): Remedy | undefined {
    const { stored, track, played } = context;
    if (stored !== track || track.interpolation === 'EULER' || track.interpolation === 'STEP')
      return undefined;
    const given = context.limits('limit.speed')?.['rate'] ?? Infinity;
    const fastest = Math.max(...played.map(({ curve }) => curve.peak(curve.start, curve.end).rate * DEGREES));
    const rate = Number.isFinite(given) ? given : Math.ceil(fastest);
    // On frames a cubic overshoots by half where the cap's own acceleration turns over between two of them.
    const store = track.interpolation === 'CUBICSPLINE' ? ({ store: 'cubic' } as const) : {};
    const tried = triedStep(track, { verb: 'cap', rate, acceleration: limit, ...store });
    return tried && { step: tried.step };
  },
  message({ keys: [key], value, limit, facts }: Place): string {
    const { seconds = 0, stretch = 1, exact = 1 } = facts ?? {};
    const how = exact === 1 ? '' : ', its step spread over half of either gap';
    return `at key ${key} it accelerates by ${say(value)}${how}, and ${say(limit)} is the limit; ${sayOver(seconds, stretch)}`;
  },
  page: {
    what: 'Speed that comes or goes too quickly, or an axis that changes while it turns: a bend taken fast accelerates as well, v²·κ, though the speed is level.',
    trace: 'A steep flank; at a bend nothing in the speed, a swing in the axis lane.',
    standard: 'No file format limits an acceleration.',
    programs: 'All play it.',
    people:
      'On a screen a jolt. On a motorised head torque that its drive may not have; in a headset discomfort.',
    test: 'The exact greatest acceleration of the curve as played, in size, bends included; where the rate itself steps at a key, as between straight segments, that step spread over half of either gap. More than 0.5 % above the limit, and above what rounding (4f/Δt²) and three times the measured grain (2.45σ·fps² an axis) make.',
    source: 'The house rules: there is no default. Take a machine’s from its maker.',
    spares: 'Everything without a limit, STEP tracks, declared cuts, whips and marked hits.',
    remedy:
      '`cap` with the acceleration, bends counted, at the limit of speed or else at the speed that there is; corners of straight segments are rounded within 0.1°, which the price tells. Captured noise has to be smoothed first.',
  },
});

function over(
  curve: Curve,
  kind: 'step' | 'exact',
  limit: number,
): { readonly seconds: number; readonly span: readonly [number, number] } {
  const now = new Float64Array(3);
  if (kind === 'exact')
    return timeOver(curve, (time) => Math.hypot(...curve.acceleration(now, time, 'own')), limit);
  const steps = accelerationSteps(curve).filter(({ vector }) => Math.hypot(...vector) > limit);
  const seconds = steps.reduce((sum, { share }) => sum + share, 0);
  const times = steps.map(({ time }) => time);
  return { seconds, span: [Math.min(...times), Math.max(...times)] };
}

function say(acceleration: number): string {
  return `${acceleration.toPrecision(4)} deg/s²`;
}
