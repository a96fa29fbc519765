import { rateFloor } from '@slewcurve/core';
import { median } from '../../median.js';
import type { Limits, Place, PlayedTrack, TrackContext } from '../../rule.js';
import { differenceOf, rateOf, segmentsOf } from '../../segments.js';
import { closes, hasSeam } from './closes.js';

const DEGREES = 180 / Math.PI;
/** Steps on each side of the seam, and how many of their usual changes of rate are still usual at the seam. */
const BESIDE = 4;
const USUAL = 3;

/** The worst step of the rate at the seam of a loop that closes, under any playback; none where it is usual. */
export function kinksOf(context: TrackContext, limits: Limits): readonly Place[] {
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
}

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
