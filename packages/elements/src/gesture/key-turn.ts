import { conjugate, logMap, multiply, relative } from '@slewcurve/core';
import type { KeyPress } from '../chart/chart-keys.js';
import { sayAngle, sayNumber, toDegrees } from '../chart/quantity.js';
import { stepsOfKey, tidy } from './hand.js';

/** A turn as a rotation vector, degrees about x, y and z. */
export type Turn = readonly [number, number, number];
type Quaternion = readonly [number, number, number, number];

/** Whose axes a turn is about. */
export type About = 'own' | 'parent' | 'world';

export const WHOSE: Readonly<Record<About, string>> = { own: 'own', parent: 'parent’s', world: 'world’s' };

/** Degrees that an arrow key turns. */
const NUDGE = 0.1;

export const NO_TURN: Turn = [0, 0, 0];

/** The turn of a drag on a globe `size` px across: sideways about y, up and down about x, sideways with Shift about z. Across is half a turn. */
export function turnOfDrag(dx: number, dy: number, size: number, aboutZ: boolean): Turn {
  const perPixel = 180 / size;
  const across = tidy(dx * perPixel, 0.1);
  return aboutZ ? [0, 0, minus(across)] : [tidy(dy * perPixel, 0.1), across, 0];
}

/** A turn a little further by an arrow key: 0.1°, ten times as far with Shift; Page Up and Page Down turn about z. */
export function nudgedTurn([x, y, z]: Turn, press: KeyPress): Turn | undefined {
  const [across, up] = stepsOfKey(press);
  const roll = { PageUp: 1, PageDown: -1 }[press.key] ?? 0;
  if (across === 0 && up === 0 && roll === 0) return undefined;
  const steps = [-up, across, press.shiftKey ? 10 * roll : roll];
  const [a, b, c] = [x, y, z].map((angle, i) => tidy(angle + steps[i] * NUDGE, 0.01));
  return [a, b, c];
}

/** The turn about own, or parent's, axes that takes one orientation to another, the short way round. */
export function turnTo(from: Quaternion, wanted: Quaternion, about: 'own' | 'parent'): Turn {
  const turn: [number, number, number, number] = [0, 0, 0, 1];
  if (about === 'own') relative(turn, from, wanted);
  else multiply(turn, wanted, conjugate(turn, from));
  const [x, y, z] = logMap<[number, number, number]>([0, 0, 0], turn).map((angle) =>
    Number(toDegrees(angle).toFixed(7)),
  );
  return [x, y, z];
}

/** "12.3° about own y": the acting axis in words, never left out. */
export function sayTurn(turn: Turn, about: About): string {
  const size = Math.hypot(...turn);
  if (!(size > 0)) return `no turn yet, about its ${WHOSE[about]} axes`;
  const along = turn.map((angle) => angle / size);
  const index = along.findIndex((part) => Math.abs(part) > 0.9999);
  const name = about === 'own' ? 'own' : about === 'parent' ? 'the parent’s' : 'the world’s';
  const axis =
    index < 0
      ? `(${along.map((part) => sayNumber(part)).join(', ')}) of ${name} axes`
      : `${name} ${'xyz'[index] ?? ''}`;
  const signed = index >= 0 && along[index] < 0 ? -size : size;
  return `${sayAngle(signed)} about ${axis}`;
}

function minus(value: number): number {
  return value === 0 ? 0 : -value;
}
