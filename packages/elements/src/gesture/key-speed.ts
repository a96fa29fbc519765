import type { Ground, Hand } from './hand.js';
import { pressAt } from './press.js';

/** A key's knob reaches at least this many frames. */
const LEAST_FRAMES = 4;

/** A key's knob drawn up or down: the speed at the key, as a press that reaches to the farther neighbour, with shoulders as long. */
export function keySpeed(ground: Ground, key: number): Hand {
  const { keys, frame } = ground;
  const at = keys[key];
  const gaps = [key > 0 ? at - keys[key - 1] : 0, key + 1 < keys.length ? keys[key + 1] - at : 0];
  const reach = Math.max(LEAST_FRAMES * frame, ...gaps);
  const rounded = Number(reach.toFixed(3));
  return pressAt(ground, at, rounded, rounded);
}
