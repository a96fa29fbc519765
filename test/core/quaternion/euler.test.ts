import {
  angleBetween,
  EULER_SEQUENCES,
  eulerSequence,
  fromAxisAngle,
  fromEuler,
  multiply,
  poleDistance,
  SlewcurveError,
  toEuler,
  unwrapEuler,
} from '@slewcurve/core';
import * as fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { anyQuaternion } from '../../support/any-quaternion.js';

const angle = fc.double({ min: -10, max: 10, noNaN: true });
const AXES = { x: [1, 0, 0], y: [0, 1, 0], z: [0, 0, 1] };

/** The turns of a sequence one after the other, by its definition alone. */
function byDefinition(angles: readonly number[], sequence: string): number[] {
  const q = [0, 0, 0, 1];
  Array.from(sequence).forEach((letter, n) => {
    const key = letter.toLowerCase();
    if (key !== 'x' && key !== 'y' && key !== 'z') throw new Error(letter);
    const turn = fromAxisAngle([0, 0, 0, 0], AXES[key], angles[n]);
    if (letter === key) multiply(q, turn, q);
    else multiply(q, q, turn);
  });
  return q;
}

describe.each(EULER_SEQUENCES)('angles about %s', (sequence) => {
  test('are the three turns one after the other', () => {
    fc.assert(
      fc.property(angle, angle, angle, (a, b, c) => {
        const q = fromEuler([0, 0, 0, 0], [a, b, c], sequence);
        // Six factors and sums of numbers up to 1.
        expect(angleBetween(q, byDefinition([a, b, c], sequence))).toBeLessThan(4e-15);
      }),
      { seed: 1 },
    );
  });

  test('come back as the same orientation, at the pole too', () => {
    fc.assert(
      fc.property(
        angle,
        fc.constantFrom(-1, 0, 0.5, 1, 2),
        fc.constantFrom(0, 1e-14, 1e-9, 0.3),
        angle,
        (a, m, off, c) => {
          const q = fromEuler([0, 0, 0, 0], [a, (m * Math.PI) / 2 + off, c], sequence);
          const back = fromEuler([0, 0, 0, 0], toEuler([0, 0, 0], q, sequence), sequence);
          // Nearer to the pole than 1e-12 rad the outer angles merge, which moves the orientation by as much.
          expect(angleBetween(q, back)).toBeLessThan(2e-12);
        },
      ),
      { seed: 2 },
    );
  });

  test('are principal: the middle one within its half turn, the others in (-180°, 180°]', () => {
    fc.assert(
      fc.property(anyQuaternion, (q) => {
        const [first, middle, last] = toEuler([0, 0, 0], q, sequence);
        const two = sequence[0] === sequence[2];
        expect(middle).toBeGreaterThanOrEqual(two ? 0 : -Math.PI / 2);
        expect(middle).toBeLessThanOrEqual(two ? Math.PI : Math.PI / 2);
        for (const outer of [first, last]) {
          expect(outer).toBeGreaterThan(-Math.PI);
          expect(outer).toBeLessThanOrEqual(Math.PI);
        }
      }),
      { seed: 3 },
    );
  });

  test('at the pole leave the third at 0, and poleDistance tells', () => {
    const two = sequence[0] === sequence[2];
    for (const pole of two ? [0, Math.PI] : [Math.PI / 2, -Math.PI / 2]) {
      const q = fromEuler([0, 0, 0, 0], [0.4, pole, 1.1], sequence);
      const angles = toEuler([0, 0, 0], q, sequence);
      expect(Math.abs(angles[2])).toBeLessThan(1e-15);
      // Half an ulp of π is what the middle angle can be off.
      expect(poleDistance(angles, sequence)).toBeLessThan(5e-16);
      expect(angleBetween(fromEuler([0, 0, 0, 0], angles, sequence), q)).toBeLessThan(4e-15);
    }
    expect(poleDistance([0, (two ? 0 : Math.PI / 2) + 0.01, 0], sequence)).toBeCloseTo(0.01, 14);
  });

  test('unwrapped follow angles that grow past whole turns, through the pole', () => {
    const two = sequence[0] === sequence[2];
    const frames = Array.from({ length: 200 }, (_, n) => [
      0.05 * n,
      (two ? 0 : Math.PI / 2) + 0.021 * (n - 100),
      -0.04 * n,
    ]);
    const principal = frames
      .map((frame) => toEuler([0, 0, 0], fromEuler([0, 0, 0, 0], frame, sequence), sequence))
      .flat();
    principal.splice(0, 3, ...frames[0]);
    const found = unwrapEuler([], principal, sequence);
    const worst = Math.max(...frames.flat().map((value, n) => Math.abs(value - found[n])));
    // Frame 100 stands at the pole: the free one of sum and difference goes by 0.09 rad a frame, half of it to each angle.
    expect(worst).toBeLessThan(0.0451);
    const others = frames
      .flat()
      .map((value, n) => (Math.floor(n / 3) === 100 ? 0 : Math.abs(value - found[n])));
    // 1e-15 rad of rounding over the sine of the smallest distance from the pole, 0.021 rad.
    expect(Math.max(...others)).toBeLessThan(1e-12);
    for (let n = 0; n < frames.length; n++)
      expect(
        angleBetween(
          fromEuler([0, 0, 0, 0], found.slice(3 * n, 3 * n + 3), sequence),
          fromEuler([0, 0, 0, 0], frames[n], sequence),
        ),
      ).toBeLessThan(1e-13);
  });
});

test('three pages of the NASA table are what the half-angle products give', () => {
  // D. M. Henderson, NASA TM-74839 (July 1977), appendix A, pages A-2 (X·Y·Z), A-6 (Y·X·Z), A-11 (Z·Y·X); scalar first.
  const [a, b, c] = [0.7, -1.1, 2.3];
  const [s1, s2, s3] = [a, b, c].map((value) => Math.sin(value / 2));
  const [c1, c2, c3] = [a, b, c].map((value) => Math.cos(value / 2));
  const pages: readonly (readonly [string, number[]])[] = [
    [
      'XYZ',
      [
        -s1 * s2 * s3 + c1 * c2 * c3,
        s1 * c2 * c3 + s2 * s3 * c1,
        -s1 * s3 * c2 + s2 * c1 * c3,
        s1 * s2 * c3 + s3 * c1 * c2,
      ],
    ],
    [
      'YXZ',
      [
        s1 * s2 * s3 + c1 * c2 * c3,
        s1 * s3 * c2 + s2 * c1 * c3,
        s1 * c2 * c3 - s2 * s3 * c1,
        -s1 * s2 * c3 + s3 * c1 * c2,
      ],
    ],
    [
      'ZYX',
      [
        s1 * s2 * s3 + c1 * c2 * c3,
        -s1 * s2 * c3 + s3 * c1 * c2,
        s1 * s3 * c2 + s2 * c1 * c3,
        s1 * c2 * c3 - s2 * s3 * c1,
      ],
    ],
  ];
  for (const [sequence, [w, x, y, z]] of pages)
    expect(angleBetween(fromEuler([0, 0, 0, 0], [a, b, c], sequence), [x, y, z, w])).toBeLessThan(1e-15);
});

test('A16: a smooth rotation written as each of the 24 sequences and read back keeps its steps to 1e-12 rad', () => {
  for (const sequence of EULER_SEQUENCES) {
    const truth = Array.from({ length: 240 }, (_, n) =>
      byDefinition([Math.sin(n / 20) * 3, Math.cos(n / 31) * 2, n / 25], 'XYZ'),
    );
    const angles = unwrapEuler([], truth.map((q) => toEuler([0, 0, 0], q, sequence)).flat(), sequence);
    for (let n = 0; n < truth.length; n++)
      expect(
        angleBetween(fromEuler([0, 0, 0, 0], angles.slice(3 * n, 3 * n + 3), sequence), truth[n]),
      ).toBeLessThan(1e-12);
  }
});

test('a sequence that is not one of the 24 is refused by name', () => {
  expect(eulerSequence('ZXY')).toBe('ZXY');
  for (const text of ['XXY', 'XYy', 'abc', 'XY', '']) {
    expect(() => eulerSequence(text)).toThrow(SlewcurveError);
    expect(() => eulerSequence(text)).toThrow(expect.objectContaining({ code: 'euler.unknown-sequence' }));
  }
});
