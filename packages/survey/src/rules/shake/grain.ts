import { angleFloor, medianGap } from '@slewcurve/core';
import type { Limits, Place, Remedy, Rule, TrackContext } from '../../rule.js';
import { sayDegrees } from '../../say-number.js';
import { grainOf } from './grain-of.js';
import { smoothing } from './smoothing.js';

const DEGREES = 180 / Math.PI;

/** Keys a second below which lively motion reads like noise (0.07 to 0.5° at 24 to 30, measured): no more than a note there. */
const CAN_TELL = 48;

/** Standard deviations by which smoothing may turn a key: noise alone stays below four, what is further off is no noise. */
const MOST_MOVED = 6;

/** Noise all over a captured track. */
export const grain: Rule = Object.freeze({
  id: 'shake.grain',
  family: 'shake',
  level: 'warning',
  unit: 'deg',
  alsoCalled: ['jitter', 'noise', 'sensor noise', 'tremble', 'fuzz', 'smooth', 'filter', 'denoise'],
  summary: 'A dense track is noisy from key to key all along.',
  limits: Object.freeze({
    joint: { deviation: 0.1 },
    prop: { deviation: 0.1 },
    'camera-screen': { deviation: 0.02 },
    'camera-headset': { deviation: 0.02 },
    eye: { deviation: 0.1 },
    machine: { deviation: 0.02 },
  }),
  reads: 'track',
  untouched: 'kept keys and all keys inside a guard, byte for byte',
  find(context: TrackContext, { deviation = 0 }: Limits): readonly Place[] {
    if (context.played.every(({ holds }) => holds)) return [];
    const { times, storage, interpolation } = context.track;
    const value = grainOf(context);
    const rate = 1 / medianGap(context.track);
    const limit = Math.max(deviation * scaleAt(rate), angleFloor(storage, interpolation) * DEGREES);
    if (!(value > limit)) return [];
    const [start, end] = [times[0] ?? 0, times.at(-1) ?? 0];
    return [
      {
        keys: [],
        time: start,
        span: [start, end],
        value,
        limit,
        level: rate < CAN_TELL ? 'note' : 'warning',
      },
    ];
  },
  remedy: (context: TrackContext, { value }: Place): Remedy | undefined =>
    smoothing(context, MOST_MOVED * value),
  message({ value, limit }: Place): string {
    return `its keys are noisy by ${sayDegrees(value)} an axis, one standard deviation (limit ${sayDegrees(limit)})`;
  },
  page: {
    what: 'Noise of a sensor, of marker tracking, of a solver that starts anew every frame.',
    trace: 'A fuzzy band and a floor that never comes down to zero.',
    standard: 'glTF 2.0 says nothing about it.',
    programs: 'All play it.',
    people:
      'A tremble, plainest where something should stand still. On motors it is heat and wear; it also swamps every limit on acceleration.',
    test: 'In a dense track, over all keys slower than 60 deg/s, taken over six keys on each side (at least eight such keys): the median of what a cubic through the four neighbours misses, scaled to the standard deviation of one axis. Limits hold from 60 keys a second; at 30 two and a half times, at 24 five times as much, between them in proportion, and never less than the noise floor.',
    source:
      'The scale is that of white noise: √70/6 an axis and 1.538 for the median of three (chi distribution). The limits are common practice, no source; those for slow rates are set so that lively motion, which reads as 0.07 to 0.5° there by itself, stays below them (measured).',
    spares:
      'Sparse and STEP tracks, keys faster than 60 deg/s, tracks with fewer than eight slower ones. Below 48 keys a second lively motion reads like noise, and it is a note.',
    remedy:
      '`smooth` over six key gaps, which leaves 8 % of the noise’s power, no key turned by more than six standard deviations. Guarded are what turns faster than 60 deg/s, declared whips and marks, and all that leans one way and so is no noise: unguarded it would lower the peak of a whip. The largest turn of a key is told.',
  },
});

/** 1 from 60 keys a second up, 2.5 at 30, 5 at 24, by straight lines between. */
function scaleAt(rate: number): number {
  if (rate >= 59.9) return 1;
  return rate >= 30 ? 1 + (1.5 * (60 - rate)) / 30 : Math.min(5, 2.5 + (2.5 * (30 - rate)) / 6);
}
