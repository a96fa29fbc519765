import { findSegment } from '@slewcurve/core';
import { type Limits, type Place, type Remedy, type Rule, type TrackContext, everyRole } from '../../rule.js';
import { sayRate } from '../../say-number.js';
import { DEGREES, TOLERANCE, claimedFrom, levelFor, sayOver, timeOver } from './over-limit.js';

/** A speed beyond what the house rules allow. */
export const speedLimit: Rule = Object.freeze({
  id: 'limit.speed',
  family: 'limit',
  level: 'warning',
  unit: 'deg/s',
  alsoCalled: ['too fast', 'overspeed', 'maximum velocity', 'speed limit', 'slew rate', 'motor limit'],
  summary: 'It turns faster than the house rules allow.',
  limits: everyRole({ rate: Infinity }),
  reads: 'track',
  untouched: 'the path of orientations; its time grows',
  excusedBy: ['whips'] as const,
  find(context: TrackContext, { rate = Infinity }: Limits): readonly Place[] {
    if (!Number.isFinite(rate)) return [];
    const places = context.played.flatMap(({ playback, curve, holds }): Place[] => {
      if (holds) return [];
      const peak = curve.peak(curve.start, curve.end);
      const value = peak.rate * DEGREES;
      if (!(value > claimedFrom(context, rate, peak.time, 1))) return [];
      const now = new Float64Array(3);
      const speedAt = (time: number): number => Math.hypot(...curve.rate(now, time, 'own')) * DEGREES;
      const { seconds, span } = timeOver(curve, speedAt, rate * TOLERANCE);
      const key = Math.min(context.track.times.length - 1, findSegment(context.track.times, peak.time) + 1);
      const around = [Math.min(span[0], peak.time), Math.max(span[1], peak.time)] as const;
      const facts = { seconds, stretch: value / rate };
      const level = levelFor(context);
      return [
        {
          keys: [key],
          time: peak.time,
          span: around,
          value,
          limit: rate,
          level,
          playback: playback.id,
          facts,
        },
      ];
    });
    return places.length === 0 ? [] : [places.reduce((a, b) => (b.value > a.value ? b : a))];
  },
  remedy({ stored, track }: TrackContext, { limit }: Place): Remedy | undefined {
    if (stored !== track || track.interpolation === 'EULER' || track.interpolation === 'STEP')
      return undefined;
    return { step: { verb: 'cap', clip: track.clip, track: track.id, rate: limit } };
  },
  message({ keys: [key], value, limit, facts }: Place): string {
    const { seconds = 0, stretch = 1 } = facts ?? {};
    return `before key ${key} it turns at ${sayRate(value)}, and ${sayRate(limit)} is the limit; ${sayOver(seconds, stretch)}`;
  },
  page: {
    what: 'A move that was planned for the eye alone, a mount that is asked to follow something close to its axis, or a fault of the data that jumps: look at the `jump` rules first.',
    trace: 'A hump above the ruled line.',
    standard: 'No file format limits a speed.',
    programs: 'All play it; a motor that cannot falls behind or stops with an error.',
    people: 'On a screen nothing. A motorised head that lags, misses its marks or trips its drive.',
    test: 'The exact greatest speed of the curve as played is more than 0.5 % above the limit, and above what rounding and three times the measured grain make. Told: the peak, for how long it is over in all, and how much slower the whole would have to run to keep it.',
    source:
      'The house rules: there is no default. Take a machine’s from its maker. For comparison: a walking person’s head turns at up to 90 deg/s, a vigorous shake at 780 deg/s (group medians).',
    spares: 'Everything without a limit, STEP tracks, declared whips.',
    remedy:
      '`cap` slows down what is too fast and nothing else; the path stays and its time grows, which the price says in seconds. Where the time must stay, a person has to change the path.',
  },
});
