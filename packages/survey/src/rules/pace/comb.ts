import { FRAME_RATES, angleBetween, frameGrid } from '@slewcurve/core';
import type { Limits, Place, Remedy, Rule, TrackContext } from '../../rule.js';
import { triedStep } from '../../tried-step.js';
import { segmentsOf, type Segments } from '../../segments.js';

const DEGREES = 180 / Math.PI;
/** Seconds on each side over which it is judged whether the track moves. */
const AROUND = 0.25;
/** Degrees: no turn at all, but for the rounding of a product. */
const STILL = 1e-9;
/** Fewer repeats are no pattern. */
const LEAST_REPEATS = 5;
/** Share of repeats that must stand at the period. */
const REGULAR = 0.8;

const REPEATS = Object.freeze({ least: 5, most: 60, moving: 2 });

/** Frames that repeat at a fixed period: another frame rate, taken over by the nearest frame. */
export const comb: Rule = Object.freeze({
  id: 'pace.comb',
  family: 'pace',
  level: 'warning',
  unit: '%',
  alsoCalled: [
    'stutter',
    'duplicate frames',
    'frame rate conversion',
    'pulldown',
    'on twos',
    '24 to 30',
    'judder',
  ],
  summary:
    'A moving track repeats a key at a fixed period, as if its frame rate had been changed by doubling frames.',
  limits: Object.freeze({
    joint: REPEATS,
    prop: REPEATS,
    'camera-screen': REPEATS,
    'camera-headset': REPEATS,
    eye: 'off',
    machine: REPEATS,
  }),
  reads: 'track',
  untouched: 'every orientation',
  find(context: TrackContext, { least = 0, most = 0, moving = 0 }: Limits): readonly Place[] {
    if (context.regime !== 'dense' || context.played.every(({ holds }) => holds)) return [];
    const { times } = context.track;
    const segments = segmentsOf(context);
    if (!segments.turns.some((turn) => turn < STILL)) return [];
    const { repeats, steps } = repeatsOf(times, segments, moving);
    const value = (100 * repeats.length) / steps;
    const period = periodOf(repeats);
    if (period === undefined || !(value >= least && value <= most)) return [];
    const [first = 0, last = 0] = [repeats[0], repeats.at(-1)];
    const span = [times[first] ?? 0, times[last + 1] ?? 0] as const;
    // Drawn on twos: each pose stands for two frames, all along, and is meant.
    const level = period === 2 ? 'note' : 'warning';
    const keys = [first + 1, last + 1];
    return [{ keys, time: span[0], span, value, limit: least, level, facts: { period } }];
  },
  remedy({ track, clip }: TrackContext, { facts }: Place): Remedy | undefined {
    const period = facts?.['period'] ?? 0;
    const shown = clip.frameRate ?? frameGrid([track.times]);
    if (shown === undefined) return undefined;
    const made = madeAt(shown, period);
    // On twos is meant; any other rate than a usual one is a guess.
    return made === undefined ? undefined : triedStep(track, { verb: 're-grid', fps: shown, source: made });
  },
  message({ value, limit, facts }: Place): string {
    const period = facts?.['period'] ?? 0;
    return `while it moves every ${period}${period === 2 ? 'nd' : period === 3 ? 'rd' : 'th'} step repeats the key before (${value.toFixed(0)} % of them, limit ${limit} %)${period === 2 ? ', as in a motion drawn on twos' : ''}: the frame rate looks converted by doubling frames`;
  },
  page: {
    what: 'A motion of 24 frames a second that was brought to 30 by showing the nearest frame: every fifth step is zero, and the others are a quarter too fast.',
    trace: 'A comb: zero at a fixed period, a level too high between.',
    standard: 'glTF 2.0 says nothing about it: the file is valid, and a validator is silent.',
    programs: 'Every program plays it as it stands.',
    people: 'A judder, plainest in pans. On a motorised head a knock at every repeat.',
    test: 'In a dense track, of the steps taken while it moves faster than 2 deg/s over a quarter of a second on each side, 5 % to 60 % repeat the key before to the bit, at least five, and more than 80 % of the repeats follow each other at one fixed period of two or more. A period of two is a note.',
    source:
      'Arithmetic: 24 to 30 repeats one step in five and turns 75 deg/s in the others where 60 are meant. The shares are common practice, no source.',
    spares:
      'Animation on twos (a note), freezes without a period, holds, coarse storage (`file.coarse` tells it), STEP and sparse tracks, eyes.',
    remedy:
      '`re-grid` drops the repeats, sets the other keys to the rate that the motion was made at, and reads it at the frames again. Better still: bake from the source’s own frames.',
  },
});

/** Segments that repeat while the track moves, and how many segments it moves in. */
function repeatsOf(
  times: Float64Array,
  segments: Segments,
  moving: number,
): { readonly repeats: readonly number[]; readonly steps: number } {
  const { turns, orientations } = segments;
  const reach = Math.max(1, Math.round((AROUND * turns.length) / ((times.at(-1) ?? 0) - (times[0] ?? 0))));
  const repeats: number[] = [];
  let steps = 0;
  for (let k = 0; k < turns.length; k++) {
    const [from, to] = [Math.max(0, k - reach), Math.min(turns.length, k + 1 + reach)];
    const turn = angleBetween(
      orientations.subarray(4 * from, 4 * from + 4),
      orientations.subarray(4 * to, 4 * to + 4),
    );
    if (!((turn * DEGREES) / ((times[to] ?? 0) - (times[from] ?? 0)) > moving)) continue;
    steps++;
    if ((turns[k] ?? 0) < STILL) repeats.push(k);
  }
  return { repeats, steps };
}

/** The distance of two or more at which most repeats follow each other; undefined where there is none, or too few repeats. */
function periodOf(repeats: readonly number[]): number | undefined {
  const counts = new Map<number, number>();
  for (let i = 1; i < repeats.length; i++) {
    const distance = (repeats[i] ?? 0) - (repeats[i - 1] ?? 0);
    counts.set(distance, (counts.get(distance) ?? 0) + 1);
  }
  let [period, most] = [0, 0];
  for (const [distance, count] of counts) if (count > most) [period, most] = [distance, count];
  const isRegular = repeats.length >= LEAST_REPEATS && most > REGULAR * (repeats.length - 1);
  return isRegular && period > 1 ? period : undefined;
}

/** The usual frame rate of which every `period`-th frame was shown twice; undefined where there is none. */
function madeAt(shown: number, period: number): number | undefined {
  if (period < 3) return undefined;
  const made = (shown * (period - 1)) / period;
  return FRAME_RATES.find((rate) => Math.abs(rate / made - 1) < 5e-4);
}
