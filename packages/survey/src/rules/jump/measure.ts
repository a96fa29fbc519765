import { medianGap } from '@slewcurve/core';
import type { TrackContext } from '../../rule.js';
import { findJumps, type Jump, type JumpLimits } from './find-jumps.js';
import { seamOf } from './seam-of.js';

/** Both jump rules read the same competition; it is run once a track. */
const known = new WeakMap<TrackContext, readonly Jump[]>();

/** Jumps of a dense track that something turns along; none of a sparse one, where each key is a decision. */
export function jumpsOf(context: TrackContext): readonly Jump[] {
  const before = known.get(context);
  if (before !== undefined) return before;
  const turns = context.played.some((played) => !played.holds);
  const jumps = turns && context.regime === 'dense' ? findJumps(context.track, jumpLimits(context)) : [];
  known.set(context, jumps);
  return jumps;
}

/** The thresholds of both kinds for a track. */
export function jumpLimits(context: TrackContext): JumpLimits {
  const loneKey = context.limits('jump.lone-key');
  const shelf = context.limits('jump.shelf');
  // 1 % under the asked rate still is that rate: 59.94 for 60.
  const fast = 1.01 >= (loneKey?.['leastRate'] ?? 0) * medianGap(context.track);
  return {
    ...(loneKey?.['size'] !== undefined && fast && { loneKey: loneKey['size'] }),
    ...(shelf?.['size'] !== undefined && { shelf: shelf['size'] }),
    // Where the loop stays open, the step from its end to its start is the seam's, not a jump.
    loop: context.loop && seamOf(context.track) <= (shelf?.['seam'] ?? 0),
  };
}
