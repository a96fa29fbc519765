import { angleBetween } from '@slewcurve/core';
import type { ChartData } from './chart-data.js';
import { toDegrees } from './quantity.js';

/** The numbers of one key as played. Degrees, deg/s, seconds. */
export interface KeyNumbers {
  readonly key: number;
  readonly time: number;
  /** Own to parent, `[x, y, z, w]`. */
  readonly orientation: readonly [number, number, number, number];
  /** The same as a turn from the parent's axes: shortest, 0° to 180°; axis of no length where the angle is 0. */
  readonly angle: number;
  readonly axis: readonly [number, number, number];
  /** Speed just before and just after the key; undefined at the ends of the track. */
  readonly speedIn?: number;
  readonly speedOut?: number;
  /** Time and angle to the neighbours. */
  readonly before?: { readonly gap: number; readonly angle: number };
  readonly after?: { readonly gap: number; readonly angle: number };
}

/** "Just before" is this share of the segment away: inside it, and closer than any drawn pixel. */
const BESIDE = 1e-6;

/** What is true at key number `key`. */
export function keyNumbers(data: ChartData, key: number): KeyNumbers {
  const { keys, motion } = data;
  const time = keys[key];
  const orientation = motion.orientation(time);
  const [x, y, z, w] = orientation[3] < 0 ? orientation.map((v) => -v) : orientation;
  const sine = Math.hypot(x, y, z);
  return {
    key,
    time,
    orientation,
    angle: toDegrees(2 * Math.atan2(sine, w)),
    axis: sine > 0 ? [x / sine, y / sine, z / sine] : [0, 0, 0],
    ...(key > 0 && {
      speedIn: motion.read(time - BESIDE * (time - keys[key - 1])).speed,
      before: neighbour(data, key, key - 1),
    }),
    ...(key < keys.length - 1 && {
      speedOut: motion.read(time + BESIDE * (keys[key + 1] - time)).speed,
      after: neighbour(data, key, key + 1),
    }),
  };
}

function neighbour({ keys, motion }: ChartData, a: number, b: number): { gap: number; angle: number } {
  return {
    gap: Math.abs(keys[b] - keys[a]),
    angle: toDegrees(angleBetween(motion.orientation(keys[a]), motion.orientation(keys[b]))),
  };
}
