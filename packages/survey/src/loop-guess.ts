import { angleFloor, segmentAngle, type Clip, type RotationTrack, type SceneNode } from '@slewcurve/core';
import { matchesPattern } from '@slewcurve/mend';
import { NO_HOUSE_RULES, limitsAt, roleIn, type HouseRules } from './house-rules.js';
import { loopGap } from './rules/seam/loop-gap.js';
import { seamOf } from './rules/jump/seam-of.js';

/** How many of a clip's moving tracks end where they start. */
export interface LoopGuess {
  readonly closed: number;
  readonly moving: number;
}

const DEGREES = 180 / Math.PI;
/** Share of the moving tracks that must close. */
const MOST = 0.9;

/**
 * Whether a clip that nobody declared to repeat looks like a loop: at least 90 % of its moving tracks end within the seam limit of their
 * start. A question to ask, never an answer: nothing is judged by it. Undefined where it does not, or where the clip is declared.
 */
export function guessLoop(
  clip: Clip,
  nodes: readonly SceneNode[],
  houseRules: HouseRules = NO_HOUSE_RULES,
  file = '',
): LoopGuess | undefined {
  if (clip.loop || houseRules.loops.some((pattern) => matchesPattern(pattern, clip.name))) return undefined;
  let moving = 0;
  let closed = 0;
  for (const track of clip.tracks) {
    const limit = closeWithin(track, nodes, houseRules, file);
    // What hardly moves ends where it starts, loop or not.
    if (limit === undefined || !(travelled(track) > 4 * limit)) continue;
    moving++;
    if (seamOf(track) <= limit) closed++;
  }
  return moving > 0 && closed >= MOST * moving ? { closed, moving } : undefined;
}

/** The seam limit of a track, degrees; undefined where it is off, or where there are too few keys to tell. */
function closeWithin(
  track: RotationTrack,
  nodes: readonly SceneNode[],
  houseRules: HouseRules,
  file: string,
): number | undefined {
  const role = roleIn(houseRules, track, nodes);
  const limits = limitsAt(houseRules, loopGap, role, { file, clip: track.clip, track: track.id });
  if (limits === undefined || track.times.length < 3) return undefined;
  return Math.max(limits['gap'] ?? 0, 2 * angleFloor(track.storage, track.interpolation) * DEGREES);
}

function travelled(track: RotationTrack): number {
  let sum = 0;
  for (let key = 0; key + 1 < track.times.length; key++) sum += segmentAngle(track, key) * DEGREES;
  return sum;
}
