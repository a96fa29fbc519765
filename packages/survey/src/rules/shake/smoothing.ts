import { medianGap } from '@slewcurve/core';
import type { Remedy, TrackContext } from '../../rule.js';
import { addressOf } from '../jump/try-remedy.js';

/** Key gaps of the average: 8 % of white noise's power is left. */
const GAPS = 6;
/** deg/s: faster motion is guarded, as its noise can't be told from it. */
const GUARD = 60;
/** Seconds on either side of a mark (a contact, a hit) that are guarded. */
const BESIDE_MARK = 0.1;

/** Smoothing with guards around fast moves, declared whips and marks, no key turned by more than `within` degrees. Not tried out: that would cost a survey too much. */
export function smoothing(context: TrackContext, within: number): Remedy {
  const { track, declared } = context;
  const [start, end] = [track.times[0] ?? 0, track.times.at(-1) ?? 0];
  const guards = [
    ...declared.whips,
    ...declared.marks.map((mark): readonly [number, number] => [mark - BESIDE_MARK, mark + BESIDE_MARK]),
  ].filter(([from, to]) => to >= start && from <= end);
  return {
    step: {
      verb: 'smooth',
      ...addressOf(context),
      sigma: threeDigits(GAPS * medianGap(track)),
      within: threeDigits(within),
      guard: GUARD,
      ...(guards.length > 0 && { guards }),
    },
  };
}

function threeDigits(value: number): number {
  return Number(value.toPrecision(3));
}
