import { type RotationTrack, fromAxisAngle, playAs, rotationTrack } from '@slewcurve/core';
import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { applied, codeOf } from '../support/edit-acceptance.js';
import { grid, keyed, keyTimes, motions } from '../support/smooth-track.js';

fc.configureGlobal({ ...fc.readConfigureGlobal(), seed: 6 });

const DEGREES = 180 / Math.PI;
const WAVE = { spin: [20, 35, -10], swing: [25, 10, 15], hertz: 0.4, phase: 1 } as const;

/** A steady turn about one axis in equal steps, its tangents left at zero. */
function stepped(degrees: number, keys: number): RotationTrack {
  const zero = [0, 0, 0, 0];
  const values = Array.from({ length: keys }, (_, key) => [
    ...zero,
    ...fromAxisAngle<number[]>([], [1, 2, 2], (key * degrees) / DEGREES),
    ...zero,
  ]).flat();
  return rotationTrack({ times: grid(keys, 1), values, interpolation: 'CUBICSPLINE' });
}

function valuesOf(track: RotationTrack): Float64Array {
  return track.values.filter((_, i) => i % 12 >= 4 && i % 12 < 8);
}

describe('set tangents', () => {
  it.each([
    [135, 0.004],
    [90, 0.001],
    [30, 1e-4],
  ])('runs a steady turn in steps of %d° with a ripple of at most %f', (degrees, most) => {
    const track = stepped(degrees, 7);
    const { track: after } = applied(track, { verb: 'set tangents' });
    expect(valuesOf(after)).toEqual(valuesOf(track));
    const curve = playAs(after, 'as-written');
    for (let t = 0; t < 6; t += 1 / 64) {
      const speed = Math.hypot(...curve.rate([0, 0, 0], t, 'own')) * DEGREES;
      expect(Math.abs(speed / degrees - 1)).toBeLessThanOrEqual(most);
    }
  });

  it('leaves every value to the bit, zeroes the outer tangents, and comes near those of the motion itself', () => {
    fc.assert(
      fc.property(motions, keyTimes(), (motion, times) => {
        const exact = keyed(motion, times, 'CUBICSPLINE');
        const { track: after } = applied(exact, { verb: 'set tangents' });
        expect(valuesOf(after)).toEqual(valuesOf(exact));
        expect([...after.values.subarray(0, 4)]).toEqual([0, 0, 0, 0]);
        expect([...after.values.subarray(-4)]).toEqual([0, 0, 0, 0]);
      }),
      { numRuns: 30 },
    );
    const dense = keyed(WAVE, grid(60, 60), 'CUBICSPLINE');
    const { track: after } = applied(dense, { verb: 'set tangents' });
    // Inner keys at 60 a second: a secant is second order, 1e-3 of a rate of 1 rad/s.
    for (let i = 12; i < dense.values.length - 12; i++)
      expect(Math.abs(after.values[i] - dense.values[i])).toBeLessThan(2e-3);
  });

  it('weighs uneven gaps by their times: steady motion stays steady', () => {
    const times = [0, 1, 1.1, 2.1, 2.2];
    const values = times.flatMap((t) => [
      0,
      0,
      0,
      0,
      ...fromAxisAngle<number[]>([], [0, 0, 1], (40 * t) / DEGREES),
      0,
      0,
      0,
      0,
    ]);
    const track = rotationTrack({ times, values, interpolation: 'CUBICSPLINE' });
    const curve = playAs(applied(track, { verb: 'set tangents' }).track, 'as-written');
    // RULES pace.lurch: uniform tangents read −47…212 deg/s here, time-weighted ones 39–40.
    for (let t = 0; t < 2.2; t += 0.01) {
      const speed = curve.rate([0, 0, 0], t, 'own')[2] * DEGREES;
      expect(speed).toBeGreaterThan(39);
      expect(speed).toBeLessThan(41);
    }
  });

  it('sets one side of listed keys alone: the unused in-tangent of key 0 becomes zero and nothing plays otherwise', () => {
    const track = keyed(WAVE, grid(8), 'CUBICSPLINE');
    const result = applied(track, { verb: 'set tangents', keys: [0], tangents: 'in' });
    expect(result.changed).toEqual([0]);
    expect([...result.track.values.subarray(0, 4)]).toEqual([0, 0, 0, 0]);
    expect(result.track.values.subarray(4)).toEqual(track.values.subarray(4));
    const out = applied(track, { verb: 'set tangents', keys: [7], tangents: 'out' });
    expect(out.track.values.subarray(0, -4)).toEqual(track.values.subarray(0, -4));
  });

  it('does not look across a cut, and goes by the stored signs as the standard’s cubic does', () => {
    const still = stepped(0, 6);
    const cut = rotationTrack({ ...stepped(45, 6), breaks: [2] });
    const { track: after } = applied(cut, { verb: 'set tangents' });
    const rate = playAs(after, 'as-written').rate([0, 0, 0], 2 - 1e-6, 'own');
    expect(Math.hypot(...rate) * DEGREES).toBeCloseTo(45, 1);
    expect(applied(still, { verb: 'set tangents' }).track).toBe(still);
    const flipped = rotationTrack({
      ...stepped(10, 3),
      values: stepped(10, 3).values.map((part, i) => (Math.floor(i / 12) === 1 ? -part : part)),
    });
    const long = playAs(applied(flipped, { verb: 'set tangents', keys: [0] }).track, 'as-written');
    expect(Math.hypot(...long.rate([0, 0, 0], 0, 'own')) * DEGREES).toBeCloseTo(350, 6);
  });

  it('needs tangents to set', () => {
    expect(codeOf(() => applied(keyed(WAVE, grid(4), 'LINEAR'), { verb: 'set tangents' }))).toBe(
      'step.needs-tangents',
    );
  });
});
