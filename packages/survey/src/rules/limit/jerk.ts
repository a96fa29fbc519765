import { type Curve, findSegment, jerk, measureJerk } from '@slewcurve/core';
import { type Limits, type Place, type Remedy, type Rule, type TrackContext, everyRole } from '../../rule.js';
import { DEGREES, TOLERANCE, grainFloor, levelFor, sayOver, timeOver } from './over-limit.js';
import { accelerationSteps } from './step-acceleration.js';

/** A jerk beyond what the house rules allow. */
export const jerkLimit: Rule = Object.freeze({
  id: 'limit.jerk',
  family: 'limit',
  level: 'warning',
  unit: 'deg/s³',
  alsoCalled: ['jolt', 'jerk limit', 'rough', 'rate of change of acceleration', 'S-curve', 'vibration'],
  summary: 'Its acceleration changes faster than the house rules allow.',
  limits: everyRole({ jerk: Infinity }),
  reads: 'track',
  untouched: 'the path of orientations; its time grows',
  excusedBy: ['whips', 'marks'] as const,
  find(context: TrackContext, { jerk: most = Infinity }: Limits): readonly Place[] {
    if (!Number.isFinite(most)) return [];
    const places = context.played.flatMap(({ playback, curve, holds }): Place[] => {
      if (holds) return [];
      const found = curve.continuity === 2 ? exact(curve, most) : stepped(curve, most);
      const value = found.peak * DEGREES;
      if (!(value > Math.max(most * TOLERANCE, grainFloor(context, 3)))) return [];
      const { time, seconds, span } = found;
      const key = findSegment(context.track.times, time);
      const around = [Math.min(span[0], time), Math.max(span[1], time)] as const;
      const facts = { seconds, stretch: Math.cbrt(value / most) };
      const level = levelFor(context);
      return [{ keys: [key], time, span: around, value, limit: most, level, playback: playback.id, facts }];
    });
    return places.length === 0 ? [] : [places.reduce((a, b) => (b.value > a.value ? b : a))];
  },
  remedy({ stored, track }: TrackContext, { facts }: Place): Remedy | undefined {
    if (stored !== track || track.interpolation === 'EULER') return undefined;
    const length = (track.times.at(-1) ?? 0) - (track.times[0] ?? 0);
    const seconds = Math.ceil(length * (facts?.['stretch'] ?? 1) * 100) / 100;
    return Number.isFinite(seconds)
      ? { step: { verb: 'stretch', clip: track.clip, track: track.id, seconds } }
      : undefined;
  },
  message({ keys: [key], value, limit, facts }: Place): string {
    const { seconds = 0, stretch = 1 } = facts ?? {};
    return `after key ${key} its acceleration changes by ${say(value)}, and ${say(limit)} is the limit; ${sayOver(seconds, stretch)}`;
  },
  page: {
    what: 'Acceleration that comes or goes at once: eases of too low an order, straight segments, noise.',
    trace: 'Corners in the trace, where its slope changes.',
    standard: 'No file format limits a jerk.',
    programs: 'All play it.',
    people: 'On a screen hardly anything. On a motorised head a knock that excites its mount and gears.',
    test: 'Where the acceleration is continuous, the exact greatest jerk at 64 places a segment; elsewhere the change of the step acceleration from key to key over the time between them. More than 0.5 % above the limit and above three times what the measured grain makes (4.46σ·fps³ an axis).',
    source: 'The house rules: there is no default. Take a machine’s from its maker.',
    spares: 'Everything without a limit, STEP tracks, declared cuts, whips and marked hits.',
    remedy:
      '`stretch` to the least time that keeps it, as jerk falls with the third power of the time. Easing by minimum jerk or an S-curve costs less where the ends alone are rough.',
  },
});

interface Found {
  readonly peak: number;
  readonly time: number;
  readonly seconds: number;
  readonly span: readonly [number, number];
}

function exact(curve: Curve, most: number): Found {
  const { peakJerk, peakJerkAt } = measureJerk(curve, 'own');
  const now = new Float64Array(3);
  const sizeAt = (time: number): number => Math.hypot(...jerk(now, curve, time, 'own')) * DEGREES;
  return { peak: peakJerk, time: peakJerkAt, ...timeOver(curve, sizeAt, most * TOLERANCE) };
}

/** From step to step of the acceleration. */
function stepped(curve: Curve, most: number): Found {
  const steps = accelerationSteps(curve);
  let [peak, time, seconds, first, last] = [0, curve.start, 0, Infinity, -Infinity];
  for (let i = 1; i < steps.length; i++) {
    const [before, after] = [steps[i - 1], steps[i]];
    if (!before || !after) continue;
    const gap = after.time - before.time;
    const size = Math.hypot(...after.vector.map((part, k) => part - (before.vector[k] ?? 0))) / gap;
    if (size > peak) [peak, time] = [size, before.time];
    if (!(size * DEGREES > most * TOLERANCE)) continue;
    seconds += gap;
    first = Math.min(first, before.time);
    last = Math.max(last, after.time);
  }
  return { peak, time, seconds, span: [first, last] };
}

function say(value: number): string {
  return `${value.toPrecision(4)} deg/s³`;
}
