import type { NumberStore, ReadonlyNumberStore } from '../number-store.js';
import type { RotationTrack } from '../track/rotation-track.js';
import { compileGroups } from './compile-groups.js';
import type { SamplerOptions } from './precision.js';
import { playedKeys } from './shared-times.js';

/**
 * One track compiled for playing. Its functions allocate nothing, never throw, keep nothing between calls and may be taken off
 * the object.
 */
export interface Sampler {
  /** Seconds: the first and the last key that can be played; 0 and 0 where there is none. */
  readonly start: number;
  readonly end: number;
  /** Unit orientation `[x, y, z, w]`, own to parent, at `t` seconds; `out` takes four numbers and is returned. */
  readonly sample: <T extends NumberStore>(t: number, out: T) => T;
  /** As `sample` at each of `times` (seconds, in any order), four numbers each, one after the other. */
  readonly sampleMany: <T extends NumberStore>(times: ReadonlyNumberStore, out: T) => T;
}

/**
 * Compiles one track for playing as written; everything said of `poseSampler` holds.
 *
 * @throws SlewcurveError `sampler.euler-track` where the track holds Euler angles
 */
export function sampler(track: RotationTrack, options: SamplerOptions = {}): Sampler {
  const keys = playedKeys(track);
  const [write] = compileGroups([keys], options);
  return Object.freeze({
    start: keys.times[0],
    end: keys.times[keys.times.length - 1],
    sample: <T extends NumberStore>(t: number, out: T): T => {
      write(t, out, 0);
      return out;
    },
    sampleMany: <T extends NumberStore>(times: ReadonlyNumberStore, out: T): T => {
      for (let n = 0; n < times.length; n++) write(times[n], out, 4 * n);
      return out;
    },
  });
}
