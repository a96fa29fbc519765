import type { SquadParts } from '../curve/squad-curve.js';
import type { NumberStore } from '../number-store.js';
import { squad } from '../quaternion/squad.js';
import { ARC, writeArc } from './arc-record.js';
import {
  NEAR_64,
  NEAR_SINE_64,
  arcOverSine64,
  cosineNear64,
  cosineWide64,
  sineNear64,
  sineWide64,
} from './half-angle.js';

/** Spherical quadrangles laid out for sampling. */
export interface SquadRecords {
  readonly parts: SquadParts;
  /** For each segment the arc between its keys and the one between its inner points. */
  readonly arcs: Float64Array;
  /** For each key how its segment is played. */
  readonly kinds: Uint8Array;
}

const HELD = 0;
/** Both arcs turn so little that the short polynomials hold. */
const NEAR = 1;
/** Both arcs are at most half a turn, so that the long polynomials hold. */
const WIDE = 2;
const FAR = 3;

/**
 * The part of the segment that is asked for, written before it is read in every call. As an argument it would be a number object
 * on the heap.
 */
export const squadPart: Float64Array = new Float64Array(1);

// Written before they are read in every call.
const [key, inner, innerNext, keyNext, far, points] = [4, 4, 4, 4, 4, 8].map(
  (length) => new Float64Array(length),
);

export function squadRecords(parts: SquadParts): SquadRecords {
  const { times, keys, leaving, arriving, breaks } = parts;
  const arcs = new Float64Array(2 * ARC * times.length);
  const kinds = new Uint8Array(times.length);
  for (let i = 0; i + 1 < times.length; i++) {
    points.set(leaving.subarray(4 * i, 4 * i + 4));
    points.set(arriving.subarray(4 * i, 4 * i + 4), 4);
    const arc = Math.max(
      writeArc(arcs, 2 * ARC * i, keys, 4 * i),
      writeArc(arcs, 2 * ARC * i + ARC, points, 0),
    );
    kinds[i] = arc <= NEAR_64 ? NEAR : arc <= Math.PI / 4 ? WIDE : FAR;
  }
  for (const held of breaks) kinds[held] = HELD;
  return { parts, arcs, kinds };
}

/** The orientation at `squadPart` of a segment. */
export function writeSquad(records: SquadRecords, segment: number, out: NumberStore, at: number): void {
  const { parts, arcs, kinds } = records;
  const u = squadPart[0];
  const kind = kinds[segment];
  if (u === 0 || kind === HELD) {
    for (let i = 0; i < 4; i++) out[at + i] = parts.keys[4 * segment + i];
    return;
  }
  if (kind === FAR) return writeFar(parts, segment, out, at);
  const k = 2 * u - 1;
  const from = 2 * ARC * segment;

  let x = k * arcs[from];
  let even = kind === NEAR ? cosineNear64(x * x) : cosineWide64(x * x);
  let odd = k * (kind === NEAR ? sineNear64(x * x) : sineWide64(x * x));
  const px = even * arcs[from + 1] + odd * arcs[from + 5];
  const py = even * arcs[from + 2] + odd * arcs[from + 6];
  const pz = even * arcs[from + 3] + odd * arcs[from + 7];
  const pw = even * arcs[from + 4] + odd * arcs[from + 8];

  x = k * arcs[from + 9];
  even = kind === NEAR ? cosineNear64(x * x) : cosineWide64(x * x);
  odd = k * (kind === NEAR ? sineNear64(x * x) : sineWide64(x * x));
  const qx = even * arcs[from + 10] + odd * arcs[from + 14];
  const qy = even * arcs[from + 11] + odd * arcs[from + 15];
  const qz = even * arcs[from + 12] + odd * arcs[from + 16];
  const qw = even * arcs[from + 13] + odd * arcs[from + 17];

  // The arc between the two: sin²h is half of what their product lacks of 1.
  const s = 0.5 - 0.5 * (px * qx + py * qy + pz * qz + pw * qw);
  if (s > NEAR_SINE_64) return writeFar(parts, segment, out, at);
  const middle = 4 * u * (1 - u) - 1;
  const ratio = arcOverSine64(s);
  const hh = ratio * ratio * s;
  const v = middle * middle * hh;
  const near = hh <= NEAR_64 * NEAR_64;
  even = (0.5 * (near ? cosineNear64(v) : cosineWide64(v))) / Math.sqrt(1 - s);
  odd = 0.5 * middle * ratio * (near ? sineNear64(v) : sineWide64(v));
  out[at] = even * (px + qx) + odd * (qx - px);
  out[at + 1] = even * (py + qy) + odd * (qy - py);
  out[at + 2] = even * (pz + qz) + odd * (qz - pz);
  out[at + 3] = even * (pw + qw) + odd * (qw - pw);
}

/** By the exact sines: arcs over half a turn, or points further apart than the polynomials reach. */
function writeFar(
  { keys, leaving, arriving }: SquadParts,
  segment: number,
  out: NumberStore,
  at: number,
): void {
  for (let i = 0; i < 4; i++) {
    key[i] = keys[4 * segment + i];
    inner[i] = leaving[4 * segment + i];
    innerNext[i] = arriving[4 * segment + i];
    keyNext[i] = keys[4 * segment + 4 + i];
  }
  squad(far, key, inner, innerNext, keyNext, squadPart[0]);
  for (let i = 0; i < 4; i++) out[at + i] = far[i];
}
