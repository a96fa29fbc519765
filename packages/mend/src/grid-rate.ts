import {
  FRAME_RATES,
  type RotationTrack,
  SlewcurveError,
  exactRate,
  frameGrid,
  medianGap,
} from '@slewcurve/core';
import { placeOf } from './acted-keys.js';
import type { Step } from './step.js';

/** Share of a frame by which a gap may miss whole frames and still tell them: two decimals at 60 frames a second miss by 0.4. */
export const TELLS = 0.45;

/** How far a usual rate may lie from the mean gap, as a share: 0.033 s is 1.01 % off 30 a second. */
const NEAR = 0.0102;

/**
 * Frames per second that a step means, in full (30000/1001 for 29.97): its own `fps`, or else the usual one nearest to the mean gap, which
 * rounding hardly moves, where every gap tells its frames by it (times of two decimals lie on a grid of 100 a second, whatever they were), or else that of the
 * grid that the keys lie on.
 *
 * @throws SlewcurveError `step.needs-fps` where nothing tells
 */
export function gridRate(track: RotationTrack, { fps }: Step): number {
  const rate = fps ?? rateOfMeanGap(track) ?? frameGrid([track.times]);
  if (rate !== undefined) return exactRate(rate);
  throw new SlewcurveError(
    'step.needs-fps',
    'Its keys lie on no grid of the usual frame rates. Say which one is meant: fps.',
    placeOf(track),
  );
}

/** Mean gap of a track, gaps of more than one and three quarters of the usual one left out: frames may be missing. 0 without gaps. */
export function meanFrame(track: RotationTrack): number {
  const { times } = track;
  const usual = medianGap(track);
  let sum = 0;
  let count = 0;
  for (let key = 1; key < times.length; key++) {
    const gap = times[key] - times[key - 1];
    if (!(gap > 0) || gap > 1.75 * usual) continue;
    sum += gap;
    count++;
  }
  return count === 0 ? 0 : sum / count;
}

function rateOfMeanGap(track: RotationTrack): number | undefined {
  const frame = meanFrame(track);
  const miss = (rate: number): number => Math.abs(rate * frame - 1);
  const near = FRAME_RATES.filter((rate) => miss(rate) <= NEAR);
  if (near.length === 0) return undefined;
  const isTold = track.times.every((time, key) => {
    const frames = key === 0 ? 1 : (time - track.times[key - 1]) / frame;
    return Math.round(frames) >= 1 && Math.abs(frames - Math.round(frames)) <= TELLS;
  });
  return isTold ? near.reduce((best, rate) => (miss(rate) < miss(best) ? rate : best)) : undefined;
}
