import type { Limits, Place, Remedy, Rule, TrackContext } from '../../rule.js';
import { sayDegrees, sayRate } from '../../say-number.js';
import { angleApart, rateOf, segmentsOf } from '../../segments.js';
import { easeThroughKeys } from './ease-through-keys.js';

const KICK = Object.freeze({ angle: 30, rate: 10, share: 0.2 });

/** A key at which the axis changes and the speed does not. */
export const axisKick: Rule = Object.freeze({
  id: 'pace.axis-kick',
  family: 'pace',
  level: 'warning',
  unit: 'deg',
  alsoCalled: ['axis change', 'corner', 'sharp turn', 'direction change', 'axis wander'],
  summary: 'At a hand-set key the turn goes on as fast as before, about another axis.',
  limits: Object.freeze({
    joint: KICK,
    prop: KICK,
    'camera-screen': KICK,
    'camera-headset': KICK,
    eye: 'off',
    machine: KICK,
  }),
  reads: 'track',
  untouched: 'every key',
  excusedBy: ['whips', 'marks'] as const,
  find(context: TrackContext, { angle: limit = 0, rate = 0, share = 0 }: Limits): readonly Place[] {
    const hasCorners = context.played.some(({ holds, curve }) => !holds && curve.continuity <= 0);
    if (context.regime === 'dense' || !hasCorners) return [];
    const { times } = context.track;
    const segments = segmentsOf(context);
    const { speeds } = segments;
    const places: Place[] = [];
    for (let key = 1; key < speeds.length; key++) {
      const [before, after] = [speeds[key - 1] ?? 0, speeds[key] ?? 0];
      const isLevel = Math.abs(before - after) < share * Math.max(before, after);
      if (!(Math.min(before, after) > rate && isLevel)) continue;
      const value = angleApart(rateOf(segments, key - 1), rateOf(segments, key));
      if (!(value > limit)) continue;
      const span = [times[key - 1] ?? 0, times[key + 1] ?? 0] as const;
      const facts = { speed: after };
      places.push({ keys: [key], time: times[key] ?? 0, span, value, limit, level: 'warning', facts });
    }
    return places;
  },
  remedy: (context: TrackContext): Remedy | undefined => easeThroughKeys(context),
  message({ keys, value, limit, facts }: Place): string {
    return `at key ${keys[0]} the axis turns by ${sayDegrees(value)} at a level ${sayRate(facts?.['speed'] ?? 0)} (limit ${sayDegrees(limit)})`;
  },
  page: {
    what: 'A corner of the way taken at full speed: two straight segments of like length about different axes.',
    trace: 'Nothing in the speed; a spike in the lane of the axis.',
    standard: 'It is what glTF 2.0 asks for under LINEAR between such keys.',
    programs: 'All show it under straight segments.',
    people: 'A knock at the key that nobody finds in a plot of speed.',
    test: 'At a key of a sparse track both speeds are above 10 deg/s and differ by less than 20 % of the faster, and the axes differ by more than 30°, in parent axes.',
    source: 'Common practice, no source.',
    spares:
      'Dense tracks, corners taken slowly, playbacks whose rate is continuous, marked hits, declared whips, STEP tracks.',
    remedy:
      '`ease through` lays a smooth way through the same keys at the same times, in LINEAR tracks; or slow down there.',
  },
});
