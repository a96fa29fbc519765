import type { Limits, Place, PlayedTrack, Remedy, Rule, TrackContext } from '../../rule.js';
import { sayRate } from '../../say-number.js';
import { segmentsOf } from '../../segments.js';
import { triedStep } from '../../tried-step.js';
import { cubicPlayed } from './cubic-played.js';
import { speedsWithin } from './speeds-within.js';

/** Moments of a segment that are looked at. */
const MOMENTS = 32;

const UNEVEN = Object.freeze({ times: 3, gaps: 3, moving: 2 });

/** Key gaps so uneven that the tangents don't fit them. */
export const lurch: Rule = Object.freeze({
  id: 'pace.lurch',
  family: 'pace',
  level: 'warning',
  unit: 'deg/s',
  alsoCalled: [
    'uneven keys',
    'uniform tangents',
    'speed burst',
    'wobble at uneven keys',
    'tangents',
    'spline',
    'squad',
  ],
  summary: 'Where a long gap between keys meets a short one, the speed shoots far past what either gap says.',
  limits: Object.freeze({
    joint: UNEVEN,
    prop: UNEVEN,
    'camera-screen': UNEVEN,
    'camera-headset': UNEVEN,
    eye: 'off',
    machine: UNEVEN,
  }),
  reads: 'track',
  untouched: 'every key and its time',
  excusedBy: ['whips', 'marks'] as const,
  find(context: TrackContext, limits: Limits): readonly Place[] {
    if (context.regime === 'dense') return [];
    const { times } = context.track;
    const curved = cubicPlayed(context);
    const places: Place[] = [];
    for (let key = 1; curved.length > 0 && key + 1 < times.length; key++) {
      const [before, after] = [
        (times[key] ?? 0) - (times[key - 1] ?? 0),
        (times[key + 1] ?? 0) - (times[key] ?? 0),
      ];
      if (!(Math.max(before, after) > (limits['gaps'] ?? 0) * Math.min(before, after))) continue;
      const [worst] = curved
        .flatMap((played) => placeAt(context, played, key, limits))
        .toSorted((a, b) => Math.abs(b.value - b.limit) - Math.abs(a.value - a.limit));
      if (worst !== undefined) places.push(worst);
    }
    return places;
  },
  remedy: ({ track }: TrackContext, { keys }: Place): Remedy | undefined =>
    triedStep(track, { verb: 'set tangents', keys }),
  message({ keys: [key = 0], value, limit, facts }: Place): string {
    const { slower = 0, faster = 0 } = facts ?? {};
    const pace = `where the keys on both sides go at ${sayRate(slower)} and ${sayRate(faster)}`;
    return value > limit
      ? `beside key ${key}, between a long gap and a short one, it rushes at ${sayRate(value)}, ${pace} (limit ${sayRate(limit)})`
      : `beside key ${key}, between a long gap and a short one, it falls to ${sayRate(value)}, ${pace} (at least ${sayRate(limit)})`;
  },
  page: {
    what: 'Tangents made as if all keys were equally far apart in time, on keys that are not.',
    trace: 'A needle in the short gap, a dip or a reversal in the long one.',
    standard: 'glTF 2.0 plays CUBICSPLINE tangents as they stand: per second, whatever the gap.',
    programs: 'Curves of equal weights (Catmull and Rom’s, squad without times) do it to any uneven keys.',
    people: 'A lurch: the motion hurries through one key and hangs at the next, or even runs back.',
    test: 'In a sparse track joined by cubics, at a key whose two gaps differ by more than three times and whose two segments both go faster than 2 deg/s: the speed in either exceeds three times the faster of them, or, inside either, falls below a third of the slower one and rises again.',
    source:
      'Common practice, no source. Keys at 0, 1, 1.1 and 2.1 s in a steady turn of 40 deg/s read −47 to 212 deg/s under uniform tangents, and 39 to 40 under time-weighted ones (measured).',
    spares:
      'Even gaps, segments that stand still, marked accents, declared whips, playbacks of straight segments.',
    remedy:
      '`set tangents` lays those of the key anew, weighted by time; keys and times stay. Cubics that the player makes itself have none to set.',
  },
});

function placeAt(
  context: TrackContext,
  { curve, playback }: PlayedTrack,
  key: number,
  { times: most = 0, moving = 0 }: Limits,
): Place[] {
  const { times } = context.track;
  const { speeds } = segmentsOf(context);
  const sides = [speeds[key - 1] ?? Number.NaN, speeds[key] ?? Number.NaN];
  const [slower, faster] = [Math.min(...sides), Math.max(...sides)];
  if (!(slower > moving)) return [];
  const span = [times[key - 1] ?? 0, times[key + 1] ?? 0] as const;
  const time = times[key] ?? 0;
  const within = [
    ...speedsWithin(curve, span[0], time, MOMENTS),
    ...speedsWithin(curve, time, span[1], MOMENTS),
  ];
  const fastest = Math.max(...within);
  const facts = { slower, faster };
  const place = (value: number, limit: number): Place[] => [
    { keys: [key], time, span, value, limit, level: 'warning', playback: playback.id, facts },
  ];
  if (fastest > most * faster) return place(fastest, most * faster);
  // Easing to a stop at the key, or from the key before, is meant; a dip inside a segment that is passed at speed is not.
  const slowest = Math.min(...dipsOf(within));
  return slowest < slower / most ? place(slowest, slower / most) : [];
}

/** Speeds that are lower than those around, away from the ends of both segments. */
function dipsOf(speeds: readonly number[]): number[] {
  return speeds.filter((speed, i) => {
    const isInside = i % MOMENTS > 1 && i % MOMENTS < MOMENTS - 2;
    return isInside && speed <= (speeds[i - 1] ?? 0) && speed < (speeds[i + 1] ?? 0);
  });
}
