import { angleBetween, keyOrientation, playAs, rotationTrack } from '@slewcurve/core';
import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { applied, codeOf, numbersOf } from '../support/edit-acceptance.js';
import { grid, keyed, smoothTracks } from '../support/smooth-track.js';

fc.configureGlobal({ ...fc.readConfigureGlobal(), seed: 2 });

const DEGREES = 180 / Math.PI;
const WAVE = { spin: [20, 35, -10], swing: [25, 10, 15], hertz: 0.4, phase: 1 } as const;

function lengthOf(numbers: readonly number[]): number {
  return Math.hypot(...(numbers.length === 12 ? numbers.slice(4, 8) : numbers));
}

describe('normalise', () => {
  it('makes every key unit and leaves every angle to 1e-7°', () => {
    fc.assert(
      fc.property(
        smoothTracks,
        fc.array(fc.double({ min: 0.5, max: 2, noNaN: true }), { minLength: 40, maxLength: 40 }),
        (smooth, lengths) => {
          const size = smooth.values.length / smooth.times.length;
          const values = smooth.values.map((number, i) => number * lengths[Math.floor(i / size)]);
          const track = rotationTrack({ ...smooth, values });
          const { track: after, largest } = applied(track, { verb: 'normalise' });
          expect(largest).toBeLessThanOrEqual(1e-7);
          const [p, q] = [new Float64Array(4), new Float64Array(4)];
          for (let key = 0; key < track.times.length; key++) {
            // Four squares and a root: 2 eps.
            expect(Math.abs(lengthOf(numbersOf(after, key)) - 1)).toBeLessThanOrEqual(5e-16);
            expect(
              angleBetween(keyOrientation(p, track, key), keyOrientation(q, after, key)) * DEGREES,
            ).toBeLessThanOrEqual(1e-7);
          }
        },
      ),
    );
  });

  it('of a whole track touches only keys that are off by more than the storage rounds; listed ones always', () => {
    const smooth = keyed(WAVE, grid(20), 'LINEAR');
    const values = smooth.values.map((n, i) => Math.round(n * (i >> 2 === 7 ? 1.01 : 1) * 32767) / 32767);
    const storage = { component: 'int16', timeComponent: 'float32' } as const;
    const track = rotationTrack({ ...smooth, values, storage });
    expect(applied(track, { verb: 'normalise' }).changed).toEqual([7]);
    expect(applied(track, { verb: 'normalise', keys: [3] }).changed).toEqual([3]);
    expect(codeOf(() => applied(track, { verb: 'normalise', keys: [7], keep: [7] }))).toBe(
      'step.nothing-left',
    );
  });

  it('NEEDS A22: a key of length 1.0011 plays the same before and after', () => {
    const smooth = keyed(WAVE, grid(10), 'LINEAR');
    const track = rotationTrack({ ...smooth, values: smooth.values.map((n) => n * 1.0011) });
    const { track: after, span } = applied(track, { verb: 'normalise' });
    expect(span).toBeUndefined();
    const [was, is] = [playAs(track, 'as-written'), playAs(after, 'as-written')];
    for (let time = 0; time < 0.3; time += 0.007)
      expect(
        angleBetween(was.orientation(new Float64Array(4), time), is.orientation(new Float64Array(4), time)) *
          DEGREES,
      ).toBeLessThanOrEqual(1e-7);
  });

  it('under CUBICSPLINE keeps the rate at the key', () => {
    const smooth = keyed(WAVE, grid(10), 'CUBICSPLINE');
    const values = smooth.values.map((n, i) => n * (Math.floor(i / 12) === 4 ? 1.5 : 1));
    const track = rotationTrack({ ...smooth, values });
    const { track: after, changed, span } = applied(track, { verb: 'normalise' });
    expect(changed).toEqual([4]);
    expect(span).toEqual([track.times[3], track.times[5]]);
    const rate = (of: typeof track): Float64Array =>
      playAs(of, 'as-written').rate(new Float64Array(3), of.times[4], 'own');
    rate(track).forEach((component, i) => expect(rate(after)[i]).toBeCloseTo(component, 12));
  });

  it('refuses a listed key that has no direction, and passes over it in a whole track', () => {
    const smooth = keyed(WAVE, grid(8), 'LINEAR');
    for (const bad of [0, NaN, Infinity]) {
      const values = smooth.values.map((n, i) => (i >> 2 === 2 ? bad : i >> 2 === 5 ? 2 * n : n));
      const track = { ...smooth, values };
      expect(codeOf(() => applied(track, { verb: 'normalise', keys: [2] }))).toBe('step.no-direction');
      expect(applied(track, { verb: 'normalise' }).changed).toEqual([5]);
    }
  });
});
