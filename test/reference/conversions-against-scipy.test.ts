import {
  angleBetween,
  EULER_SEQUENCES,
  fromEuler,
  fromMat3,
  fromMat4,
  matrixOrientation,
  mean,
  toEuler,
  toMat3,
  toMat4,
} from '@slewcurve/core';
import { expect, test } from 'vitest';
import { referenceValues } from '../support/reference-values.js';

// Source of every number here: scipy 1.10.1, scipy.spatial.transform.Rotation, with the tolerances that came with the values.

const EULER = referenceValues('scipy-1.10.1.json', 'euler');
const MATRICES = referenceValues('scipy-1.10.1.json', 'matrix');
const DEGREES = 180 / Math.PI;

test.each(EULER_SEQUENCES)(
  'angles about %s make the quaternion that scipy makes, to 1e-12 rad',
  (sequence) => {
    const cases = EULER.filter(({ seq }) => seq === sequence);
    expect(cases.length).toBeGreaterThan(0);
    for (const { angles_deg, quat } of cases) {
      const angles = angles_deg.map((angle) => angle / DEGREES);
      expect(angleBetween(fromEuler([], angles, sequence), quat)).toBeLessThan(1e-12);
    }
  },
);

test.each(EULER_SEQUENCES)(
  'a quaternion gives the principal angles about %s that scipy gives, to 1e-10 degrees times the amplification near the pole',
  (sequence) => {
    for (const { quat, principal_angles_deg, lock_amplification } of EULER.filter(
      ({ seq }) => seq === sequence,
    )) {
      const angles = toEuler([0, 0, 0], quat, sequence);
      const worst = angles.map((angle, n) => Math.abs(offTurns(angle * DEGREES - principal_angles_deg[n])));
      expect(Math.max(...worst)).toBeLessThan(1e-10 * lock_amplification);
    }
  },
);

test('a quaternion makes the matrix that scipy makes and comes back from it, to 4 roundings of 1', () => {
  expect(MATRICES.length).toBeGreaterThan(0);
  for (const { quat, matrix_rows } of MATRICES) {
    const columns = [0, 1, 2].flatMap((column) => matrix_rows.map((row) => row[column]));
    const narrow = toMat3<number[]>([], quat);
    const wide = toMat4<number[]>([], quat);
    const worst = narrow.map((part, n) => Math.abs(part - columns[n]));
    expect(Math.max(...worst)).toBeLessThanOrEqual(4 * Number.EPSILON);
    expect([0, 1, 2].flatMap((column) => wide.slice(4 * column, 4 * column + 3))).toEqual(narrow);
    // Angles of orientations that differ by the rounding of a matrix: some 1e-15 rad.
    expect(angleBetween(fromMat3([], columns), quat)).toBeLessThan(4e-15);
    expect(angleBetween(fromMat4([], wide), quat)).toBeLessThan(4e-15);
    expect(angleBetween(matrixOrientation(columns), quat)).toBeLessThan(4e-15);
  }
});

test("the chordal mean is scipy's, to 1e-12 rad over the relative gap of the two largest eigenvalues", () => {
  const cases = referenceValues('scipy-1.10.1.json', 'mean');
  expect(cases.length).toBeGreaterThan(0);
  for (const { quats, weights, expected, relative_eigen_gap } of cases) {
    const found = mean([], quats.flat(), weights);
    expect(angleBetween(found, expected)).toBeLessThan(1e-12 / relative_eigen_gap);
  }
});

function offTurns(degrees: number): number {
  return degrees - 360 * Math.round(degrees / 360);
}
