import {
  type Corner,
  type Curve,
  type RotationTrack,
  SlewcurveError,
  type Span,
  playAs,
  regime,
  rotationSpline,
  roundedCorners,
} from '@slewcurve/core';
import { placeOf } from '../acted-keys.js';
import { DEGREES } from '../edit-result.js';
import type { Step } from '../step.js';
import { departure } from './departure.js';

/** How far corners may be rounded where the step does not say, degrees. */
const USUAL_ROUNDING = 0.1;

/** A path to be paced, and what was done about the corners that it turns at its keys. */
export interface TakenCorners {
  readonly path: Curve;
  /** Those that were rounded. */
  readonly corners: readonly Corner[];
  /** Those that it is to stop at, seconds. */
  readonly stops: readonly number[];
}

/**
 * The path of a track with its corners taken as the step says: rounded within a tolerance, left for stops, or, where it says nothing and `must` does not
 * either, as they are. Densely keyed paths are taken by the smooth spline through their keys instead, if that stays within the tolerance of them.
 *
 * @param must whether corners may not stay
 * @throws SlewcurveError `step.corners`, `step.kept-in-the-way`
 */
export function takeCorners(track: RotationTrack, span: Span, step: Step, must: boolean): TakenCorners {
  const path = playAs(track, 'as-written');
  const within = step.within ?? USUAL_ROUNDING;
  const how = step.corners ?? (must ? 'round' : undefined);
  if (how === undefined || path.continuity >= 1) return { path, corners: [], stops: [] };
  if (track.interpolation !== 'LINEAR')
    throw refusal(track, `its keys are played as ${track.interpolation}, which only LINEAR corners are not`);
  const isInside = (key: number): boolean => track.times[key] > span[0] && track.times[key] < span[1];
  const rounded = roundedCorners(track, within / DEGREES, isInside);
  if (how === 'stop') return { path, corners: [], stops: rounded.corners.map(({ key }) => track.times[key]) };
  if (regime(track) === 'dense') {
    const smooth = rotationSpline(track, { kind: 'c2' });
    const off = departure(path, smooth);
    if (off <= within) return { path: smooth, corners: [], stops: [] };
    throw refusal(
      track,
      `the smooth path through its keys is ${off.toFixed(3)}° off them, and at most ${within}° is allowed`,
    );
  }
  const kept = rounded.corners.find(({ key }) => step.keep?.includes(key));
  if (kept)
    throw new SlewcurveError(
      'step.kept-in-the-way',
      `Key ${kept.key} is kept, and its corner would be rounded. Take it out of keep, or stop at corners.`,
      placeOf(track, kept.key),
    );
  return { path: rounded, corners: rounded.corners, stops: [] };
}

function refusal(track: RotationTrack, why: string): SlewcurveError {
  return new SlewcurveError(
    'step.corners',
    `At each key the path turns a corner, where no speed keeps a limit of acceleration, and ${why}. Ease through or smooth it first, allow more within, or stop at corners.`,
    placeOf(track),
  );
}
