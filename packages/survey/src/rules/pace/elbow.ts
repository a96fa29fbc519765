import type { Limits, Place, PlayedTrack, Remedy, Rule, TrackContext } from '../../rule.js';
import { sayRate } from '../../say-number.js';
import { differenceOf } from '../../segments.js';
import { easeThroughKeys } from './ease-through-keys.js';

const DEGREES = 180 / Math.PI;

/** A key at which the angular rate steps. */
export const elbow: Rule = Object.freeze({
  id: 'pace.elbow',
  family: 'pace',
  level: 'warning',
  unit: 'deg/s',
  alsoCalled: [
    'corner',
    'jerk at keys',
    'kink',
    'velocity step',
    'linear segments',
    'C1',
    'pulsing',
    'robotic',
  ],
  summary: 'The angular rate steps at a hand-set key, as it does between two straight segments.',
  limits: Object.freeze({
    joint: { rate: 60, share: 0.4 },
    prop: { rate: 60, share: 0.4 },
    'camera-screen': { rate: 5, share: 0.2 },
    'camera-headset': { rate: 2, share: 0.1 },
    eye: 'off',
    machine: { rate: 5, share: 0.2 },
  }),
  reads: 'track',
  untouched: 'every key',
  excusedBy: ['whips', 'marks'] as const,
  find(context: TrackContext, limits: Limits): readonly Place[] {
    if (context.regime === 'dense') return [];
    const { rate: limit = 0, share = 0 } = limits;
    const corners = context.played.filter(({ holds, curve }) => !holds && curve.continuity <= 0);
    const breaks = new Set(context.track.breaks);
    const places: Place[] = [];
    for (let key = 1; key + 1 < context.track.times.length; key++) {
      if (breaks.has(key - 1) || breaks.has(key)) continue;
      const place = worstAt(context, corners, key, limit, share);
      if (place !== undefined) places.push(place);
    }
    return places;
  },
  remedy: (context: TrackContext): Remedy | undefined => easeThroughKeys(context),
  message(place: Place): string {
    const { before = 0, after = 0 } = place.facts ?? {};
    return `at key ${place.keys[0]} the angular rate steps by ${sayRate(place.value)}, from a speed of ${sayRate(before)} to ${sayRate(after)} (limit ${sayRate(place.limit)})`;
  },
  page: {
    what: 'Straight segments between hand-set keys: the pose is continuous, its rate is not. A change of the axis at the same speed is one too.',
    trace: 'Plateaus with a step at each key.',
    standard:
      'It is what glTF 2.0 asks for under LINEAR; CUBICSPLINE may be smooth or not, as its tangents say.',
    programs: 'All show it, each under its own interpolation.',
    people:
      'A camera that pulses at its waypoints, an arm that moves like a robot’s. On motors every step is a blow.',
    test: 'At a key the rate vector changes by more than the limit and by more than a share of the larger of both speeds, exactly, as played: 60 deg/s and 40 % for joints and props, 5 deg/s and 20 % for cameras on a screen, 2 deg/s and 10 % in a headset. Of several playbacks the worst counts.',
    source:
      'Limits are common practice, no source; a machine’s own acceleration limit should replace the one given here. Measured: a swing of ±30° at 1 Hz keyed every 0.2 s steps by 197 deg/s in a motion of 176 deg/s.',
    spares:
      'Dense tracks (baked natural motion steps as much by itself), STEP tracks, declared cuts and whips, marked hits, playbacks whose rate is continuous.',
    remedy:
      '`ease through` runs a smooth rotation spline through the same keys at the same times and stores it as CUBICSPLINE, LINEAR tracks alone.',
  },
});

// Written before they are read in every call.
const before = new Float64Array(3);
const after = new Float64Array(3);

function worstAt(
  { track }: TrackContext,
  corners: readonly PlayedTrack[],
  key: number,
  limit: number,
  share: number,
): Place | undefined {
  const time = track.times[key] ?? 0;
  let worst: Place | undefined;
  for (const { playback, curve } of corners) {
    curve.rate(before, justBefore(time), 'parent');
    curve.rate(after, time, 'parent');
    const value = differenceOf(after, before) * DEGREES;
    if (!(value > limit)) continue;
    const speeds = { before: length(before), after: length(after) };
    if (!(value > share * Math.max(speeds.before, speeds.after))) continue;
    if (worst !== undefined && worst.value >= value) continue;
    const span = [track.times[key - 1] ?? 0, track.times[key + 1] ?? 0] as const;
    worst = { keys: [key], time, span, value, limit, level: 'warning', playback: playback.id, facts: speeds };
  }
  return worst;
}

function length(rate: Float64Array): number {
  return Math.hypot(...rate) * DEGREES;
}

/** A time so near before another that a rate does not change on the way, and that float64 still tells apart. */
function justBefore(time: number): number {
  return time - Math.max(Math.abs(time), 1e-3) * 2 ** -50;
}
