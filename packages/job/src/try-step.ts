import { SlewcurveError, type RotationTrack, type SceneNode } from '@slewcurve/core';
import { applySteps, matchesPattern, type EditResult, type Step } from '@slewcurve/mend';

/** What a step would make of a track and what that costs: told before it is taken. */
export interface TrialAnswer extends Pick<
  EditResult,
  'largest' | 'added' | 'span' | 'price' | 'bends' | 'meeting'
> {
  /** The track as the step would leave it; its arrays are copies, handed over. Left out where it stays as it is. */
  readonly after?: RotationTrack;
  /** Keys whose stored numbers would change. */
  readonly changed: number;
}

/** What a step is tried on. */
export interface TrialGround {
  readonly track: RotationTrack;
  /** Tracks of the nodes that the track's node hangs on. */
  readonly above: readonly RotationTrack[];
  /** Every track of the file. */
  readonly all: readonly RotationTrack[];
  readonly nodes: readonly SceneNode[];
}

/**
 * Tries a step on one track; nothing is kept.
 *
 * @throws SlewcurveError what `applySteps` throws; what the verb itself says comes without "Step 1": there is but one.
 */
export function tryStep({ track, above, all, nodes }: TrialGround, step: Step): TrialAnswer {
  const beside = [track, ...above];
  const isBeside = ({ clip, id }: RotationTrack): boolean =>
    beside.some((one) => one.clip === clip && one.id === id);
  const others = all.filter((other) => !isBeside(other) && isSourceOf(step, other));
  try {
    const { tracks, results } = applySteps([...beside, ...others], [step], nodes);
    const own = results.find(({ index }) => index === 0) ?? results[0];
    if (!own) return { changed: 0, largest: 0, added: 0 };
    const { changed, largest, added, span, price, bends, meeting } = own.result;
    const [after] = tracks;
    return {
      ...(after !== track && { after }),
      changed: changed.length,
      largest,
      added,
      ...(span && { span }),
      ...(price && { price }),
      ...(bends && { bends }),
      ...(meeting && { meeting }),
    };
  } catch (error) {
    throw error instanceof SlewcurveError && error.cause instanceof SlewcurveError ? error.cause : error;
  }
}

/** Whether a step takes its pace or its speed from a track. */
function isSourceOf({ clip, track, fromClip, fromTrack }: Step, other: RotationTrack): boolean {
  if (fromClip === undefined && fromTrack === undefined) return false;
  return matchesPattern(fromClip ?? clip, other.clip) && matchesPattern(fromTrack ?? track, other.id);
}
