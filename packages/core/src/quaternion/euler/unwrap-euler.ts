import type { NumberStore, ReadonlyNumberStore } from '../../number-store.js';
import { axisOf, handOf, hasTwoAxes, isIntrinsic } from './euler-sequence.js';
import { poleDistance } from './to-euler.js';

/** Radians from the pole within which the outer angles are shared out anew: doing so moves the orientation by less than this. */
const AT_THE_POLE = 1e-9;

const TURN = 2 * Math.PI;

/**
 * Makes a track of Euler angles continuous: `angles` holds 3 numbers a frame, radians, in the order of the letters of
 * `sequence`. The first frame is kept. Of the two triples that are the same orientation, and of all whole turns, every later
 * frame takes what lies nearest to the frame before; at the pole, where only the sum or the difference of the outer angles is
 * defined, it shares that out with the least change. Orientations stay the same. `out` (as long as `angles`) may be `angles`.
 * Whole turns between two frames cannot be seen: frames must be less than half a turn apart. Never throws.
 */
export function unwrapEuler<T extends NumberStore>(out: T, angles: ReadonlyNumberStore, sequence: string): T {
  const two = hasTwoAxes(sequence);
  const before: [number, number, number] = [angles[0], angles[1], angles[2]];
  const frame: [number, number, number] = [0, 0, 0];
  const other: [number, number, number] = [0, 0, 0];
  for (let at = 0; at + 2 < angles.length; at += 3) {
    for (let part = 0; part < 3; part++) frame[part] = angles[at + part];
    // The other triple: half a turn more outside, the middle angle mirrored at the pole.
    other[0] = frame[0] + Math.PI;
    other[1] = two ? -frame[1] : Math.PI - frame[1];
    other[2] = frame[2] + Math.PI;
    const stays = at > 0 ? approach(frame, before, sequence) : 0;
    const changes = at > 0 ? approach(other, before, sequence) : Infinity;
    const chosen = changes < stays ? other : frame;
    for (let part = 0; part < 3; part++) {
      before[part] = chosen[part];
      out[at + part] = chosen[part];
    }
  }
  return out;
}

/** Moves `frame` by whole turns, and along the free line at the pole, toward `before`; the squared distance left. */
function approach(frame: NumberStore, before: ReadonlyNumberStore, sequence: string): number {
  for (let part = 0; part < 3; part++) frame[part] += TURN * Math.round((before[part] - frame[part]) / TURN);
  if (poleDistance(frame, sequence) < AT_THE_POLE) {
    const sign = outerSign(frame[1], sequence);
    const merged = frame[0] + sign * frame[2] - (before[0] + sign * before[2]);
    const change = merged - TURN * Math.round(merged / TURN);
    frame[0] = before[0] + change / 2;
    frame[2] = before[2] + (sign * change) / 2;
  }
  return (frame[0] - before[0]) ** 2 + (frame[1] - before[1]) ** 2 + (frame[2] - before[2]) ** 2;
}

/** +1 where, at the pole of middle angle `middle`, the sum of the outer angles is what is defined; -1 the difference. */
function outerSign(middle: number, sequence: string): number {
  if (hasTwoAxes(sequence)) return Math.cos(middle) < 0 ? -1 : 1;
  const hand = handOf(axisOf(sequence, 0), axisOf(sequence, 1)) * (isIntrinsic(sequence) ? 1 : -1);
  return Math.sin(middle) < 0 ? -hand : hand;
}
