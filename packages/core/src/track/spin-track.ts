import { SlewcurveError } from '../errors.js';
import type { ReadonlyNumberStore } from '../number-store.js';
import { turnAboutOwn, turnAboutParent } from '../quaternion/turn-about.js';
import { rotationTrack, type RotationTrack } from './rotation-track.js';
import { LARGEST_STEP } from './subdivide-angles.js';

/** A steady turn about one axis. */
export interface Spin {
  /** Three numbers, any length but 0. */
  readonly axis: ReadonlyNumberStore;
  /** Whose axes `axis` is written in. Default own. */
  readonly about?: 'own' | 'parent';
  /** Radians, any number of turns; negative turns the other way. */
  readonly angle: number;
  /** Seconds, more than 0. */
  readonly duration: number;
  /** Seconds. Default 0. */
  readonly start?: number;
  /** Orientation at the start, `[x, y, z, w]`. Default identity. */
  readonly from?: ReadonlyNumberStore;
  readonly id?: string;
  readonly clip?: string;
}

/**
 * A LINEAR track that turns steadily about one axis by any number of turns: for wheels, fans, turntables, orbits. It has as many
 * keys as it takes to keep each at most 120° from the next, because two quaternion keys alone cannot tell 0° from 360°, nor 270°
 * from −90°.
 *
 * @throws SlewcurveError `spin.no-axis`, `spin.bad-duration`, and what `rotationTrack` throws
 */
export function spinTrack(spin: Spin): RotationTrack {
  const { axis, about = 'own', angle, duration, start = 0, from = [0, 0, 0, 1], id, clip } = spin;
  if (!(Math.hypot(axis[0], axis[1], axis[2]) > 0))
    throw new SlewcurveError('spin.no-axis', 'The axis of a spin has no length; give a direction.');
  if (!(duration > 0))
    throw new SlewcurveError('spin.bad-duration', `A spin takes more than 0 seconds; got ${duration}.`);
  const segments = Math.max(1, Math.ceil(Math.abs(angle) / LARGEST_STEP));
  const values = new Float64Array(4 * (segments + 1));
  const turn = about === 'own' ? turnAboutOwn : turnAboutParent;
  for (let key = 0; key <= segments; key++)
    turn(values.subarray(4 * key, 4 * key + 4), from, axis, (key / segments) * angle);
  return rotationTrack({
    times: Array.from({ length: segments + 1 }, (_, key) => start + (key / segments) * duration),
    values,
    ...(id !== undefined && { id }),
    ...(clip !== undefined && { clip }),
  });
}
