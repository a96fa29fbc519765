import type { NumberStore, ReadonlyNumberStore } from '../number-store.js';
import { conjugate } from './conjugate.js';
import { fromColumns } from './from-matrix.js';
import { multiply } from './multiply.js';
import { rotateVector } from './rotate-vector.js';
import { turnBetween } from './turn-between.js';

/** A camera looks along its own −Z, as glTF 2.0 ("Cameras") says. */
const FORWARD: readonly number[] = Object.freeze([0, 0, -1]);

/** Sine of the angle between view and up below which rounding begins to choose the roll: 2e-5°. */
const UPRIGHT_FLOOR = 4e-7;

/**
 * The orientation of a camera that looks along `direction` with the picture's top toward `up` (three numbers each, parent axes,
 * any length but 0): own −Z along the view, own +Y up. Where `direction` and `up` are parallel, or `up` has no length, the roll
 * is not defined, and the smallest turn away from looking along the parent's −Z is taken; where `direction` has none, the
 * identity. A track of these flips where it passes straight up or down: carry the frame along with `lookLeastTwist` there.
 * `out` may be an input. Never throws.
 */
export function lookAlong<T extends NumberStore>(
  out: T,
  direction: ReadonlyNumberStore,
  up: ReadonlyNumberStore,
): T {
  return lookInto(out, direction[0], direction[1], direction[2], up);
}

/** As `lookAlong`, from the point `eye` toward the point `target`. */
export function lookAt<T extends NumberStore>(
  out: T,
  eye: ReadonlyNumberStore,
  target: ReadonlyNumberStore,
  up: ReadonlyNumberStore,
): T {
  return lookInto(out, target[0] - eye[0], target[1] - eye[1], target[2] - eye[2], up);
}

function lookInto<T extends NumberStore>(
  out: T,
  dx: number,
  dy: number,
  dz: number,
  up: ReadonlyNumberStore,
): T {
  const reach = Math.hypot(dx, dy, dz);
  const tall = Math.hypot(up[0], up[1], up[2]);
  const zx = -dx / reach,
    zy = -dy / reach,
    zz = -dz / reach;
  const ux = up[0] / tall,
    uy = up[1] / tall,
    uz = up[2] / tall;
  const rx = uy * zz - uz * zy,
    ry = uz * zx - ux * zz,
    rz = ux * zy - uy * zx;
  const wide = Math.hypot(rx, ry, rz);
  // Written so that NaN, which a vector of no length leaves here, is not upright either.
  if (!(wide > UPRIGHT_FLOOR)) return turnBetween(out, FORWARD, [dx, dy, dz]);
  const xx = rx / wide,
    xy = ry / wide,
    xz = rz / wide;
  return fromColumns(out, xx, xy, xz, zy * xz - zz * xy, zz * xx - zx * xz, zx * xy - zy * xx, zx, zy, zz);
}

/**
 * The orientation that looks along `direction` (three numbers, parent axes) and differs least from `previous`, a unit quaternion:
 * the smallest turn that carries the earlier view there, so that nothing rolls. Straight backwards is half a turn about an axis
 * that rounding chooses; a direction of no length changes nothing. `out` may be an input. Never throws.
 */
export function lookLeastTwist<T extends NumberStore>(
  out: T,
  previous: ReadonlyNumberStore,
  direction: ReadonlyNumberStore,
): T {
  const turn: [number, number, number, number] = [0, 0, 0, 0];
  conjugate(turn, previous);
  rotateVector(turn, turn, direction);
  turnBetween(turn, FORWARD, turn);
  return multiply(out, previous, turn);
}

/**
 * Orientations that look along each of `directions` (3 numbers a frame, parent axes), every frame carried along from the one
 * before by the least twist: frames for a camera that follows a path, which never flip at the vertical. `out` takes 4 numbers a
 * frame. The first frame is the least twist from `first`, a unit quaternion. No allocation, never throws.
 */
export function lookAlongPath<T extends NumberStore>(
  out: T,
  directions: ReadonlyNumberStore,
  first: ReadonlyNumberStore,
): T {
  const frame: [number, number, number, number] = [first[0], first[1], first[2], first[3]];
  const view: [number, number, number] = [0, 0, 0];
  for (let i = 0; 3 * i + 2 < directions.length; i++) {
    for (let axis = 0; axis < 3; axis++) view[axis] = directions[3 * i + axis];
    lookLeastTwist(frame, frame, view);
    for (let part = 0; part < 4; part++) out[4 * i + part] = frame[part];
  }
  return out;
}
