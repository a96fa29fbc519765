import {
  STORAGE_MODELS,
  type StorageModel,
  angleBetween,
  angleFloor,
  keyOrientation,
  packed,
  playAs,
  rotationTrack,
} from '@slewcurve/core';
import * as fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { anyQuaternion } from '../../support/any-quaternion.js';
import { randomQuaternion, seededRandom } from '../../support/seeded-random.js';
import { grid, smoothTracks } from '../../support/smooth-track.js';

fc.configureGlobal({ ...fc.readConfigureGlobal(), seed: 6 });

const DEGREES = 180 / Math.PI;

/** Error of each of some poses once stored by a model, degrees. */
function errorsOf(model: StorageModel, poses: readonly (readonly number[])[]): number[] {
  const track = rotationTrack({ times: grid(poses.length), values: poses.flat() });
  const after = packed(track, model);
  return poses.map((pose, key) => angleBetween(pose, keyOrientation([0, 0, 0, 1], after, key)) * DEGREES);
}

function floorOf(model: StorageModel): number {
  const { storage } = packed(rotationTrack({ times: [0], values: [0, 0, 0, 1] }), model);
  return angleFloor(storage) * DEGREES;
}

describe('packed', () => {
  test.each(STORAGE_MODELS)(
    'NEEDS A11: over 60 random poses stored as %s the noise floor is never exceeded and is at most 3 times the largest error seen',
    (model) => {
      const random = seededRandom(60);
      const errors = errorsOf(
        model,
        Array.from({ length: 60 }, () => randomQuaternion(random)),
      );
      const worst = Math.max(...errors);
      expect(worst).toBeLessThanOrEqual(floorOf(model));
      expect(floorOf(model)).toBeLessThanOrEqual(3 * worst);
    },
  );

  // Floors: MATHS 6.3, 2√6/(2^b − 1) rad; rms measured there over 4 million rotations.
  test.each([
    ['smallest-three-8', 1.1008, 0.3547],
    ['smallest-three-10', 0.2744, 0.0884],
    ['smallest-three-16', 0.00428, 0.00138],
    ['int16', 0.0034972, 0.00175],
    ['int8', 0.9023, 0.451],
  ] as const)('%s has the floor of its table, and its rms over 20,000 random poses', (model, floor, rms) => {
    expect(floorOf(model)).toBeCloseTo(floor, 3);
    const random = seededRandom(63);
    const errors = errorsOf(
      model,
      Array.from({ length: 20_000 }, () => randomQuaternion(random)),
    );
    const measured = Math.sqrt(errors.reduce((sum, error) => sum + error ** 2, 0) / errors.length);
    // 20,000 squares scatter their root mean by under 1 %.
    expect(Math.abs(measured / rms - 1)).toBeLessThan(0.02);
    expect(Math.max(...errors)).toBeLessThanOrEqual(floorOf(model));
  });

  test('smallest three of 10 bits is off by 0.08° in the mean and 0.25° at worst, as a public coder says; identity by 0.137°', () => {
    const random = seededRandom(10);
    const errors = errorsOf(
      'smallest-three-10',
      Array.from({ length: 20_000 }, () => randomQuaternion(random)),
    );
    // jpreiss/quatcompress states mean 0.08° and worst 0.25° of random rotations.
    expect(errors.reduce((sum, error) => sum + error, 0) / errors.length).toBeCloseTo(0.08, 2);
    expect(Math.max(...errors)).toBeCloseTo(0.25, 1);
    expect(errorsOf('smallest-three-10', [[0, 0, 0, 1]])[0]).toBeCloseTo(0.137, 3);
  });

  test('no pose is off by more than the floor, whatever the components', () => {
    fc.assert(
      fc.property(anyQuaternion, fc.constantFrom(...STORAGE_MODELS), (pose, model) => {
        expect(errorsOf(model, [pose])[0]).toBeLessThanOrEqual(floorOf(model) * (1 + 1e-9));
      }),
      { numRuns: 300 },
    );
  });

  test('keeps times; what float32 and integers stored once they store alike; a cubic ends within the floor', () => {
    fc.assert(
      fc.property(smoothTracks, fc.constantFrom(...STORAGE_MODELS), (track, model) => {
        const once = packed(track, model);
        expect(once.times).toBe(track.times);
        const again = model.startsWith('smallest') ? once : packed(once, model);
        expect(again.values).toEqual(once.values);
        const [was, is] = [playAs(track, 'as-written'), playAs(once, 'as-written')];
        const apart = angleBetween(was.orientation([], was.end), is.orientation([], is.end)) * DEGREES;
        expect(apart).toBeLessThanOrEqual(floorOf(model) * (1 + 1e-9));
      }),
      { numRuns: 50 },
    );
  });

  test('angles become the orientations of their keys', () => {
    const angles = rotationTrack({
      times: [0, 1],
      values: [0.1, 0.2, 0.3, 1, 2, 3],
      interpolation: 'EULER',
      sequence: 'ZXY',
    });
    const after = packed(angles, 'int16');
    expect(after.interpolation).toBe('LINEAR');
    for (const key of [0, 1])
      expect(
        angleBetween(keyOrientation([0, 0, 0, 1], angles, key), keyOrientation([0, 0, 0, 1], after, key)) *
          DEGREES,
      ).toBeLessThan(0.0035);
  });
});
