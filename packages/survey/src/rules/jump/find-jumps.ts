import {
  BREAK_KINDS,
  angleFloor,
  localRoughness,
  type LocalRoughness,
  type RotationTrack,
} from '@slewcurve/core';

const DEGREES = 180 / Math.PI;

/** A jump: one explanation of a local break that won against the others. */
export interface Jump {
  readonly kind: 'lone-key' | 'shelf';
  /** The lone key, or the shelf's later key. */
  readonly key: number;
  /** Degrees. */
  readonly size: number;
  /** How many times the roughness falls when the jump is explained away. */
  readonly gain: number;
}

export interface JumpLimits {
  /** Least sizes, degrees; left out: that kind is no finding. It still competes. */
  readonly loneKey?: number;
  readonly shelf?: number;
  readonly loop?: boolean;
}

/** Least gains of a finding: what a plain contact or a dead stop reaches by itself lies below (8.0 and 13.5, in exact arithmetic). */
const LEAST_GAIN = [16, 8] as const;
/** By how much a finding must explain more than its rivals. */
const CLEARLY = 1.5;
/** Keys on either side within which the best explanation is the claim, and within which rivals are looked for. */
const CLAIM = 3;
const RIVAL = 1;

/**
 * Jumps by competing explanations: around each key a lone key, a shelf and a corner are fitted (see `localRoughness`); the best gain
 * within three keys is the claim. It is a jump where it is no corner, its size exceeds the limit and twice the noise floor, its gain
 * reaches 16 for a lone key or 8 for a shelf, and half as much again as every other explanation within one key.
 */
export function findJumps(track: RotationTrack, limits: JumpLimits): Jump[] {
  const floor = 2 * angleFloor(track.storage, track.interpolation) * DEGREES;
  const least = [limits.loneKey, limits.shelf].map((size) =>
    size === undefined ? Infinity : Math.max(size, floor),
  );
  const smallest = Math.min(...least);
  if (smallest === Infinity) return [];
  const { loop } = limits;
  const roughness = localRoughness(track, loop === undefined ? {} : { loop });
  const gainsAt = rememberedGains(roughness, track.times.length);
  const jumps: Jump[] = [];
  for (const key of roughness.candidates(smallest / DEGREES, LEAST_GAIN)) {
    if (!roughness.fit(key)) continue;
    for (const kind of [0, 1] as const) {
      const [x = 0, y = 0, z = 0] = roughness.vectors.subarray(3 * kind);
      const size = Math.hypot(x, y, z) * DEGREES;
      const gain = roughness.gains[kind] ?? 0;
      if (!(size > (least[kind] ?? Infinity)) || gain < LEAST_GAIN[kind]) continue;
      if (wins(gainsAt, key, kind, gain)) {
        jumps.push({ kind: kind === 0 ? 'lone-key' : 'shelf', key, size, gain });
        break;
      }
      roughness.fit(key);
    }
  }
  return jumps;
}

/** Gains of the three explanations at a key; zeros outside the track. */
type GainsAt = (key: number) => Float64Array;

/** Each key's gains, worked out once. */
function rememberedGains(roughness: LocalRoughness, keys: number): GainsAt {
  const known = new Map<number, Float64Array>();
  const none = new Float64Array(BREAK_KINDS.length);
  return (key) => {
    if (key < 0 || key >= keys) return none;
    const before = known.get(key);
    if (before !== undefined) return before;
    roughness.fit(key);
    const gains = Float64Array.from(roughness.gains);
    known.set(key, gains);
    return gains;
  };
}

/** Whether this explanation is the claim here and clearly better than the other kinds beside it. Of equals the first key wins. */
function wins(gainsAt: GainsAt, key: number, kind: number, gain: number): boolean {
  for (let other = key - CLAIM; other <= key + CLAIM; other++)
    for (const [rival, against] of gainsAt(other).entries()) {
      if (other === key && rival === kind) continue;
      if (against > gain || (against === gain && other < key)) return false;
      if (rival !== kind && Math.abs(other - key) <= RIVAL && gain < CLEARLY * against) return false;
    }
  return true;
}
