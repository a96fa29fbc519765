import { playAs } from '@slewcurve/core';
import { curveMotion, differenceColumns, segmentAt } from '@slewcurve/elements/plot';
import * as fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { popped, turning } from '../support/tracks-for-elements.js';

// float32 columns: 6e-8 of the value, so 1e-4 deg/s at 150.
const FLOAT32 = 4;

describe('the motion of a curve', () => {
  const motion = curveMotion(playAs(popped(), 'as-written'));

  test('reads 10° in 0.1 s as 100 deg/s about own y, and counts the way', () => {
    const reading = motion.read(0.55);
    expect(reading.speed).toBeCloseTo(100, 9);
    expect(reading.own[1]).toBeCloseTo(100, 9);
    expect(reading.odometer).toBeCloseTo(55, 9);
  });

  test('shows the pop of one key at every width', () => {
    for (const count of [1, 2, 3, 7, 30, 31, 300, 1000]) {
      const { greatest } = motion.columns(motion.start, motion.end, count);
      expect(Math.max(...greatest), `${count} columns`).toBeCloseTo(150, FLOAT32);
    }
  });

  test('shows the pop of one key in any window that holds its segment', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 0, max: 1.1, noNaN: true }),
        fc.double({ min: 1.2, max: 3, noNaN: true }),
        fc.integer({ min: 1, max: 500 }),
        (from, to, count) => {
          expect(Math.max(...motion.columns(from, to, count).greatest)).toBeCloseTo(150, FLOAT32);
        },
      ),
    );
  });

  test('keeps the least speed of a column too', () => {
    expect(motion.columns(1, 1.4, 1).least[0]).toBeCloseTo(50, FLOAT32);
  });

  test('has no speed where there is no motion', () => {
    expect([...motion.columns(10, 12, 4).greatest]).toEqual([0, 0, 0, 0]);
    const one = curveMotion(playAs(turning([30]), 'as-written'));
    expect([...one.columns(0, 1, 3).greatest]).toEqual([0, 0, 0]);
    expect(one.read(0).speed).toBe(0);
  });

  test('differs from itself by nothing and from the repaired one by the pop', () => {
    const repaired = curveMotion(playAs(turning(Array.from({ length: 31 }, (_, i) => i * 10)), 'as-written'));
    expect(Math.max(...differenceColumns(motion, motion, 0, 3, 100))).toBe(0);
    const apart = differenceColumns(motion, repaired, 0, 3, 300, 3);
    // Read at 900 moments: the top of the tent, 5°, is met to within a sixth of a hundredth of a second, 0.09°.
    expect(Math.max(...apart)).toBeGreaterThan(4.9);
    expect(Math.max(...apart)).toBeLessThanOrEqual(5.000001);
    expect(apart[0]).toBeLessThan(1e-9);
  });

  test('draws the same whether it was measured ahead, in one go or in slices, or not at all', () => {
    const long = playAs(turning(Array.from({ length: 4000 }, (_, i) => (i * 7) % 150)), 'as-written');
    const [sliced, whole, never] = [curveMotion(long), curveMotion(long), curveMotion(long)];
    let slices = 1;
    for (; !sliced.prepare(1); slices++) expect(slices).toBeLessThan(100_000);
    expect(whole.prepare(1e6)).toBe(true);
    for (const each of [sliced, whole]) expect(each.columns(3, 390, 120)).toEqual(never.columns(3, 390, 120));
    expect(sliced.read(200).odometer).toBe(never.read(200).odometer);
  });

  test('finds a segment: the later one at a knot, the last at the end', () => {
    expect([-1, 0, 0.5, 1, 2, 9].map((t) => segmentAt([0, 1, 2], t))).toEqual([0, 0, 0, 1, 1, 1]);
  });
});
