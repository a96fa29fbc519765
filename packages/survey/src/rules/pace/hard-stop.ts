import { medianGap } from '@slewcurve/core';
import type { Limits, Place, Remedy, Rule, TrackContext } from '../../rule.js';
import { sayRate } from '../../say-number.js';
import { triedStep } from '../../tried-step.js';
import { grainOf } from '../shake/grain-of.js';

const DEGREES = 180 / Math.PI;
/** Speed that noise of one degree an axis makes per frame: √2 an axis, √3 for three, and three times that to be sure. */
const NOISE = 3 * Math.SQRT2 * Math.sqrt(3);
/** Seconds that a start or a stop is spread over: 0.2 to 0.5 s is usual, common practice. */
const EASE = 0.3;
const CAMERA = Object.freeze({ rate: 5 });

/** A move that starts or ends at full speed. */
export const hardStop: Rule = Object.freeze({
  id: 'pace.hard-stop',
  family: 'pace',
  level: 'warning',
  unit: 'deg/s',
  alsoCalled: ['abrupt stop', 'sudden start', 'no ease', 'ease in', 'ease out', 'slow in, slow out', 'jolt'],
  summary: 'A camera or a machine starts or ends its clip in full motion.',
  limits: Object.freeze({
    joint: 'off',
    prop: 'off',
    'camera-screen': CAMERA,
    'camera-headset': CAMERA,
    eye: 'off',
    machine: CAMERA,
  }),
  reads: 'track',
  untouched: 'the orientations at both ends',
  excusedBy: ['whips', 'marks'] as const,
  find(context: TrackContext, { rate = 0 }: Limits): readonly Place[] {
    const { times } = context.track;
    const gap = medianGap(context.track);
    const played = context.played.find(({ holds }) => !holds);
    if (played === undefined || context.loop || times.length < 2) return [];
    const limit = rate + (context.regime === 'dense' ? (NOISE * grainOf(context)) / gap : 0);
    const last = times.length - 1;
    const [start, end] = [times[0] ?? 0, times[last] ?? 0];
    const before = end - Math.max(Math.abs(end), 1e-3) * 2 ** -50;
    const ends: readonly (readonly [number, number, readonly [number, number]])[] = [
      [0, start, [start, times[1] ?? 0]],
      [last, before, [times[last - 1] ?? 0, end]],
    ];
    return ends.flatMap(([key, time, span]): Place[] => {
      const value = Math.hypot(...played.curve.rate(new Float64Array(3), time, 'parent')) * DEGREES;
      if (!(value > limit)) return [];
      const at = times[key] ?? 0;
      return [{ keys: [key], time: at, span, value, limit, level: 'warning', playback: played.playback.id }];
    });
  },
  remedy({ stored, track }: TrackContext, { keys: [key] }: Place): Remedy | undefined {
    const length = (track.times.at(-1) ?? 0) - (track.times[0] ?? 0);
    // Times move along with their keys, which a cut or a lost key stands against.
    if (stored !== track || track.breaks.length > 0 || length < 2 * EASE) return undefined;
    return triedStep(track, { verb: 'ease in/out', shoulders: EASE, which: key === 0 ? 'in' : 'out' });
  },
  message({ keys: [key = 0], value, limit }: Place): string {
    const what = key === 0 ? 'it starts, at key 0, with' : `it stops, at key ${key}, out of`;
    return `${what} ${sayRate(value)} from one moment to the next (limit ${sayRate(limit)})`;
  },
  page: {
    what: 'A move without easing: straight segments up to the last key, or a clip cut out of a longer move.',
    trace: 'A cliff at one end.',
    standard:
      'glTF 2.0 (“Animations”) holds the end values outside the keys, so that the speed falls to zero at once.',
    programs: 'All do.',
    people:
      'A camera that bumps into its end. A motorised head takes it as a blow: ease it, or run it slower.',
    test: 'Cameras and machines: the speed as played at the first or the last moment of the clip is above 5 deg/s, to which in dense tracks three times the speed of their measured grain is added.',
    source: 'Common practice, no source.',
    spares:
      'Loops, joints and props, marked hits, declared whips, STEP tracks. Stops inside a clip are looked at by `pace.elbow`.',
    remedy:
      '`ease in/out` with shoulders of 0.3 s at that end: the stop is spread over them, the end orientation and the clip’s length stay, and the rest goes a little faster for it. How long the stop may take only a person can say. On a motorised head look at its peak speed afterwards.',
  },
});
