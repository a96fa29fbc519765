import { fromAxisAngle, fromEuler, multiply } from '@slewcurve/core';
import type { Orientation } from './demo-track.js';

type Four = [number, number, number, number];

const RADIANS = Math.PI / 180;

/** The turn by `degrees` about `axis`, which need not be unit. Not wrapped: 360° gives the other sign than 0°. */
export function turnAbout(axis: readonly [number, number, number], degrees: number): Orientation {
  return fromAxisAngle<Four>([0, 0, 0, 1], axis, degrees * RADIANS);
}

/** `first` and then `then`, both about parent axes. */
export function after(then: Orientation, first: Orientation): Orientation {
  return multiply<Four>([0, 0, 0, 1], then, first);
}

/** A head that pans about +Y, tilts about its own x and rolls about its own z. Degrees. */
export function panTiltRoll(pan: number, tilt: number, roll = 0): Orientation {
  return fromEuler<Four>([0, 0, 0, 1], [pan * RADIANS, tilt * RADIANS, roll * RADIANS], 'YXZ');
}

/** The same orientation, stored with the other sign. */
export function otherSign([x, y, z, w]: Orientation): Orientation {
  return [-x, -y, -z, -w];
}
