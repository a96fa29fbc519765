import { angleFloor, logMap, relative } from '@slewcurve/core';
import type { Level } from '../../finding.js';
import type { Limits, Place, PlayedTrack, Remedy, Rule, TrackContext } from '../../rule.js';
import { sayDegrees } from '../../say-number.js';
import { segmentsOf, type Segments } from '../../segments.js';
import { cubicPlayed } from './cubic-played.js';

const DEGREES = 180 / Math.PI;
/** Moments of a segment that are looked at; the worst is then found between its neighbours. */
const MOMENTS = 24;
/** Halvings of the stretch around the worst moment. */
const NARROW = 20;

/** A cubic that swings past its keys. */
export const overrun: Rule = Object.freeze({
  id: 'pace.overrun',
  family: 'pace',
  level: 'warning',
  unit: 'deg',
  alsoCalled: [
    'overshoot',
    'overshooting',
    'spline',
    'tangents',
    'undershoot',
    'swings past',
    'not a hold',
    'ringing',
  ],
  summary: 'Between two keys the motion leaves what they say: it moves in a hold, or swings past an extreme.',
  limits: Object.freeze({
    joint: { angle: 0.5 },
    prop: { angle: 0.5 },
    'camera-screen': { angle: 0.1 },
    'camera-headset': { angle: 0.05 },
    eye: 'off',
    machine: { angle: 0.02 },
  }),
  reads: 'track',
  untouched: 'every key, and the way of all segments but those beside the hold',
  excusedBy: ['whips', 'marks'] as const,
  find(context: TrackContext, { angle = 0 }: Limits): readonly Place[] {
    if (context.regime === 'dense') return [];
    const { track } = context;
    const floor = angleFloor(track.storage, track.interpolation) * DEGREES;
    const limit = Math.max(angle, 2 * floor);
    const segments = segmentsOf(context);
    const cubics = cubicPlayed(context);
    if (cubics.length === 0) return [];
    const places: Place[] = [];
    for (let k = 0; k + 1 < track.times.length; k++) {
      if (Number.isNaN(segments.turns[k])) continue;
      const [worst] = cubics
        .flatMap((played) => placeIn(context, played, segments, k, limit, floor))
        .toSorted((a, b) => b.value - a.value);
      if (worst !== undefined) places.push(worst);
    }
    return places;
  },
  // `set tangents` lays them by the turns on both sides, which are not flat at a hold.
  remedy: (): Remedy | undefined => undefined,
  message({ keys: [key = 0], value, limit, facts }: Place): string {
    return facts?.['hold'] === 1
      ? `keys ${key - 1} and ${key} are the same, and between them it swings out by ${sayDegrees(value)} (limit ${sayDegrees(limit)})`
      : `between key ${key - 1} and key ${key} it swings past them by ${sayDegrees(value)} (limit ${sayDegrees(limit)})`;
  },
  page: {
    what: 'A smooth spline through a hold or through the highest key of a swing: to be smooth at the key it has to go beyond it.',
    trace:
      'A hump where there should be zero; at an extreme the speed touches zero beside the key instead of at it.',
    standard: 'glTF 2.0 plays CUBICSPLINE tangents as they stand.',
    programs: 'All that play cubics show it; those that play straight segments do not.',
    people:
      'A thing that should stand still drifts out and comes back; a foot slides, a camera breathes. A motorised head may swing past its stop.',
    test: 'In a sparse track joined by cubics: between two keys that are the same (to the noise floor) the motion leaves them by more than the limit, a warning; or, along the turn from one key to the next, it goes back behind the first or beyond the second by more than the limit, a note, as a wanted swing looks the same. Limits: 0.5° for joints and props, 0.1° for cameras on a screen, 0.05° in a headset, 0.02° for machines, and twice the noise floor.',
    source:
      'Common practice, no source. Keys at 0°, 60°, 60° and 0°, a second apart, swing to 67.5° by tangents of finite differences (Hermite’s blend: a quarter of the tangent’s 30°).',
    spares: 'Dense tracks, marked accents, declared whips, playbacks of straight segments.',
    remedy: 'Flat tangents at both keys of the hold; all other segments stay. No verb lays them flat yet.',
  },
});

function placeIn(
  { track: { times } }: TrackContext,
  { curve, playback }: PlayedTrack,
  { orientations, turns }: Segments,
  k: number,
  limit: number,
  floor: number,
): Place[] {
  const turn = turns[k] ?? 0;
  const isHold = turn <= floor;
  const before = orientations.slice(4 * k, 4 * k + 4);
  const after = orientations.slice(4 * k + 4, 4 * k + 8);
  const along = logMap(new Float64Array(3), relative(after, before, after));
  const length = Math.hypot(...along);
  /** Degrees by which a moment lies outside what the two keys say. */
  const outside = (time: number): number => {
    const here = curve.orientation(new Float64Array(4), time);
    const [x = 0, y = 0, z = 0] = logMap(new Float64Array(3), relative(here, before, here));
    if (isHold) return Math.hypot(x, y, z) * DEGREES;
    const way = (x * (along[0] ?? 0) + y * (along[1] ?? 0) + z * (along[2] ?? 0)) / length;
    return Math.max(-way, way - length) * DEGREES;
  };
  const span = [times[k] ?? 0, times[k + 1] ?? 0] as const;
  const { time, value } = greatestWithin(outside, span);
  if (!(value > limit)) return [];
  const level: Level = isHold ? 'warning' : 'note';
  const facts = { hold: Number(isHold) };
  return [{ keys: [k + 1], time, span, value, limit, level, playback: playback.id, facts }];
}

/** The greatest value of a smooth measure within a span, and when. */
function greatestWithin(
  measure: (time: number) => number,
  [from, to]: readonly [number, number],
): { readonly time: number; readonly value: number } {
  const width = (to - from) / MOMENTS;
  let time = from;
  let value = -Infinity;
  for (let i = 1; i < MOMENTS; i++) {
    const here = measure(from + i * width);
    if (here > value) [time, value] = [from + i * width, here];
  }
  for (let step = width / 2, i = 0; i < NARROW; i++, step /= 2)
    for (const other of [time - step, time + step]) {
      const here = measure(other);
      if (here > value) [time, value] = [other, here];
    }
  return { time, value };
}
