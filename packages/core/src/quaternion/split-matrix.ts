import { SlewcurveError } from '../errors.js';
import type { ReadonlyNumberStore } from '../number-store.js';
import { writeLargest } from './mean.js';

/** What `splitMatrix` finds in a matrix. Lengths 3, 4, 3; `[x, y, z, w]`. */
export interface SplitMatrix {
  /** In the matrix's own unit; zero for a 3×3. */
  readonly translation: readonly number[];
  /** Unit, own to parent, w ≥ 0. For a sheared matrix the rotation nearest to its unscaled columns. */
  readonly orientation: readonly number[];
  /** Length of each column; that of the first is negative where the matrix is reflected. */
  readonly scale: readonly number[];
  /** Whether the matrix turns a right hand into a left. */
  readonly reflected: boolean;
  /** Largest cosine between two columns, 0 to 1: 0 where they are square to each other, as a turn and a scale leave them. */
  readonly shear: number;
}

/** Cosine between columns up to which they count as square: float32 storage of a rotation stays below 4e-7. */
export const SHEAR_FLOOR = 1e-6;

/**
 * Takes a 3×3 or 4×4 matrix (9 or 16 numbers, columns first) apart into translation, orientation and scale, and says whether it
 * is reflected or sheared. Source of the nearest rotation: Bar-Itzhack, JGCD 23(6) 1085–1087, 2000.
 *
 * @throws SlewcurveError `matrix.bad-length`, `matrix.not-finite`, `matrix.flat` where a column has no length or all lie in one
 * plane, so that no orientation is left
 */
export function splitMatrix(matrix: ReadonlyNumberStore): SplitMatrix {
  const columns = unitColumns(matrix);
  const { x, y, z } = columns;
  const volume =
    x[0] * (y[1] * z[2] - y[2] * z[1]) +
    x[1] * (y[2] * z[0] - y[0] * z[2]) +
    x[2] * (y[0] * z[1] - y[1] * z[0]);
  if (Math.abs(volume) < 1e-12)
    throw new SlewcurveError(
      'matrix.flat',
      'The columns of the matrix lie in one plane: it flattens, and no orientation can be read from it.',
    );
  const reflected = volume < 0;
  const right = reflected ? x.map((part) => -part) : x;
  const scale = reflected ? [-columns.scale[0], columns.scale[1], columns.scale[2]] : columns.scale;
  const shear = Math.max(Math.abs(dot(x, y)), Math.abs(dot(y, z)), Math.abs(dot(z, x)));
  const wide = matrix.length === 16;
  return Object.freeze({
    translation: Object.freeze(wide ? [matrix[12], matrix[13], matrix[14]] : [0, 0, 0]),
    orientation: Object.freeze(nearestRotation(right, y, z)),
    scale: Object.freeze(scale),
    reflected,
    shear,
  });
}

/**
 * The orientation of a matrix that must hold nothing but a turn, a translation and a scale.
 *
 * @throws SlewcurveError `matrix.reflected`, `matrix.sheared` (cosine between columns above `SHEAR_FLOOR`), and what `splitMatrix`
 * throws
 */
export function matrixOrientation(matrix: ReadonlyNumberStore): readonly number[] {
  const { orientation, reflected, shear } = splitMatrix(matrix);
  if (reflected)
    throw new SlewcurveError(
      'matrix.reflected',
      'The matrix is reflected: it turns a right hand into a left. Take it apart with splitMatrix, which puts the reflection into the scale.',
    );
  if (shear > SHEAR_FLOOR)
    throw new SlewcurveError(
      'matrix.sheared',
      `The matrix is sheared: its columns are ${((Math.asin(Math.min(shear, 1)) * 180) / Math.PI).toPrecision(3)}° off square. Take it apart with splitMatrix for the nearest turn.`,
    );
  return orientation;
}

interface Columns {
  readonly x: readonly number[];
  readonly y: readonly number[];
  readonly z: readonly number[];
  readonly scale: readonly number[];
}

function unitColumns(matrix: ReadonlyNumberStore): Columns {
  if (matrix.length !== 9 && matrix.length !== 16)
    throw new SlewcurveError(
      'matrix.bad-length',
      `A matrix has 9 or 16 numbers, columns first; this has ${matrix.length}.`,
    );
  const stride = matrix.length === 16 ? 4 : 3;
  const columns = [0, 1, 2].map((c) => [0, 1, 2].map((row) => matrix[c * stride + row]));
  if (!columns.flat().every(Number.isFinite))
    throw new SlewcurveError('matrix.not-finite', 'The matrix holds a number that is not finite.');
  const scale = columns.map((column) => Math.hypot(...column));
  if (scale.includes(0))
    throw new SlewcurveError(
      'matrix.flat',
      `Column ${scale.indexOf(0)} of the matrix has no length: it flattens, and no orientation can be read from it.`,
    );
  const [x, y, z] = columns.map((column, c) => column.map((part) => part / scale[c]));
  return { x, y, z, scale };
}

function dot(a: readonly number[], b: readonly number[]): number {
  return a[0] * b[0] + a[1] * b[1] + a[2] * b[2];
}

/** The rotation R that makes the trace of RᵀM largest: the largest eigenvector of the 4×4 that the trace is a form of. */
function nearestRotation(x: readonly number[], y: readonly number[], z: readonly number[]): number[] {
  const k = Float64Array.of(
    x[0] - y[1] - z[2],
    x[1] + y[0],
    x[2] + z[0],
    y[2] - z[1],
    x[1] + y[0],
    y[1] - x[0] - z[2],
    y[2] + z[1],
    z[0] - x[2],
    x[2] + z[0],
    y[2] + z[1],
    z[2] - x[0] - y[1],
    x[1] - y[0],
    y[2] - z[1],
    z[0] - x[2],
    x[1] - y[0],
    x[0] + y[1] + z[2],
  );
  return writeLargest([0, 0, 0, 0], k, [0, 0, 0, 1]);
}
