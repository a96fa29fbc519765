import { SlewcurveError, type Clip } from '@slewcurve/core';
import { verbNamed, type Step } from '@slewcurve/mend';
import type { Limits, Remedy, TrackContext } from '../../rule.js';
import { seamOf } from './seam-of.js';
import { addressOf } from './try-remedy.js';

/** Share of a clip's tracks that must end where they start for it to count as a loop that nobody declared. */
const MOST = 0.9;

/** Clips that end where they start, by the seam limit that this was asked with. */
const closed = new WeakMap<Clip, Map<number, boolean>>();

/**
 * Turning the whole rest of the track back by the shelf, but only where the clip is a loop (declared, or at least 90 % of its tracks
 * end where they start) and where that closes this track's open seam; undefined otherwise. The side that leaves the smaller seam is
 * the remedy, the other an alternative.
 */
export function tryReSeat(context: TrackContext, key: number, limits: Limits): Remedy | undefined {
  const seam = limits['seam'] ?? 0;
  if (seamOf(context.track) <= seam) return undefined;
  if (!context.loop && !isClosed(context.clip, seam)) return undefined;
  const sides = (['own', 'parent'] as const).flatMap((side) =>
    reSeated(context, { verb: 're-seat', ...addressOf(context), keys: [key], side }),
  );
  sides.sort((a, b) => a.seam - b.seam);
  const [best, ...others] = sides;
  if (best === undefined || best.seam > seam) return undefined;
  return { step: best.step, price: best.price, alternatives: others.map((other) => other.step) };
}

function reSeated(context: TrackContext, step: Step): { step: Step; seam: number; price: number }[] {
  try {
    const { track, largest } = verbNamed(step.verb).apply(context.track, step);
    return [{ step, seam: seamOf(track), price: largest }];
  } catch (error) {
    if (error instanceof SlewcurveError) return [];
    throw error;
  }
}

function isClosed(clip: Clip, seam: number): boolean {
  const known = closed.get(clip) ?? new Map<number, boolean>();
  closed.set(clip, known);
  const before = known.get(seam);
  if (before !== undefined) return before;
  const moving = clip.tracks.filter((track) => track.times.length > 1);
  const meet = moving.filter((track) => seamOf(track) <= seam).length;
  const answer = moving.length > 0 && meet >= MOST * moving.length;
  known.set(seam, answer);
  return answer;
}
