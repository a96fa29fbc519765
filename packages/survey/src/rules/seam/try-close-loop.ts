import { SlewcurveError } from '@slewcurve/core';
import { VERBS } from '@slewcurve/mend';
import type { Remedy, TrackContext } from '../../rule.js';
import { seamOf } from '../jump/seam-of.js';
import { closes } from './closes.js';

/** Closing the loop, with its price; undefined where the verb can't, or where the seam would stay open. */
export function tryCloseLoop(context: TrackContext): Remedy | undefined {
  const verb = VERBS.find(({ name }) => name === 'close loop');
  if (verb === undefined) return undefined;
  const step = { verb: 'close loop', clip: context.track.clip, track: context.track.id };
  try {
    const { track, largest } = verb.apply(context.track, step);
    const closed = { ...context, track };
    return closes(closed) && seamOf(track) < seamOf(context.track) ? { step, price: largest } : undefined;
  } catch (error) {
    if (error instanceof SlewcurveError) return undefined;
    throw error;
  }
}
