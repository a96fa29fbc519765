import type { NumberStore, ReadonlyNumberStore } from '../number-store.js';
import type { RotationTrack } from '../track/rotation-track.js';
import { poseSampler } from './pose-sampler.js';
import type { SamplerOptions } from './precision.js';

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
  const { start, end, samplePose, samplePoses } = poseSampler([track], options);
  return Object.freeze({ start, end, sample: samplePose, sampleMany: samplePoses });
}
