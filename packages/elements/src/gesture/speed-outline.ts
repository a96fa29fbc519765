import type { Curve, NumberStore } from '@slewcurve/core';
import { segmentAt, type Motion } from '../chart/motion.js';
import { firstKeyAfter, firstKeyAt } from '../chart/posts.js';

/** Pieces that an outline has about, where keys are few; and at most, where they are many. */
const WANTED_PIECES = 400;
const MOST_PIECES = 1200;
/** "Just inside" a piece is this share of it away. */
const INSIDE = 1e-6;

/**
 * The speed of a motion over a span as a curve about one axis: all that a pace needs to know of it, and cheap to ask while a hand moves. Straight between the
 * ends of pieces, which are the keys and places between them; of more than 1200 keys, the mean speed of as many equal pieces, so that the angle is right.
 */
export function speedOutline(
  motion: Motion,
  keys: Float64Array,
  [from, to]: readonly [number, number],
): Curve {
  const { knots, speeds } = piecesOf(motion, keys, from, to);
  const count = knots.length - 1;
  const angles = new Float64Array(count + 1);
  for (let i = 0; i < count; i++)
    angles[i + 1] = angles[i] + ((knots[i + 1] - knots[i]) * (speeds[2 * i] + speeds[2 * i + 1])) / 2;
  const held = (t: number): number => Math.min(to, Math.max(from, t));
  // Paces ask from left to right: the piece is the last one's, or the next.
  let last = 0;
  const pieceAt = (t: number): number => {
    if (t >= knots[last] && (t < knots[last + 1] || last === count - 1)) return last;
    if (last + 1 < count && t >= knots[last + 1] && t < knots[last + 2]) return ++last;
    return (last = segmentAt(knots, t));
  };
  const slope = (i: number): number => (speeds[2 * i + 1] - speeds[2 * i]) / (knots[i + 1] - knots[i]);
  const speedAt = (t: number): number => {
    const i = pieceAt(t);
    return speeds[2 * i] + (t - knots[i]) * slope(i);
  };
  const angleAt = (t: number): number => {
    const i = pieceAt(t);
    const past = t - knots[i];
    return angles[i] + past * (speeds[2 * i] + (past * slope(i)) / 2);
  };
  return {
    start: from,
    end: to,
    continuity: 0,
    knots,
    orientation(out, t) {
      const half = angleAt(held(t)) / 2;
      out[3] = Math.cos(half);
      return aboutZ(out, Math.sin(half));
    },
    rate: (out, t) => aboutZ(out, t < from || t > to ? 0 : speedAt(t)),
    acceleration: (out, t) => aboutZ(out, t < from || t > to ? 0 : slope(pieceAt(t))),
    length: (t0, t1) => Math.abs(angleAt(held(t1)) - angleAt(held(t0))),
    peak(t0, t1) {
      const ends = [t0, t1, ...knots.filter((t) => t > t0 && t < t1)];
      const time = ends.reduce((best, t) => (speedAt(t) > speedAt(best) ? t : best), t0);
      return { rate: speedAt(time), time };
    },
  };
}

/** Ends of the pieces, seconds, and the speeds at both sides of each piece, rad/s. */
function piecesOf(
  motion: Motion,
  keys: Float64Array,
  from: number,
  to: number,
): { readonly knots: Float64Array; readonly speeds: Float64Array } {
  const inside = keys.subarray(firstKeyAfter(keys, from), firstKeyAt(keys, to));
  if (inside.length >= MOST_PIECES) return meanPieces(motion, from, to);
  const ends = [from, ...inside, to];
  const parts = Math.ceil(WANTED_PIECES / (ends.length - 1));
  const knots = new Float64Array((ends.length - 1) * parts + 1);
  for (let i = 0; i + 1 < ends.length; i++)
    for (let part = 0; part < parts; part++)
      knots[i * parts + part] = ends[i] + ((ends[i + 1] - ends[i]) * part) / parts;
  knots[knots.length - 1] = to;
  const speeds = new Float64Array(2 * (knots.length - 1));
  for (let i = 0; i + 1 < knots.length; i++) {
    const inset = INSIDE * (knots[i + 1] - knots[i]);
    speeds[2 * i] = toRadians(motion.read(knots[i] + inset).speed);
    speeds[2 * i + 1] = toRadians(motion.read(knots[i + 1] - inset).speed);
  }
  return { knots, speeds };
}

function meanPieces(
  motion: Motion,
  from: number,
  to: number,
): { readonly knots: Float64Array; readonly speeds: Float64Array } {
  const knots = Float64Array.from(
    { length: MOST_PIECES + 1 },
    (_, i) => from + ((to - from) * i) / MOST_PIECES,
  );
  const speeds = new Float64Array(2 * MOST_PIECES);
  let before = motion.read(from).odometer;
  for (let i = 0; i < MOST_PIECES; i++) {
    const after = motion.read(knots[i + 1]).odometer;
    speeds.fill(toRadians(after - before) / (knots[i + 1] - knots[i]), 2 * i, 2 * i + 2);
    before = after;
  }
  return { knots, speeds };
}

function toRadians(degrees: number): number {
  return (degrees * Math.PI) / 180;
}

function aboutZ<T extends NumberStore>(out: T, size: number): T {
  out[0] = 0;
  out[1] = 0;
  out[2] = size;
  return out;
}
