import { SlewcurveError, playAs, type RotationTrack } from '@slewcurve/core';
import { verbNamed, type Step } from '@slewcurve/mend';
import type { Remedy, TrackContext } from '../../rule.js';
import { addressOf } from '../jump/try-remedy.js';
import { closes } from './closes.js';

/**
 * Closing the loop over its tail, or else evenly, with its price; the other way is an alternative where it mends as well. Undefined where the verb can't, or where
 * either leaves the seam open or what `isMended` looks for.
 */
export function tryCloseLoop(
  context: TrackContext,
  isMended: (closed: TrackContext) => boolean,
): Remedy | undefined {
  const ways = (['tail', 'evenly'] as const).flatMap((spread) =>
    tried(context, { verb: 'close loop', ...addressOf(context), spread }, isMended),
  );
  const [best, ...others] = ways;
  if (best === undefined) return undefined;
  const alternatives = others.map(({ step }) => step);
  return alternatives.length > 0 ? { ...best, alternatives } : best;
}

/** What a step would cost; empty where it can't be taken or does not mend. */
export function tried(
  context: TrackContext,
  step: Step,
  isMended: (after: TrackContext) => boolean,
): Remedy[] {
  try {
    const { track, largest } = verbNamed(step.verb).apply(context.track, step);
    const after = withTrack(context, track);
    return closes(after) && isMended(after) ? [{ step, price: largest }] : [];
  } catch (error) {
    if (error instanceof SlewcurveError) return [];
    throw error;
  }
}

function withTrack(context: TrackContext, track: RotationTrack): TrackContext {
  const played = context.played.map((one) => ({ ...one, curve: playAs(track, one.playback.id) }));
  return { ...context, track, played };
}
