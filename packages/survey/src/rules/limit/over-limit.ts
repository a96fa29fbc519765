import { type Curve, accelerationFloor, findSegment, medianGap, rateFloor } from '@slewcurve/core';
import type { Level } from '../../finding.js';
import type { TrackContext } from '../../rule.js';
import { grainOf } from '../shake/grain-of.js';

export const DEGREES: number = 180 / Math.PI;

/** A limit counts as kept up to this share above it. */
export const TOLERANCE = 1.005;

/** Places in each piece of a curve that are looked at for how long it is over. */
const PLACES = 8;

/** What a difference of the first, second and third order of white noise of 1 comes to, √2, √6 and √20, for three axes, and three times that to be sure. */
const NOISE = [2, 6, 20].map((squared) => 3 * Math.sqrt(3 * squared));

/** Under this nothing is claimed: three times what the measured grain alone makes of a speed (order 1), an acceleration (2) or a jerk (3). Degrees. */
export function grainFloor(context: TrackContext, order: 1 | 2 | 3): number {
  const grain = grainOf(context);
  return grain > 0 ? ((NOISE[order - 1] ?? 0) * grain) / medianGap(context.track) ** order : 0;
}

/** The larger of a limit with its tolerance and of what noise and rounding make at a time. deg/s or deg/s². */
export function claimedFrom(context: TrackContext, limit: number, time: number, order: 1 | 2): number {
  const { track } = context;
  const key = findSegment(track.times, time);
  const rounding = order === 1 ? rateFloor(track, key) : accelerationFloor(track, key);
  return Math.max(limit * TOLERANCE, rounding * DEGREES, grainFloor(context, order));
}

/** How long something is over a limit, and between which times: to an eighth of a piece. */
export function timeOver(
  { knots }: Pick<Curve, 'knots'>,
  valueAt: (time: number) => number,
  limit: number,
): { readonly seconds: number; readonly span: readonly [number, number] } {
  let seconds = 0;
  let [first, last] = [Infinity, -Infinity];
  for (let i = 0; i + 1 < knots.length; i++) {
    const from = knots[i] ?? 0;
    const part = ((knots[i + 1] ?? 0) - from) / PLACES;
    for (let place = 0; place < PLACES; place++) {
      if (!(valueAt(from + (place + 0.5) * part) > limit)) continue;
      seconds += part;
      first = Math.min(first, from + place * part);
      last = Math.max(last, from + (place + 1) * part);
    }
  }
  return { seconds, span: [first, last] };
}

/** A machine's limits are facts; of anything else they are wishes. */
export function levelFor({ role }: TrackContext): Level {
  return role === 'machine' ? 'warning' : 'note';
}

/** "over it for 2.90 s; 2.15 times as slow it would keep it" */
export function sayOver(seconds: number, stretch: number): string {
  const cure = Number.isFinite(stretch)
    ? `${stretch.toPrecision(3)} times as slow it would keep it`
    : 'only standing still would keep it';
  return `over it for ${seconds.toFixed(2)} s; ${cure}`;
}
