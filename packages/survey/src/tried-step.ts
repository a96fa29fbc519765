import { SlewcurveError, type RotationTrack } from '@slewcurve/core';
import { verbNamed, type Step } from '@slewcurve/mend';
import type { Remedy } from './rule.js';

/** An edit of a track as a remedy, with its price, tried out; undefined where the edit refuses this track. */
export function triedStep(track: RotationTrack, edit: Omit<Step, 'clip' | 'track'>): Remedy | undefined {
  const step: Step = { ...edit, clip: track.clip, track: track.id };
  try {
    const { largest } = verbNamed(step.verb).apply(track, step);
    return { step, price: largest };
  } catch (error) {
    if (error instanceof SlewcurveError) return undefined;
    throw error;
  }
}
