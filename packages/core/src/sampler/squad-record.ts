import type { SquadParts } from '../curve/squad-curve.js';
import type { NumberStore } from '../number-store.js';
import { squad } from '../quaternion/squad.js';
import { NEAR_SINE_64, arcOverSine64, cosineWide64, sineWide64 } from './half-angle.js';
import { writeWeights } from './segment-weights.js';

/**
 * Numbers a key: its orientation (0), the inner points by which its segment leaves it (4) and arrives at the next key (8), the
 * three weights of the arc between the keys (12) and between the inner points (15), how the segment is played (18), the time (19).
 */
export const SQUAD_RECORD = 20;

/** Where a segment's kind is kept, and its values. */
const KIND = 18;
const HELD = 0;
/** Both arcs at most half a turn, so that the polynomials hold. */
const NEAR = 1;
const FAR = 2;

// Written before they are read in every call.
const [key, inner, innerNext, keyNext, far] = Array.from({ length: 5 }, () => new Float64Array(4));

/** Records of all keys; one that is identity, at 0 s, where there is none. */
export function squadRecords({ times, keys, leaving, arriving, breaks }: SquadParts): Float64Array {
  const records = new Float64Array(SQUAD_RECORD * Math.max(1, times.length));
  records[3] = 1;
  for (let i = 0; i < times.length; i++) {
    const at = i * SQUAD_RECORD;
    records.set(keys.subarray(4 * i, 4 * i + 4), at);
    records[at + SQUAD_RECORD - 1] = times[i];
    if (i + 1 === times.length) break;
    records.set(leaving.subarray(4 * i, 4 * i + 4), at + 4);
    records.set(arriving.subarray(4 * i, 4 * i + 4), at + 8);
    const outerArc = writeWeights(records, at + 12, keys, 4 * i);
    const innerArc = writeWeights(records, at + 15, records, at + 4);
    records[at + KIND] = Math.max(outerArc, innerArc) <= Math.PI / 4 ? NEAR : FAR;
  }
  for (const held of breaks) records[held * SQUAD_RECORD + KIND] = HELD;
  return records;
}

/** The orientation at the part `u` of the segment whose record is at `from`. */
export function writeSquad(
  records: Float64Array,
  from: number,
  u: number,
  out: NumberStore,
  at: number,
): void {
  if (u === 0 || records[from + KIND] === HELD) {
    for (let i = 0; i < 4; i++) out[at + i] = records[from + i];
    return;
  }
  if (records[from + KIND] === FAR) return writeFar(records, from, u, out, at);
  const k = 2 * u - 1;
  const to = from + SQUAD_RECORD;

  let x = k * records[from + 12];
  let even = cosineWide64(x * x) * records[from + 13];
  let odd = k * sineWide64(x * x) * records[from + 14];
  let before = even - odd;
  let after = even + odd;
  const px = before * records[from] + after * records[to];
  const py = before * records[from + 1] + after * records[to + 1];
  const pz = before * records[from + 2] + after * records[to + 2];
  const pw = before * records[from + 3] + after * records[to + 3];

  x = k * records[from + 15];
  even = cosineWide64(x * x) * records[from + 16];
  odd = k * sineWide64(x * x) * records[from + 17];
  before = even - odd;
  after = even + odd;
  const qx = before * records[from + 4] + after * records[from + 8];
  const qy = before * records[from + 5] + after * records[from + 9];
  const qz = before * records[from + 6] + after * records[from + 10];
  const qw = before * records[from + 7] + after * records[from + 11];

  // The arc between the two: sin²h is half of what their product lacks of 1.
  const s = 0.5 - 0.5 * (px * qx + py * qy + pz * qz + pw * qw);
  if (s > NEAR_SINE_64) return writeFar(records, from, u, out, at);
  const part = 4 * u * (1 - u) - 1;
  const ratio = arcOverSine64(s);
  const v = part * part * ratio * ratio * s;
  even = (0.5 * cosineWide64(v)) / Math.sqrt(1 - s);
  odd = 0.5 * part * ratio * sineWide64(v);
  before = even - odd;
  after = even + odd;
  out[at] = before * px + after * qx;
  out[at + 1] = before * py + after * qy;
  out[at + 2] = before * pz + after * qz;
  out[at + 3] = before * pw + after * qw;
}

/** By the exact sines: arcs over half a turn, or points further apart than the polynomials reach. */
function writeFar(records: Float64Array, from: number, u: number, out: NumberStore, at: number): void {
  for (let i = 0; i < 4; i++) {
    key[i] = records[from + i];
    inner[i] = records[from + 4 + i];
    innerNext[i] = records[from + 8 + i];
    keyNext[i] = records[from + SQUAD_RECORD + i];
  }
  squad(far, key, inner, innerNext, keyNext, u);
  for (let i = 0; i < 4; i++) out[at + i] = far[i];
}
