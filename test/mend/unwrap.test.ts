import {
  EULER_SEQUENCES,
  type RotationTrack,
  angleBetween,
  keyOrientation,
  playAs,
  storedTrack,
} from '@slewcurve/core';
import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { applied, codeOf } from '../support/edit-acceptance.js';
import { grid } from '../support/smooth-track.js';

fc.configureGlobal({ ...fc.readConfigureGlobal(), seed: 6 });

const DEGREES = 180 / Math.PI;

function angles(degrees: readonly (readonly number[])[], sequence = 'XYZ'): RotationTrack {
  return storedTrack({
    times: grid(degrees.length),
    values: degrees.flat().map((angle) => angle / DEGREES),
    interpolation: 'EULER',
    sequence,
  });
}

function degreesOf(track: RotationTrack): number[][] {
  return Array.from(track.times, (_, key) =>
    [...track.values.subarray(3 * key, 3 * key + 3)].map((angle) => Math.round(angle * DEGREES * 1e9) / 1e9),
  );
}

function length(track: RotationTrack): number {
  return playAs(track, 'as-written').length(0, 0.1) * DEGREES;
}

describe('unwrap', () => {
  it('goes on past 360 where a channel jumped: 10° of blur for 350°', () => {
    const track = angles([
      [355, 0, 0],
      [358, 0, 0],
      [1, 0, 0],
      [4, 0, 0],
    ]);
    const result = applied(track, { verb: 'unwrap', keys: [2] });
    expect(degreesOf(result.track)).toEqual([
      [355, 0, 0],
      [358, 0, 0],
      [361, 0, 0],
      [364, 0, 0],
    ]);
    expect(length(track)).toBeCloseTo(3 + 357 + 3, 6);
    expect(length(result.track)).toBeCloseTo(9, 6);
    expect(result.changed).toEqual([2, 3]);
  });

  it('takes the other triple where that is nearer, and comes back', () => {
    const track = angles([
      [10, 80, 0],
      [190, 99, 180],
      [12, 82, 0],
    ]);
    expect(degreesOf(applied(track, { verb: 'unwrap' }).track)).toEqual([
      [10, 80, 0],
      [10, 81, 0],
      [12, 82, 0],
    ]);
  });

  it('moves no orientation by more than 1e-5°, and leaves no jump, in any of the 24 sequences', () => {
    const key = fc.tuple(
      fc.tuple(...[0, 1, 2].map(() => fc.double({ min: -20, max: 20, noNaN: true }))),
      fc.tuple(...[0, 1, 2].map(() => fc.integer({ min: -2, max: 2 }))),
      fc.boolean(),
    );
    const tracks = fc.tuple(
      fc.constantFrom(...EULER_SEQUENCES),
      fc.array(key, { minLength: 3, maxLength: 20 }),
    );
    fc.assert(
      fc.property(tracks, ([sequence, keys]) => {
        const two = sequence[0] === sequence[2];
        let at = [5, two ? 60 : 0, -10];
        const smooth: number[][] = [];
        const broken = keys.map(([step, turns, isOther]) => {
          at = at.map((angle, i) => (i === 1 ? (two ? 60 : 0) + step[i] : angle + step[i]));
          smooth.push(at);
          const [a, b, c] = at;
          const triple = isOther ? [a + 180, two ? -b : 180 - b, c + 180] : at;
          return triple.map((angle, i) => angle + 360 * turns[i]);
        });
        const track = angles(broken, sequence);
        const { track: after } = applied(track, { verb: 'unwrap' });
        const whole = [0, 1, 2].map(
          (i) => Math.round((after.values[i] * DEGREES - smooth[0][i]) / 360) * 360,
        );
        track.times.forEach((_, n) => {
          const turned = angleBetween(
            keyOrientation([0, 0, 0, 1], track, n),
            keyOrientation([0, 0, 0, 1], after, n),
          );
          expect(turned * DEGREES).toBeLessThanOrEqual(1e-5);
        });
        // Which of the two triples the first key has is left; from there it goes on without a jump.
        const jumps = Array.from(after.values, (angle, i) =>
          keys[0][2] ? 0 : angle * DEGREES - whole[i % 3] - smooth[Math.floor(i / 3)][i % 3],
        );
        expect(Math.max(...jumps.map(Math.abs))).toBeLessThan(1e-6);
      }),
    );
  });

  it('leaves turns that are meant alone where keys are listed, and ends at a kept key', () => {
    const track = angles([
      [0, 0, 0],
      [200, 0, 0],
      [400, 0, 0],
      [241, 0, 0],
      [250, 0, 0],
    ]);
    expect(degreesOf(applied(track, { verb: 'unwrap', keys: [3] }).track).map(([x]) => x)).toEqual([
      0,
      200,
      400,
      241 + 0,
      250,
    ]);
    const wrapped = angles([
      [350, 0, 0],
      [5, 0, 0],
      [15, 0, 0],
      [25, 0, 0],
    ]);
    const kept = applied(wrapped, { verb: 'unwrap', keys: [1], keep: [3] });
    expect(degreesOf(kept.track).map(([x]) => x)).toEqual([350, 365, 375, 25]);
  });

  it('passes over holes, and needs angles', () => {
    const track = angles([
      [350, 0, 0],
      [NaN, 0, 0],
      [5, 0, 0],
    ]);
    expect(degreesOf(applied(track, { verb: 'unwrap' }).track)[2]).toEqual([365, 0, 0]);
    const quaternions = storedTrack({ times: [0, 1], values: [0, 0, 0, 1, 0, 0, 0, -1] });
    expect(codeOf(() => applied(quaternions, { verb: 'unwrap' }))).toBe('step.needs-angles');
  });
});
