import { EULER_SEQUENCES, SlewcurveError, angleBetween, expMap, multiply } from '@slewcurve/core';
import {
  MATRIX_ORDERS,
  NO_TURN,
  matrixText,
  nudgedTurn,
  numberNames,
  numbersOfOrientation,
  orientationOfMatrix,
  orientationOfNumbers,
  sayTurn,
  turnOfDrag,
  turnTo,
  type KeyPress,
  type NumberKind,
} from '@slewcurve/elements/plot';
import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { anyQuaternion } from '../../support/any-quaternion.js';

fc.configureGlobal({ ...fc.readConfigureGlobal(), seed: 5 });

const DEGREES = 180 / Math.PI;
const press = (key: string, shiftKey = false): KeyPress => ({
  key,
  shiftKey,
  ctrlKey: false,
  metaKey: false,
  altKey: false,
});
const unit = anyQuaternion.map((q): [number, number, number, number] => {
  const size = Math.hypot(...q);
  return [q[0] / size, q[1] / size, q[2] / size, q[3] / size];
});
const kinds: readonly NumberKind[] = ['axis and angle', 'quaternion', ...EULER_SEQUENCES];

describe('a drag on the globe', () => {
  it('turns about y sideways, about x up and down, about z with Shift, half a turn across', () => {
    expect(turnOfDrag(100, 0, 200, false)).toEqual([0, 90, 0]);
    expect(turnOfDrag(0, 20, 200, false)).toEqual([18, 0, 0]);
    expect(turnOfDrag(50, 7, 200, true)).toEqual([0, 0, -45]);
  });
});

describe('the keyboard', () => {
  it('turns by 0.1°, by 1° with Shift, and about z by Page Up and Page Down', () => {
    expect(nudgedTurn(NO_TURN, press('ArrowRight'))).toEqual([0, 0.1, 0]);
    expect(nudgedTurn([1, 2, 3], press('ArrowDown', true))).toEqual([2, 2, 3]);
    expect(nudgedTurn(NO_TURN, press('PageUp'))).toEqual([0, 0, 0.1]);
    expect(nudgedTurn(NO_TURN, press('a'))).toBeUndefined();
  });
});

describe('an orientation by numbers', () => {
  it.each(kinds)('is told and read back within 1e-9 degrees: %s', (kind) => {
    fc.assert(
      fc.property(unit, (orientation) => {
        const numbers = numbersOfOrientation(orientation, kind);
        expect(numbers).toHaveLength(numberNames(kind).length);
        const back = orientationOfNumbers(numbers, kind);
        // Angles go through degrees: a few of float64's last digits of 360.
        expect(angleBetween(back ?? [0, 0, 0, 0], orientation) * DEGREES).toBeLessThan(1e-9);
      }),
      { numRuns: 20 },
    );
  });

  it('says which axis each angle is about, and refuses what tells no orientation', () => {
    expect(numberNames('YXZ')[1]).toBe('second angle, about X, in degrees');
    expect(orientationOfNumbers([0, 0, 0, 0], 'quaternion')).toBeUndefined();
    expect(orientationOfNumbers([0, 0, 0, 10], 'axis and angle')).toBeUndefined();
    expect(orientationOfNumbers([Number.NaN, 0, 0], 'XYZ')).toBeUndefined();
  });

  it('is a matrix that takes own vectors to the parent', () => {
    // A quarter turn about z takes own x to the parent's y.
    expect(matrixText([0, 0, Math.SQRT1_2, Math.SQRT1_2])).toBe(
      [
        ' 0.000000 -1.000000  0.000000  0.000000',
        ' 1.000000  0.000000  0.000000  0.000000',
        ' 0.000000  0.000000  1.000000  0.000000',
        ' 0.000000  0.000000  0.000000  1.000000',
      ].join('\n'),
    );
  });
});

describe('a typed matrix', () => {
  // A quarter turn about z: own x becomes the parent's y. Numbers of the definition, row by row, with a translation of (5, 6, 7).
  const quarter = '0 -1 0 5\n1 0 0 6\n0 0 1 7\n0 0 0 1';

  it.each(MATRIX_ORDERS)('is told and read back within the six decimals that are shown: %s', (order) => {
    fc.assert(
      fc.property(unit, (orientation) => {
        const back = orientationOfMatrix(matrixText(orientation, order), order);
        // Each number is off by 5e-7 at the most, nine of them: 1.5e-6 rad.
        expect(angleBetween(back, orientation)).toBeLessThan(1.5e-6);
      }),
    );
  });

  it('leaves translation and scale out, and takes commas, brackets and a typeset minus', () => {
    const expected = [0, 0, Math.SQRT1_2, Math.SQRT1_2];
    for (const text of [
      quarter,
      '[[0, −1, 0, 5], [1, 0, 0, 6], [0, 0, 1, 7], [0, 0, 0, 1]]',
      '0 -2 0 0; 3 0 0 0; 0 0 4 0; 0 0 0 1',
    ])
      expect(angleBetween(orientationOfMatrix(text, 'row by row'), expected)).toBeLessThan(1e-12);
  });

  it('takes numbers of three decimals', () => {
    const text = '0.866 -0.5 0 0  0.5 0.866 0 0  0 0 1 0  0 0 0 1';
    const thirty = [0, 0, Math.sin(Math.PI / 12), Math.cos(Math.PI / 12)];
    expect(angleBetween(orientationOfMatrix(text, 'row by row'), thirty) * DEGREES).toBeLessThan(0.03);
    // Read in the other order it is the turn back, which numbers alone can't tell: the order is always named.
    const back = orientationOfMatrix(text, 'column by column');
    expect(angleBetween(back, thirty) * DEGREES).toBeCloseTo(60, 1);
  });

  it.each([
    ['matrix.reflected', '-1 0 0 0  0 1 0 0  0 0 1 0  0 0 0 1'],
    ['matrix.sheared', '1 0.1 0 0  0 1 0 0  0 0 1 0  0 0 0 1'],
    ['matrix.flat', '1 0 0 0  0 1 0 0  0 0 0 0  0 0 0 1'],
    ['matrix.bad-length', '1 0 0 0 1 0 0 0 1'],
    ['matrix.bad-length', ''],
    ['matrix.not-a-number', quarter.replace('5', 'five')],
    ['matrix.not-a-number', quarter.replace('5', 'Infinity')],
  ])('is refused as %s: %s', (code, text) => {
    expect(refusal(text, 'row by row').code).toBe(code);
  });

  it('is asked about where the other order fits: a translation stands in its last row', () => {
    const { code, message } = refusal(quarter, 'column by column');
    expect(code).toBe('matrix.last-row');
    expect(message).toMatch(/the last row is 5 6 7 1 .* Is it written row by row\?$/);
  });
});

function refusal(text: string, order: (typeof MATRIX_ORDERS)[number]): SlewcurveError {
  try {
    orientationOfMatrix(text, order);
  } catch (error) {
    if (error instanceof SlewcurveError) return error;
    throw error;
  }
  throw new Error('taken');
}

describe('the turn to a typed orientation', () => {
  it('leads there about own and about parent’s axes, to the last digit that is said', () => {
    fc.assert(
      fc.property(unit, unit, fc.constantFrom('own' as const, 'parent' as const), (from, to, about) => {
        const turn = expMap(
          new Float64Array(4),
          turnTo(from, to, about).map((angle) => angle / DEGREES),
        );
        const there = new Float64Array(4);
        if (about === 'own') multiply(there, from, turn);
        else multiply(there, turn, from);
        // Seven places of degrees are said.
        expect(angleBetween(there, to) * DEGREES).toBeLessThan(2e-7);
      }),
    );
  });
});

describe('what a turn is called', () => {
  it('names its axis and whose it is', () => {
    expect(sayTurn([0, 12.3, 0], 'own')).toBe('12.3° about own y');
    expect(sayTurn([0, 0, -5], 'world')).toBe('−5° about the world’s z');
    expect(sayTurn([3, 4, 0], 'parent')).toBe('5° about (0.6, 0.8, 0) of the parent’s axes');
    expect(sayTurn(NO_TURN, 'parent')).toBe('no turn yet, about its parent’s axes');
  });
});
