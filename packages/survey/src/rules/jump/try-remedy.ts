import { SlewcurveError, VALUES_PER_KEY, replaceTrack, type RotationTrack } from '@slewcurve/core';
import { verbNamed, type Step } from '@slewcurve/mend';
import type { Remedy, TrackContext } from '../../rule.js';
import { findJumps, type Jump, type JumpLimits } from './find-jumps.js';
import { jumpLimits } from './measure.js';

/** Keys on either side of the jump that a trial looks at: windows of six keys around every key that may change, and room to spare. */
const AROUND = 64;
/** Keys beyond those that a remedy changes in which it must raise no jump. */
const BESIDE = 6;
/** Steps that a bridge may take: shorter ones look like a jump themselves, longer ones are no bridge any more. */
const LEAST_STEPS = 4;
const MOST_STEPS = 24;

/** Lifting out the key, with its price; undefined where the verb can't, or where the finding would stay. */
export function tryLiftOut(context: TrackContext, key: number): Remedy | undefined {
  return tryStep(groundOf(context, key), { verb: 'lift out', ...addressOf(context), keys: [key] });
}

/** The shortest bridge, of four steps or more, after which neither this jump nor a new one stands there; undefined where there is none. */
export function tryBridge(context: TrackContext, key: number): Remedy | undefined {
  const ground = groundOf(context, key);
  for (let steps = LEAST_STEPS; steps <= MOST_STEPS; steps++) {
    const remedy = tryStep(ground, { verb: 'bridge', ...addressOf(context), keys: [key], steps });
    if (remedy !== undefined) return remedy;
  }
  return undefined;
}

/** The keys around a jump, as a track of their own to try remedies on. */
interface Ground {
  readonly stretch: RotationTrack;
  /** The jump's key within the stretch. */
  readonly key: number;
  readonly limits: JumpLimits;
  /** The other jumps of the stretch. */
  readonly others: readonly Jump[];
}

function groundOf(context: TrackContext, key: number): Ground {
  const first = Math.max(0, key - AROUND);
  const stretch = stretchOf(context.track, first, Math.min(context.track.times.length, key + AROUND + 1));
  const whole = stretch.times.length === context.track.times.length;
  const limits = jumpLimits(context);
  const within = { ...limits, loop: limits.loop === true && whole };
  const others = findJumps(stretch, within).filter((jump) => jump.key !== key - first);
  return { stretch, key: key - first, limits: within, others };
}

function tryStep({ stretch, key, limits, others }: Ground, step: Step): Remedy | undefined {
  try {
    const result = verbNamed(step.verb).apply(stretch, { ...step, keys: [key] });
    const first = Math.min(...result.changed) - BESIDE;
    const last = Math.max(...result.changed) + BESIDE;
    const raised = findJumps(result.track, limits).filter(
      (jump) => jump.key >= first && jump.key <= last && !others.some((other) => sameJump(other, jump)),
    );
    return raised.length > 0 ? undefined : { step, price: result.largest };
  } catch (error) {
    if (error instanceof SlewcurveError) return undefined;
    throw error;
  }
}

function sameJump(a: Jump, b: Jump): boolean {
  return a.key === b.key && a.kind === b.kind;
}

/** The keys from `first` up to but not including `end`, as a track. */
function stretchOf(track: RotationTrack, first: number, end: number): RotationTrack {
  const size = VALUES_PER_KEY[track.interpolation];
  return replaceTrack(track, {
    times: track.times.slice(first, end),
    values: track.values.slice(first * size, end * size),
    breaks: track.breaks.filter((key) => key >= first && key < end).map((key) => key - first),
  });
}

export function addressOf({ track }: TrackContext): { readonly clip: string; readonly track: string } {
  return { clip: track.clip, track: track.id };
}
