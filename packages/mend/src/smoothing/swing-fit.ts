import { solveSymmetric } from './solve.js';

/** A swing of one frequency whose strength and phase may change slowly: three numbers at each time. */
export interface Swing {
  /** Hertz. */
  readonly hertz: number;
  /** Value at a time, and its change per second: `out` takes six numbers. */
  read(out: Float64Array, time: number): Float64Array;
  /** Sum over all three parts of the squares that it leaves of what it was fitted to. */
  readonly left: number;
}

/** Vectors at times, and which of them count. */
export interface SwingData {
  readonly times: Float64Array;
  /** Three numbers a time. */
  readonly vectors: Float64Array;
  /** Not 0 where a time counts. */
  readonly counts: Uint8Array;
  /** First and last time that counts, as indices. */
  readonly from: number;
  readonly to: number;
}

/**
 * Least squares fit of Σ hᵢ(t)·(aᵢ·cos 2πft + bᵢ·sin 2πft), hᵢ straight-sided hats at `nodes` even places (one node: constant strength). Taking it away is a
 * notch: it takes what swings at `hertz`, within nodes / length on either side, and leaves all else.
 */
export function fitSwing(data: SwingData, hertz: number, nodes: number): Swing {
  const { times, vectors, counts, from, to } = data;
  const [begin, length] = [times[from], times[to] - times[from]];
  const size = 2 * nodes;
  const matrix = new Float64Array(size * size);
  const parts = new Float64Array(3 * size);
  const basis = new Float64Array(4);
  const turn = 2 * Math.PI * hertz;

  /** The four numbers of the basis that are not zero at a time, and the index of the first. */
  const basisAt = (time: number): number => {
    const place = nodes === 1 ? 0 : Math.min(nodes - 1, Math.max(0, ((time - begin) / length) * (nodes - 1)));
    const hat = Math.min(Math.max(0, nodes - 2), Math.floor(place));
    const [cos, sin] = [Math.cos(turn * (time - begin)), Math.sin(turn * (time - begin))];
    const later = place - hat;
    basis[0] = (1 - later) * cos;
    basis[1] = (1 - later) * sin;
    basis[2] = later * cos;
    basis[3] = later * sin;
    return 2 * hat;
  };

  const width = Math.min(4, size);
  let squares = 0;
  for (let k = from; k <= to; k++) {
    if (counts[k] === 0) continue;
    const first = basisAt(times[k]);
    for (let i = 0; i < width; i++) {
      for (let j = 0; j < width; j++) matrix[(first + i) * size + first + j] += basis[i] * basis[j];
      for (let axis = 0; axis < 3; axis++) parts[3 * (first + i) + axis] += basis[i] * vectors[3 * k + axis];
    }
    for (let axis = 0; axis < 3; axis++) squares += vectors[3 * k + axis] ** 2;
  }
  const moments = Float64Array.from(parts);
  solveSymmetric(matrix, parts, size, 3);
  // What is left of a sum of squares after its least squares fit: Σv² − xᵀAᵀv.
  const rest = squares - parts.reduce((sum, part, i) => sum + part * moments[i], 0);
  // Less than float64 tells from rounding is not told.
  const left = Math.max(rest, 1e-13 * squares);

  const read = (out: Float64Array, time: number): Float64Array => {
    const first = basisAt(time);
    const isWithin = nodes > 1 && time > begin && time < begin + length;
    const steep = isWithin ? (nodes - 1) / length : 0;
    const [cos, sin] = [Math.cos(turn * (time - begin)), Math.sin(turn * (time - begin))];
    const later = nodes === 1 ? 0 : basisShare(time);
    // Change per second of the four: hats and swing both move.
    const slopes = [
      -steep * cos - (1 - later) * turn * sin,
      -steep * sin + (1 - later) * turn * cos,
      steep * cos - later * turn * sin,
      steep * sin + later * turn * cos,
    ];
    out.fill(0);
    for (let i = 0; i < width; i++)
      for (let axis = 0; axis < 3; axis++) {
        out[axis] += basis[i] * parts[3 * (first + i) + axis];
        out[3 + axis] += slopes[i] * parts[3 * (first + i) + axis];
      }
    return out;
  };

  const basisShare = (time: number): number => {
    const place = Math.min(nodes - 1, Math.max(0, ((time - begin) / length) * (nodes - 1)));
    return place - Math.min(nodes - 2, Math.floor(place));
  };

  return { hertz, read, left };
}

/** Places at which the frequency is looked for on either side, and halvings of their distance after that: to a 500th of what the length tells apart. */
const LOOKS = 4;
const HALVINGS = 7;

/** The frequency within `beside` of `hertz` at which a swing of constant strength leaves least. */
export function sharpened(data: SwingData, hertz: number, beside: number): number {
  let best = hertz;
  const leftAt = (at: number): number => fitSwing(data, at, 1).left;
  let least = leftAt(best);
  const look = (at: number): void => {
    const left = leftAt(at);
    if (left < least) [best, least] = [at, left];
  };
  for (let i = -LOOKS; i <= LOOKS; i++) look(hertz + (i * beside) / LOOKS);
  for (let halving = 0, width = beside / LOOKS; halving < HALVINGS; halving++, width /= 2) {
    const centre = best;
    look(centre - width / 2);
    look(centre + width / 2);
  }
  return best;
}
