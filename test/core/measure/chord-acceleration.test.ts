import { measure, playAs, rotationTrack } from '@slewcurve/core';
import { describe, expect, test } from 'vitest';
import { randomQuaternion, seededRandom } from '../../support/seeded-random.js';

describe.each([
  ['small', 0.01],
  ['of every size', 10],
] as const)('the accelerations of chords between turns %s', (_, reach) => {
  test.each(['chord', 'raw-chord'] as const)('are those of a dense sum: %s', (id) => {
    const random = seededRandom(31);
    for (let n = 0; n < 12; n++) {
      const [x, y, z, w] = randomQuaternion(random);
      const near = [x * reach, y * reach, z * reach, 1 + Math.abs(w)].map(
        (part, _i, all) => part / Math.hypot(...all),
      );
      const track = rotationTrack({ times: [0, 0.3 + random()], values: [0, 0, 0, 1, ...near] });
      const curve = playAs(track, id);
      const { peakAcceleration, peakAccelerationAt, rmsAcceleration } = measure(curve);
      // Midpoint sums of 20,000 steps: the error is of the order of the step's square.
      const steps = 20_000;
      let squares = 0;
      let most = 0;
      for (let i = 0; i < steps; i++) {
        const size = Math.hypot(...curve.acceleration<number[]>([], (curve.end * (i + 0.5)) / steps, 'own'));
        squares += size ** 2 / steps;
        most = Math.max(most, size);
      }
      expect(rmsAcceleration / Math.sqrt(squares)).toBeCloseTo(1, 6);
      expect(peakAcceleration / most).toBeCloseTo(1, 3);
      const at = Math.min(peakAccelerationAt, curve.end * (1 - 1e-15));
      const there = Math.hypot(...curve.acceleration<number[]>([], at, 'own'));
      expect(there / peakAcceleration).toBeCloseTo(1, 9);
    }
  });
});

test('a chord between equal keys has no acceleration', () => {
  const curve = playAs(rotationTrack({ times: [0, 1], values: [0, 0.6, 0, 0.8, 0, 0.6, 0, 0.8] }), 'chord');
  expect(measure(curve)).toMatchObject({ peakAcceleration: 0, rmsAcceleration: 0 });
});
