import {
  fromAxisAngle,
  fromEuler,
  normalise,
  toAxisAngle,
  toEuler,
  type EulerSequence,
} from '@slewcurve/core';
import { toDegrees } from '../chart/quantity.js';

type Quaternion = [number, number, number, number];

/** How an orientation is told by numbers: as axis and angle, by three angles of a sequence, as a quaternion. */
export type NumberKind = 'axis and angle' | 'quaternion' | EulerSequence;

/** What the numbers of a kind are called, in their order. */
export function numberNames(kind: NumberKind): readonly string[] {
  if (kind === 'quaternion') return ['x', 'y', 'z', 'w'];
  if (kind === 'axis and angle') return ['axis x', 'axis y', 'axis z', 'angle in degrees'];
  return [...kind.matchAll(/./g)].map(
    ([letter], i) => `${ORDER[i] ?? ''} angle, about ${letter}, in degrees`,
  );
}

const ORDER = ['first', 'second', 'third'];

/** The numbers of an orientation, own to parent. Degrees. */
export function numbersOfOrientation(orientation: Readonly<Quaternion>, kind: NumberKind): number[] {
  if (kind === 'quaternion') return [...orientation];
  if (kind === 'axis and angle') {
    const axis: [number, number, number] = [0, 0, 0];
    const angle = toAxisAngle(axis, orientation);
    return [...axis, toDegrees(angle)];
  }
  return toEuler<[number, number, number]>([0, 0, 0], orientation, kind).map(toDegrees);
}

/** The orientation that numbers tell; undefined where they tell none: an axis or a quaternion of no length. */
export function orientationOfNumbers(numbers: readonly number[], kind: NumberKind): Quaternion | undefined {
  if (!numbers.every(Number.isFinite)) return undefined;
  const out: Quaternion = [0, 0, 0, 1];
  if (kind === 'quaternion') return Math.hypot(...numbers) > 0 ? normalise(out, numbers) : undefined;
  if (kind === 'axis and angle') {
    const [x, y, z, angle] = numbers;
    return Math.hypot(x, y, z) > 0 ? fromAxisAngle(out, [x, y, z], radians(angle)) : undefined;
  }
  return fromEuler(out, numbers.map(radians), kind);
}

function radians(degrees: number): number {
  return (degrees * Math.PI) / 180;
}
