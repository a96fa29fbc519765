import { normalise, rotationSpline, rotationTrack, storedTrack } from '@slewcurve/core';
import { squadSampler } from '@slewcurve/core/sampler';
import * as fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { degreesBetween } from '../../support/degrees-between.js';

const number = fc.double({ min: -1, max: 1, noNaN: true });
const orientation = fc.tuple(number, number, number, number).filter((q) => Math.hypot(...q) > 0.1);
const gap = fc.oneof(fc.constant(1 / 30), fc.double({ min: 0.01, max: 2, noNaN: true }));

describe.each(['uniform', 'secant', 'three-point'] as const)('a sampled squad, %s rates', (rates) => {
  test.each([
    ['keys near each other', 0.3],
    ['keys anywhere', 10],
  ])('is within 1e-13 degrees of the exact curve: %s', (_, reach) => {
    fc.assert(
      fc.property(
        fc.array(fc.tuple(gap, orientation), { minLength: 1, maxLength: 12 }),
        fc.boolean(),
        fc.boolean(),
        (list, loop, cut) => {
          let time = -1;
          const times = list.map(([step]) => (time += step));
          const values = list.flatMap(([, q]) => {
            const [x, y, z, w] = normalise([0, 0, 0, 0], q);
            return reach > 1
              ? [x, y, z, w]
              : [...normalise([0, 0, 0, 0], [x * reach, y * reach, z * reach, 1])];
          });
          const track = rotationTrack({ times, values, breaks: cut && list.length > 4 ? [2] : [] });
          const curve = rotationSpline(track, { kind: 'squad', rates, loop });
          const { sample, start, end } = squadSampler(track, { rates, loop });
          expect([start, end]).toEqual([curve.start, curve.end]);
          const [mine, exact] = [new Float64Array(4), new Float64Array(4)];
          let worst = 0;
          for (let n = -1; n <= 60; n++) {
            const t = start + ((end - start) * n) / 59;
            worst = Math.max(worst, degreesBetween(sample(t, mine), curve.orientation(exact, t)));
          }
          expect(worst).toBeLessThanOrEqual(1e-13);
        },
      ),
      { seed: 61 },
    );
  });
});

describe('a sampled squad', () => {
  const track = rotationTrack({ times: [0, 1, 3], values: [0, 0, 0, 1, 0, 0.6, 0, 0.8, 0.6, 0, 0, 0.8] });
  const { sample, sampleMany } = squadSampler(track, { rates: 'secant' });

  test('gives its keys to the bit, holds the first and the last, and the first for a time that is no number', () => {
    expect([0, -5, NaN].map((t) => sample(t, []))).toEqual([0, 1, 2].map(() => [0, 0, 0, 1]));
    expect(sample(1, [])).toEqual([0, 0.6, 0, 0.8]);
    expect([3, 4, Infinity].map((t) => sample(t, []))).toEqual([0, 1, 2].map(() => [0.6, 0, 0, 0.8]));
  });

  test('at many times is one after the other', () => {
    expect(sampleMany([0.5, 2], [])).toEqual([...sample(0.5, []), ...sample(2, [])]);
  });

  test('of no key is identity, of one key stands still', () => {
    const none = squadSampler(storedTrack({ times: [], values: [] }), { rates: 'secant' });
    expect([none.start, none.end, none.sample(1, [])]).toEqual([0, 0, [0, 0, 0, 1]]);
    const one = squadSampler(rotationTrack({ times: [2], values: [0, 0.6, 0, 0.8] }), { rates: 'secant' });
    expect([one.start, one.end, one.sample(5, [])]).toEqual([2, 2, [0, 0.6, 0, 0.8]]);
  });
});
