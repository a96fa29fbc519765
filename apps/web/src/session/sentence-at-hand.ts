import type { RotationTrack } from '@slewcurve/core';
import { applySteps, parseSentence, type EditResult, type Step } from '@slewcurve/mend';

/** A sentence that is being written, read, and tried on the track before it is applied. */
export interface SentenceAtHand {
  readonly text: string;
  /** Where it stands: seconds. */
  readonly time: number;
  /** Undefined while it can't be read or done. */
  readonly step?: Step;
  /** The track as it would be. */
  readonly preview?: RotationTrack;
  /** What it costs, in words. */
  readonly price: string;
  /** Why it can't be done; empty where it can. */
  readonly problem: string;
}

/** Read a sentence and try it on a track. */
export function tryOut(text: string, time: number, track: RotationTrack): SentenceAtHand {
  try {
    const step = parseSentence(text);
    const { tracks, results } = applySteps([track], [step]);
    const result = results[0]?.result;
    return {
      text,
      time,
      step,
      price: result ? priceOf(result) : '',
      problem: '',
      ...(tracks[0] && { preview: tracks[0] }),
    };
  } catch (error) {
    return { text, time, price: '', problem: error instanceof Error ? error.message : String(error) };
  }
}

function priceOf({ changed, largest, added, span }: EditResult): string {
  if (changed.length === 0) return 'Nothing would change.';
  const keys = changed.length === 1 ? '1 key changes' : `${changed.length} keys change`;
  const turn = largest > 0 ? `the largest turns by ${largest.toPrecision(3)}°` : 'none turns';
  const where = span ? `between ${span[0].toFixed(3)} and ${span[1].toFixed(3)} s` : 'and no motion changes';
  return `${keys}, ${turn}, ${where}; ${added === 0 ? 'no time is added' : `${added.toFixed(3)} s are added`}.`;
}
