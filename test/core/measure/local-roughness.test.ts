import * as fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { BREAK_KINDS, localRoughness, rotationTrack, type RotationTrack } from '@slewcurve/core';
import { grid, keyed, keyTimes, motions, turned } from '../../support/smooth-track.js';

const DEGREES = 180 / Math.PI;
const FLOAT32 = { component: 'float32', timeComponent: 'float32' } as const;

/** Turn about x by an angle in degrees at each time. */
function hinge(times: readonly number[], angle: (time: number) => number): RotationTrack {
  const values = times.flatMap((time) => {
    const half = angle(time) / 2 / DEGREES;
    return [Math.sin(half), 0, 0, Math.cos(half)];
  });
  return rotationTrack({ times, values, storage: FLOAT32 });
}

function gainsAt(track: RotationTrack, key: number): Record<string, number> {
  const roughness = localRoughness(track);
  roughness.fit(key);
  return Object.fromEntries(BREAK_KINDS.map((kind, i) => [kind, roughness.gains[i]]));
}

function vectorAt(track: RotationTrack, key: number, kind: number): number[] {
  const roughness = localRoughness(track);
  roughness.fit(key);
  return [...roughness.vectors.subarray(3 * kind, 3 * kind + 3)].map((radians) => radians * DEGREES);
}

describe('local roughness', () => {
  test('a lone key explains a plain shelf 8 times, as exact arithmetic says, and the shelf explains it whole', () => {
    const shelf = gainsAt(
      hinge(grid(31), (time) => (time > 0.49 ? 10 : 0)),
      15,
    );
    // Pattern products: shelf·lone = 1 + 12 + 18 + 4 = 35, squares 20 and 70: R/(R − 35²/70 R/20) = 1/(1 − 0.875) = 8.
    expect(shelf['lone-key']).toBeCloseTo(8, 3);
    expect(shelf.shelf).toBeGreaterThan(1e6);
  });

  test('a lone key explains a dead stop 21 times, and the corner explains it whole', () => {
    // Pattern products: corner·lone = 4 + 12 + 4 = 20, squares 6 and 70: 1/(1 − 400/420) = 21.
    const stop = gainsAt(
      hinge(grid(31), (time) => Math.min(time, 0.5) * 60),
      15,
    );
    expect(stop['lone-key']).toBeCloseTo(21, 2);
    expect(stop.corner).toBeGreaterThan(1e6);
  });

  test('the fitted vectors are the offsets that were put in, in own axes', () => {
    const lone = turned(
      hinge(grid(31), (time) => 40 * time),
      [15],
      [3, -4, 5],
    );
    // The window's mean motion is 1.3° a frame; turning by 7° mixes axes by less than a tenth of a degree.
    expect(vectorAt(lone, 15, 0)[0]).toBeCloseTo(3, 0);
    const { 'lone-key': gain } = gainsAt(lone, 15);
    expect(gain).toBeGreaterThan(16);
    const step = hinge(grid(31), (time) => 40 * time + (time > 0.49 ? 6 : 0));
    expect(vectorAt(step, 15, 1)[0]).toBeCloseTo(6, 3);
  });

  test('a motion that is cubic there leaves nothing to explain, on uneven keys too', () => {
    const times = [0, 1, 2.2, 3, 4.1, 5, 6, 7.3, 8, 9, 10.2, 11, 12, 13, 14, 15].map((time) => time / 30);
    const track = hinge(times, (time) => 20 * time - 90 * time ** 2 + 120 * time ** 3);
    const roughness = localRoughness(track);
    expect(roughness.fit(8)).toBe(true);
    // 1e-9 rad: rounding of the quaternions times the weights of the divided differences.
    for (const component of roughness.vectors) expect(Math.abs(component)).toBeLessThan(1e-9);
  });

  test('an uneven shelf is explained by a shelf', () => {
    const times = [0, 1, 2.2, 3, 4.1, 5, 6, 7.3, 8, 9, 10.2, 11, 12, 13, 14, 15].map((time) => time / 30);
    const track = hinge(times, (time) => 30 * time + (time > 0.25 ? 8 : 0));
    expect(vectorAt(track, 8, 1)[0]).toBeCloseTo(8, 6);
    expect(gainsAt(track, 8).shelf).toBeGreaterThan(1e6);
  });

  test('nothing is claimed with fewer than seven positions: the first and last four keys, and beside a break or a hole', () => {
    const track = hinge(grid(31), (time) => 10 * time);
    const roughness = localRoughness(track);
    const claims = [...track.times.keys()].filter((key) => roughness.fit(key));
    expect(claims).toEqual(Array.from({ length: 23 }, (_, i) => i + 4));
    const broken = localRoughness(rotationTrack({ ...track, breaks: [15] }));
    expect([11, 12, 15, 16, 19, 20].map((key) => broken.fit(key))).toEqual([
      true,
      false,
      false,
      false,
      false,
      true,
    ]);
    const times = track.times.map((time) => (time > 0.5 ? time + 0.1 : time));
    const holed = localRoughness(rotationTrack({ ...track, times }));
    expect([11, 12, 15, 16, 19, 20].map((key) => holed.fit(key))).toEqual([
      true,
      false,
      false,
      false,
      false,
      true,
    ]);
  });

  test('in a loop the window wraps, and the first and last key count once', () => {
    const times = grid(31, 30);
    const swing = hinge(times, (time) => 30 * Math.sin(2 * Math.PI * time));
    const track = turned(swing, [0, 30], [5, 0, 0]);
    const open = localRoughness(track);
    expect(open.fit(0)).toBe(false);
    const loop = localRoughness(track, { loop: true });
    expect(loop.fit(0)).toBe(true);
    expect(loop.vectors[0] * DEGREES).toBeCloseTo(5, 0);
    expect(loop.gains[0]).toBeGreaterThan(16);
    expect(loop.candidates(1 / DEGREES)).toContain(0);
  });

  test('a spin of 50° a frame is smooth, although the window turns by more than half a turn', () => {
    const track = hinge(grid(31), (time) => 1500 * time);
    const roughness = localRoughness(track);
    roughness.fit(15);
    for (const component of roughness.vectors) expect(Math.abs(component)).toBeLessThan(1e-9);
  });

  test('signs don’t matter', () => {
    const track = turned(
      hinge(grid(31), (time) => 40 * time),
      [15],
      [3, -4, 5],
    );
    const values = track.values.map((value, i) => (Math.floor(i / 4) % 3 === 0 ? -value : value));
    expect(gainsAt(rotationTrack({ ...track, values }), 15)).toEqual(gainsAt(track, 15));
  });

  test('the cheap bound leaves out no key whose fits could make a jump', () => {
    fc.assert(
      fc.property(
        motions,
        keyTimes(20),
        fc.record({
          key: fc.integer({ min: 5, max: 14 }),
          size: fc.double({ min: 1, max: 150, noNaN: true }),
          tail: fc.boolean(),
          noise: fc.array(fc.double({ min: -0.2, max: 0.2, noNaN: true }), { minLength: 3, maxLength: 40 }),
        }),
        (motion, times, { key, size, tail, noise }) => {
          const smooth = keyed(motion, times, 'LINEAR');
          const keys = tail ? [...smooth.times.keys()].slice(key) : [key];
          const broken = turned(smooth, keys, [size * 0.6, -size * 0.48, size * 0.64]);
          const track = noise.reduce(
            (noisy, angle, k) =>
              turned(
                noisy,
                [k % smooth.times.length],
                [angle, noise[(k + 1) % noise.length], noise[(k + 2) % noise.length]],
              ),
            broken,
          );
          const least = 1 / DEGREES;
          const roughness = localRoughness(track);
          const passed = new Set(roughness.candidates(least, [16, 8]));
          for (let k = 0; k < track.times.length; k++) {
            if (!roughness.fit(k)) continue;
            const { gains, vectors } = roughness;
            const sizes = [Math.hypot(...vectors.subarray(0, 3)), Math.hypot(...vectors.subarray(3, 6))];
            const jump = (gains[0] >= 16 && sizes[0] > least) || (gains[1] >= 8 && sizes[1] > least);
            expect(jump && !passed.has(k)).toBe(false);
          }
        },
      ),
      { seed: 20_261 },
    );
  });
});
