import { rateFloor } from '@slewcurve/core';
import { median } from '../../median.js';
import type { Limits, Place, PlayedTrack, Remedy, Rule, TrackContext } from '../../rule.js';
import { sayRate } from '../../say-number.js';
import { differenceOf, rateOf, segmentsOf } from '../../segments.js';
import { closes, hasSeam } from './closes.js';

const DEGREES = 180 / Math.PI;
/** Steps on each side of the seam, and how many of their usual changes of rate are still usual at the seam. */
const BESIDE = 4;
const USUAL = 3;

/** A loop that ends where it starts, but at another rate. */
export const loopKink: Rule = Object.freeze({
  id: 'seam.loop-kink',
  family: 'seam',
  level: 'warning',
  unit: 'deg/s',
  alsoCalled: [
    'loop',
    'cycle',
    'walk cycle',
    'seamless',
    'loop hitch',
    'loop stutter',
    'speed gap at the seam',
  ],
  summary: 'A clip that repeats comes back to its start at another angular rate than it leaves it with.',
  limits: Object.freeze({
    joint: { rate: 10, share: 0.1 },
    prop: { rate: 1, share: 0.05 },
    'camera-screen': { rate: 1, share: 0.05 },
    'camera-headset': { rate: 1, share: 0.05 },
    eye: 'off',
    machine: { rate: 1, share: 0.05 },
  }),
  reads: 'track',
  untouched: 'the keys at both ends',
  find(context: TrackContext, limits: Limits): readonly Place[] {
    if (!hasSeam(context) || !closes(context)) return [];
    const { times } = context.track;
    const last = times.length - 1;
    const limit = Math.max(limits['rate'] ?? 0, usualChange(context), floorAt(context));
    const places = context.played
      .filter(({ holds }) => !holds)
      .flatMap((played): Place[] => {
        const { value, most } = rateStep(played);
        if (!(value > limit && value > (limits['share'] ?? 0) * most)) return [];
        const time = times[last] ?? 0;
        const span = [times[last - 1] ?? 0, time] as const;
        return [{ keys: [last], time, span, value, limit, level: 'warning', playback: played.playback.id }];
      });
    places.sort((a, b) => b.value - a.value);
    return places.slice(0, 1);
  },
  // `close loop` closes the pose; matching the rate as well is not built yet.
  remedy: (): Remedy | undefined => undefined,
  message({ value, limit }: Place): string {
    return `where the loop starts again its angular rate steps by ${sayRate(value)} (limit ${sayRate(limit)})`;
  },
  page: {
    what: 'Both ends of a loop agree in pose and not in motion: eased to a stop at one end only, cut where the motion was faster, closed by hand at the last key.',
    trace: 'A step of the level from the clip’s end to its start.',
    standard: 'glTF 2.0 knows no loops: whether a clip repeats is up to who plays it.',
    programs: 'Most start again at the first key as it stands.',
    people: 'A hitch once a cycle: the motion stops, turns off or lurches.',
    test: 'In a declared loop that closes: the angular rate at the end and at the start differ by more than 10 deg/s and 10 % of the faster for joints (1 deg/s and 5 % for all else), as played. In dense tracks also by more than three times the usual change between neighbouring steps, of the four on each side.',
    source:
      'Common practice, no source; a machine’s own acceleration limit should replace the one given here.',
    spares: 'Loops that stay open (`seam.loop-gap`), clips that nobody declared to be a loop, STEP tracks.',
    remedy:
      'Let the rate of the last keys run into that of the first ones. No verb does that yet; `close loop` closes the pose alone.',
  },
});

/** Difference of the rates at a curve's end and start, and the faster of both speeds, deg/s. */
function rateStep({ curve }: PlayedTrack): { readonly value: number; readonly most: number } {
  const start = curve.rate(new Float64Array(3), curve.start, 'parent');
  const before = curve.end - Math.max(Math.abs(curve.end), 1e-3) * 2 ** -50;
  const end = curve.rate(new Float64Array(3), before, 'parent');
  return {
    value: differenceOf(start, end) * DEGREES,
    most: Math.max(Math.hypot(...start), Math.hypot(...end)) * DEGREES,
  };
}

function usualChange(context: TrackContext): number {
  if (context.regime !== 'dense') return 0;
  const segments = segmentsOf(context);
  const last = segments.turns.length - 1;
  const changes: number[] = [];
  for (let i = 0; i < BESIDE; i++) {
    changes.push(differenceOf(rateOf(segments, i), rateOf(segments, i + 1)));
    changes.push(differenceOf(rateOf(segments, last - i), rateOf(segments, last - i - 1)));
  }
  return USUAL * median(changes);
}

function floorAt({ track }: TrackContext): number {
  return (rateFloor(track, 0) + rateFloor(track, track.times.length - 2)) * DEGREES;
}
