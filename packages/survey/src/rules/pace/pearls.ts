import type { Step } from '@slewcurve/mend';
import { median } from '../../median.js';
import type { Limits, Place, PlayedTrack, Remedy, Rule, TrackContext } from '../../rule.js';
import { angleApart, rateOf, segmentsOf } from '../../segments.js';
import { triedStep } from '../../tried-step.js';
import { cubicPlayed } from './cubic-played.js';
import { speedsWithin } from './speeds-within.js';

const DEGREES = 180 / Math.PI;
/** The frame of a clip that lies on no grid, seconds. */
const USUAL_FRAME = 1 / 30;
/** Moments of a segment that its median speed is taken over. */
const MOMENTS = 9;

const STOPS = Object.freeze({ share: 60, keys: 4, slow: 0.35, axis: 30, moving: 2 });

/** A move that stops at every key on its way. */
export const pearls: Rule = Object.freeze({
  id: 'pace.pearls',
  family: 'pace',
  level: 'warning',
  unit: '%',
  alsoCalled: [
    'stop-and-go',
    'staircase',
    'stall',
    'ease on every key',
    'humps',
    'string of pearls',
    'pulsing',
  ],
  summary: 'A move slows down at most of its keys, as if each were its end.',
  limits: Object.freeze({
    joint: STOPS,
    prop: STOPS,
    'camera-screen': STOPS,
    'camera-headset': STOPS,
    eye: 'off',
    machine: STOPS,
  }),
  reads: 'track',
  untouched: 'every key and its time',
  excusedBy: ['whips'] as const,
  find(context: TrackContext, limits: Limits): readonly Place[] {
    if (context.regime === 'dense') return [];
    const { share: limit = 0 } = limits;
    const { times } = context.track;
    const places = cubicPlayed(context).flatMap((played): Place[] => {
      const { stops, passed } = stopsOf(context, played, limits);
      const value = (100 * stops.length) / passed;
      if (passed < (limits['keys'] ?? 0) || !(value >= limit)) return [];
      const [first = 0, last = 0] = [stops[0], stops.at(-1)];
      const span = [times[first] ?? 0, times[last] ?? 0] as const;
      const facts = { stops: stops.length, passed };
      const playback = played.playback.id;
      return [{ keys: stops, time: span[0], span, value, limit, level: 'warning', playback, facts }];
    });
    places.sort((a, b) => b.value - a.value);
    return places.slice(0, 1);
  },
  remedy({ track }: TrackContext): Remedy | undefined {
    const even: Step = { verb: 'even out', clip: track.clip, track: track.id };
    const tangents = triedStep(track, { verb: 'set tangents' });
    return tangents === undefined ? undefined : { ...tangents, alternatives: [even] };
  },
  message({ value, limit, facts }: Place): string {
    return `at ${facts?.['stops']} of the ${facts?.['passed']} keys that it passes on the move it slows down to less than 35 % of its pace on both sides (${value.toFixed(0)} %, limit ${limit} %)`;
  },
  page: {
    what: 'Easing in and out left on every key, or tangents of zero length, in a move that was meant to flow.',
    trace: 'A row of humps, near zero at each key.',
    standard: 'glTF 2.0 plays CUBICSPLINE tangents as they stand: those of zero length stop at their key.',
    programs: 'All that follow the tangents show it; its peaks are half as high again as an even pace.',
    people:
      'A move by fits and starts. A motorised head speeds up and brakes at every key, which is heat and wear.',
    test: 'In a sparse track joined by cubics, at 60 % or more of at least four inner keys: the slowest speed within a frame of the key is less than 35 % of the median speed of either segment beside it. Keys where the axis turns by 30° or more, and those beside a segment slower than 2 deg/s, are left out.',
    source:
      'Common practice, no source. Tangents of zero length make the peak 1.5 times the mean: Hermite’s blend, 6u(1 − u), at its middle.',
    spares:
      'Poses that are held between (holds beside a key take it out), corners, dense tracks, declared whips, playbacks of straight segments.',
    remedy:
      '`set tangents` lays them anew from the turns between the keys, so that the move flows through; `even out` gives it one pace instead, whatever the keys’ times.',
  },
});

/** Keys at which the move slows down, and how many it passes on the move. */
function stopsOf(
  context: TrackContext,
  { curve }: PlayedTrack,
  { slow = 0, axis = 0, moving = 0 }: Limits,
): { readonly stops: readonly number[]; readonly passed: number } {
  const { times } = context.track;
  const segments = segmentsOf(context);
  const frame = context.clip.frameRate === undefined ? USUAL_FRAME : 1 / context.clip.frameRate;
  const usual = Float64Array.from({ length: times.length - 1 }, (_, k) =>
    (segments.speeds[k] ?? 0) > moving
      ? median(speedsWithin(curve, times[k] ?? 0, times[k + 1] ?? 0, MOMENTS))
      : Number.NaN,
  );
  const stops: number[] = [];
  let passed = 0;
  for (let key = 1; key + 1 < times.length; key++) {
    const pace = Math.min(usual[key - 1] ?? Number.NaN, usual[key] ?? Number.NaN);
    if (!(pace > moving)) continue;
    if (angleApart(rateOf(segments, key - 1), rateOf(segments, key)) >= axis) continue;
    passed++;
    if (slowestAround(curve, times[key] ?? 0, frame) < slow * pace) stops.push(key);
  }
  return { stops, passed };
}

function slowestAround(curve: PlayedTrack['curve'], time: number, frame: number): number {
  const rate = new Float64Array(3);
  return Math.min(
    ...[-1, -0.5, 0, 0.5, 1].map(
      (frames) => Math.hypot(...curve.rate(rate, time + frames * frame, 'own')) * DEGREES,
    ),
  );
}
