import { SlewcurveError, matrixOrientation, splitMatrix, toMat4 } from '@slewcurve/core';

type Quaternion = [number, number, number, number];

/** Which of a matrix's numbers are written one after the other. The matrix is for column vectors either way: it takes own vectors to the parent. */
export type MatrixOrder = 'row by row' | 'column by column';

export const MATRIX_ORDERS: readonly MatrixOrder[] = ['row by row', 'column by column'];

/** Cosine between columns that rounding leaves in numbers of three decimals, about: 0.1° off square. Common practice, no source. */
const WRITTEN_SHEAR = 2e-3;

/** The 4×4 matrix of an orientation, own to parent: 16 numbers in four lines, a row or a column a line. */
export function matrixText(orientation: Readonly<Quaternion>, order: MatrixOrder = 'row by row'): string {
  const columns = toMat4(new Float64Array(16), orientation);
  const numbers = order === 'row by row' ? transposed(columns) : Array.from(columns);
  return [0, 4, 8, 12]
    .map((line) =>
      numbers
        .slice(line, line + 4)
        .map((number) => {
          const text = number.toFixed(6);
          return (/^-0\.0+$/.test(text) ? text.slice(1) : text).padStart(9);
        })
        .join(' '),
    )
    .join('\n');
}

/**
 * The orientation in 16 typed or pasted numbers, own to parent, unit. Spaces, commas, semicolons and brackets part them. Scale and translation are left out;
 * columns off square by no more than three decimals leave are made square.
 *
 * @throws SlewcurveError `matrix.not-a-number`, `matrix.bad-length`, `matrix.last-row` where the order looks mistaken or the matrix is a projection,
 * `matrix.flat`, `matrix.reflected`, `matrix.sheared`
 */
export function orientationOfMatrix(text: string, order: MatrixOrder): Quaternion {
  const words = text.split(/[\s,;[\](){}]+/).filter((word) => word !== '');
  const numbers = words.map((word) => Number(word.replace('\u2212', '-')));
  const odd = numbers.findIndex((number) => !Number.isFinite(number));
  if (odd >= 0)
    throw new SlewcurveError(
      'matrix.not-a-number',
      `“${words[odd]}” is no number. Write 16 numbers, ${order}, with spaces or commas between them.`,
    );
  if (numbers.length !== 16)
    throw new SlewcurveError(
      'matrix.bad-length',
      `A 4 by 4 matrix has 16 numbers, ${order}; this has ${numbers.length}.`,
    );
  const columns = order === 'row by row' ? transposed(numbers) : numbers;
  checkLastRow(columns, order);
  const { orientation, reflected, shear } = splitMatrix(columns);
  // Core's own words for what is refused.
  const [x, y, z, w] = reflected || shear > WRITTEN_SHEAR ? matrixOrientation(columns) : orientation;
  return [x, y, z, w];
}

function checkLastRow(columns: readonly number[], order: MatrixOrder): void {
  const [a, b, c, d] = [columns[3], columns[7], columns[11], columns[15]];
  if (a === 0 && b === 0 && c === 0 && d === 1) return;
  const [other] = MATRIX_ORDERS.filter((each) => each !== order);
  throw new SlewcurveError(
    'matrix.last-row',
    `Read ${order}, the last row is ${a} ${b} ${c} ${d} and not 0 0 0 1. Is it written ${other}?`,
  );
}

function transposed(numbers: ArrayLike<number>): number[] {
  return Array.from(numbers, (_, i) => numbers[4 * (i % 4) + Math.floor(i / 4)]);
}
