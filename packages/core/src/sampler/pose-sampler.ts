import type { NumberStore, ReadonlyNumberStore } from '../number-store.js';
import type { RotationTrack } from '../track/rotation-track.js';
import { compileGroups } from './compile-groups.js';
import type { SamplerOptions } from './precision.js';
import { playedKeys } from './shared-times.js';

/**
 * Tracks compiled for playing together. Its functions allocate nothing, never throw, keep nothing between calls and may be taken
 * off the object.
 */
export interface PoseSampler {
  /** Seconds: the first and the last key of all tracks that can be played; 0 and 0 where there is none. */
  readonly start: number;
  readonly end: number;
  /**
   * The orientation of every track at `t` seconds, unit, own to parent: `[x, y, z, w]` of the first track, then of the second;
   * `out` takes `4 · tracks` numbers and is returned. Before its first and after its last key a track holds that key; a track
   * without a key that can be played is identity; a `t` that is not a number plays the first keys.
   */
  readonly samplePose: <T extends NumberStore>(t: number, out: T) => T;
  /** As `samplePose` at each of `times` (seconds, in any order), one pose after the other. */
  readonly samplePoses: <T extends NumberStore>(times: ReadonlyNumberStore, out: T) => T;
}

/**
 * Compiles tracks, each as written (STEP, LINEAR and CUBICSPLINE of glTF 2.0, declared cuts held), for fast playing in any order
 * of times. Tracks whose key times are equal are looked up once. The tracks are copied: later changes of their arrays are not seen.
 *
 * A LINEAR track's keys are put on one side first, so that the numbers of neighbouring samples never jump to their negative:
 * at a key its orientation is exact, its sign perhaps not the stored one.
 *
 * @throws SlewcurveError `sampler.euler-track` where a track holds Euler angles
 */
export function poseSampler(tracks: readonly RotationTrack[], options: SamplerOptions = {}): PoseSampler {
  const played = tracks.map(playedKeys);
  const groups = compileGroups(played, options);
  const size = 4 * tracks.length;
  const ends = played.flatMap(({ times }) => [times[0], times[times.length - 1]]);
  return Object.freeze({
    start: ends.length === 0 ? 0 : Math.min(...ends),
    end: ends.length === 0 ? 0 : Math.max(...ends),
    samplePose: <T extends NumberStore>(t: number, out: T): T => {
      for (let i = 0; i < groups.length; i++) groups[i](t, out, 0);
      return out;
    },
    samplePoses: <T extends NumberStore>(times: ReadonlyNumberStore, out: T): T => {
      for (let n = 0; n < times.length; n++)
        for (let i = 0; i < groups.length; i++) groups[i](times[n], out, n * size);
      return out;
    },
  });
}
