import {
  accelerationFloor,
  angleBetween,
  angleFloor,
  EXACT_STORAGE,
  rateFloor,
  rotationTrack,
  type Storage,
} from '@slewcurve/core';
import { describe, expect, test } from 'vitest';
import { randomQuaternion, seededRandom } from '../../support/seeded-random.js';

const DEGREES = 180 / Math.PI;
const SINGLE: Storage = { component: 'float32', timeComponent: 'float32' };

describe('the angle floor', () => {
  // The table of the rules; int and text rows follow from the step of a component, the float32 row was measured.
  test.each([
    [{ component: 'float32' }, 5.9e-6, 5.9e-6],
    [{ component: 'int16' }, 0.0035, 5e-5],
    [{ component: 'int8' }, 0.9, 5e-3],
    [{ component: 'text', decimals: 4 }, 0.0115, 5e-5],
    [{ component: 'text', decimals: 6 }, 1.15e-4, 5e-7],
  ] as const)('of %o is %f°', (storage, degrees, within) => {
    expect(Math.abs(angleFloor({ ...EXACT_STORAGE, ...storage }) * DEGREES - degrees)).toBeLessThan(within);
  });

  test('of angles as text of 2 decimals is 0.015°', () => {
    const storage: Storage = { ...EXACT_STORAGE, component: 'text', decimals: 2 };
    expect(angleFloor(storage, 'EULER') * DEGREES).toBeCloseTo(0.015, 12);
  });

  test('of a lattice found coarser than the component is the lattice’s', () => {
    expect(angleFloor({ ...SINGLE, lattice: 1 / 127 })).toBe(2 / 127);
    expect(angleFloor({ ...SINGLE, lattice: 1e-12 })).toBe(angleFloor(SINGLE));
  });

  const roundings: readonly (readonly [string, Storage, (part: number) => number])[] = [
    ['float32', SINGLE, Math.fround],
    ['int16', { ...SINGLE, component: 'int16' }, (part) => Math.round(part * 32767) / 32767],
    ['int8', { ...SINGLE, component: 'int8' }, (part) => Math.round(part * 127) / 127],
    ['text of 6 decimals', { ...SINGLE, component: 'text', decimals: 6 }, (part) => Number(part.toFixed(6))],
  ];

  test.each(roundings)(
    'bounds the error of 20,000 orientations rounded to %s, and is not three times too wide',
    (_, storage, round) => {
      const random = seededRandom(11);
      let worst = 0;
      for (let i = 0; i < 20_000; i++) {
        const q = randomQuaternion(random);
        worst = Math.max(worst, angleBetween(q, q.map(round)));
      }
      expect(worst).toBeLessThanOrEqual(angleFloor(storage));
      expect(worst).toBeGreaterThan(angleFloor(storage) / 3);
    },
  );
});

describe('the rate and acceleration floors', () => {
  const HALF = Math.SQRT1_2;
  const track = rotationTrack({
    times: [4, 4.5, 5.5],
    values: [0, 0, 0, 1, 0, 0, HALF, HALF, 0, 0, 1, 0],
    storage: SINGLE,
  });
  const f = angleFloor(SINGLE);

  test('of a segment is 2f/Δt, and its speed times what half a step of stored time adds at either end', () => {
    // Times up to 4.5 s in float32 lie 2^-21 s apart: half a step is 2^-22.
    const due = (2 * f) / 0.5 + ((Math.PI / 2 / 0.5) * 2 * 2 ** -22) / 0.5;
    expect(rateFloor(track, 0) / due).toBeCloseTo(1, 12);
  });

  test('of a key is 4f/Δt², with both gaps where they differ, the one gap twice at the ends', () => {
    expect(accelerationFloor(track, 1)).toBeCloseTo((4 * f) / (0.5 * 1), 15);
    expect(accelerationFloor(track, 0)).toBeCloseTo((4 * f) / 0.25, 15);
    expect(accelerationFloor(track, 2)).toBeCloseTo(4 * f, 15);
  });

  test('a gap that is not positive, or not there, claims nothing: the floor is infinite', () => {
    const single = rotationTrack({ times: [0], values: [0, 0, 0, 1] });
    expect(rateFloor(single, 0)).toBe(Infinity);
    expect(accelerationFloor(single, 0)).toBe(Infinity);
  });
});
