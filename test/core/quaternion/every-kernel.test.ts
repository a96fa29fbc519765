import * as core from '@slewcurve/core';
import { expect, test } from 'vitest';
import { storeDifferences, type Kernel } from '../../support/every-store.js';

const A = [0.1, -0.7, 0.3, 0.64];
const B = [-0.5, 0.2, 0.8, -0.27];
const C = [0.3, 0.3, -0.1, 0.9];
const UNIT_A = Array.from(core.normalise([0, 0, 0, 0], A));
const UNIT_B = Array.from(core.normalise([0, 0, 0, 0], B));
const UNIT_C = Array.from(core.normalise([0, 0, 0, 0], C));
const AXIS = [2 / 3, -1 / 3, 2 / 3];
const VIEW = [0.4, 2, -1.5];
const MATRIX = Array.from(core.toMat3([], UNIT_A));
const WIDE = Array.from(core.toMat4([], UNIT_B));
const FLIP = core.axisChange('x z -y');

/** Name, kernel, numbers that it writes, what it reads. */
const KERNELS: readonly (readonly [string, Kernel, number, ...(readonly number[])[]])[] = [
  ['multiply', (out, a, b) => core.multiply(out, a, b), 4, A, B],
  ['conjugate', (out, q) => core.conjugate(out, q), 4, A],
  ['relative', (out, a, b) => core.relative(out, a, b), 4, A, B],
  ['normalise', (out, q) => core.normalise(out, q), 4, A],
  ['rotateVector', (out, q, v) => core.rotateVector(out, q, v), 3, UNIT_A, VIEW],
  ['logMap', (out, q) => core.logMap(out, q), 3, B],
  ['logMapLong', (out, q) => core.logMapLong(out, q), 3, B],
  ['expMap', (out, r) => core.expMap(out, r), 4, [...VIEW, 0]],
  ['slerp', (out, a, b) => core.slerp(out, a, b, 0.3), 4, A, B],
  ['slerpAsStored', (out, a, b) => core.slerpAsStored(out, a, b, 0.3), 4, A, B],
  ['nlerp', (out, a, b) => core.nlerp(out, a, b, 0.3), 4, A, B],
  ['squad', (out, a, b, c, d) => core.squad(out, a, b, c, d, 0.3), 4, UNIT_A, UNIT_C, UNIT_B, UNIT_A],
  ['slerpTurns', (out, a, b) => core.slerpTurns(out, a, b, 0.3, -2), 4, A, B],
  ['fromAxisAngle', (out, axis) => core.fromAxisAngle(out, axis, 1.1), 4, [...AXIS, 0]],
  ['toAxisAngle', (out, q) => core.toAxisAngle(out, q), 3, B],
  ['fromEuler XYZ', (out, angles) => core.fromEuler(out, angles, 'XYZ'), 4, [0.3, -1.2, 2, 0]],
  ['fromEuler zxz', (out, angles) => core.fromEuler(out, angles, 'zxz'), 4, [0.3, -1.2, 2, 0]],
  ['toEuler ZYX', (out, q) => core.toEuler(out, q, 'ZYX'), 3, B],
  ['toEuler yxy', (out, q) => core.toEuler(out, q, 'yxy'), 3, B],
  ['unwrapEuler', (out, angles) => core.unwrapEuler(out, angles, 'XYZ'), 6, [3, 0.1, 0.2, -3, 0.2, 0.1]],
  ['toMat3', (out, q) => core.toMat3(out, q), 9, A],
  ['toMat4', (out, q) => core.toMat4(out, q), 16, A],
  ['fromMat3', (out, matrix) => core.fromMat3(out, matrix), 4, MATRIX],
  ['fromMat4', (out, matrix) => core.fromMat4(out, matrix), 4, WIDE],
  ['lookAlong', (out, view, up) => core.lookAlong(out, view, up), 4, [...VIEW, 0], [0, 1, 0, 0]],
  ['lookAt', (out, eye, to, up) => core.lookAt(out, eye, to, up), 4, [1, 1, 1, 0], [...VIEW, 0], AXIS],
  ['lookLeastTwist', (out, q, view) => core.lookLeastTwist(out, q, view), 4, UNIT_A, [...VIEW, 0]],
  ['lookAlongPath', (out, views, q) => core.lookAlongPath(out, views, q), 4, VIEW, UNIT_A],
  ['mean', (out, quats) => core.mean(out, quats), 4, [...UNIT_A, ...UNIT_C, ...UNIT_B]],
  ['swing', (out, q, axis) => core.swing(out, q, axis), 4, A, [...AXIS, 0]],
  ['twist', (out, q, axis) => core.twist(out, q, axis), 4, A, [...AXIS, 0]],
  ['canonical', (out, q) => core.canonical(out, q), 4, B],
  ['changeAxes', (out, q) => core.changeAxes(out, q, FLIP), 4, A],
  ['changeAxesOfRate', (out, rate) => core.changeAxesOfRate(out, rate, FLIP), 3, VIEW],
  ['changeBasis', (out, q, basis) => core.changeBasis(out, q, basis), 4, A, UNIT_B],
  ['mirror', (out, q, normal) => core.mirror(out, q, normal), 4, A, [...AXIS, 0]],
  ['turnAboutOwn', (out, q, axis) => core.turnAboutOwn(out, q, axis, 0.4), 4, A, [...AXIS, 0]],
  ['turnAboutParent', (out, q, axis) => core.turnAboutParent(out, q, axis, 0.4), 4, A, [...AXIS, 0]],
  ['turnAboutWorld', (out, q, p, axis) => core.turnAboutWorld(out, q, p, axis, 0.4), 4, A, UNIT_B, AXIS],
  ['turnBetween', (out, from, to) => core.turnBetween(out, from, to), 4, [...VIEW, 0], [...AXIS, 0]],
];

const CASES = KERNELS.map(([name, kernel, outLength, ...inputs]) => ({ name, kernel, outLength, inputs }));

test.each(CASES)(
  '$name answers the same in every kind of store, onto its own input, and writes nothing else',
  ({ kernel, outLength, inputs }) => {
    const differences = storeDifferences(kernel, outLength, ...inputs);
    // float32: one rounding of numbers below 4 is at most 2^-23; a sum of two answers' roundings twice that.
    expect(differences.float32).toBeLessThanOrEqual(2 ** -22);
    expect(differences).toMatchObject({ float64: 0, aliased: 0, written: 0 });
  },
);

test.each(CASES)('$name returns its own output', ({ kernel, outLength, inputs }) => {
  const out = new Float64Array(outLength);
  const returned = kernel(out, ...inputs);
  expect(typeof returned === 'number' || returned === out).toBe(true);
});
