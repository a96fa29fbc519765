import { type RotationTrack, angleBetween, playAs, rotationTrack } from '@slewcurve/core';
import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { anyTrack } from '../support/any-track.js';
import { applied, codeOf } from '../support/edit-acceptance.js';
import { grid, keyed, keyTimes, motions } from '../support/smooth-track.js';

fc.configureGlobal({ ...fc.readConfigureGlobal(), seed: 6 });

const DEGREES = 180 / Math.PI;
const WAVE = { spin: [20, 35, -10], swing: [25, 10, 15], hertz: 0.4, phase: 1 } as const;

/** Largest distance of two tracks as written, at 31 odd places a segment of the finer one, degrees. */
function apart(a: RotationTrack, b: RotationTrack): number {
  const [was, is] = [playAs(a, 'as-written'), playAs(b, 'as-written')];
  const { times } = a.times.length > b.times.length ? a : b;
  let most = 0;
  for (let key = 0; key + 1 < times.length; key++)
    for (let part = 0; part < 31; part++) {
      const t = times[key] + ((times[key + 1] - times[key]) * (part + 0.37)) / 31;
      most = Math.max(most, angleBetween(was.orientation([], t), is.orientation([], t)) * DEGREES);
    }
  return most;
}

describe('convert', () => {
  it('plays LINEAR keys as cubics within the stated angle, whatever the steps, every old key and time kept', () => {
    const cases = fc.tuple(anyTrack(2.6), fc.constantFrom(0.001, 0.01, 0.5));
    fc.assert(
      fc.property(cases, ([track, within]) => {
        const result = applied(track, { verb: 'convert', interpolation: 'CUBICSPLINE', within });
        expect(result.track.interpolation).toBe('CUBICSPLINE');
        expect(apart(track, result.track)).toBeLessThanOrEqual(within);
        expect(result.oldKeys?.filter((old) => old >= 0)).toEqual([...track.times.keys()]);
        expect(result.largest).toBeLessThan(1e-12);
      }),
    );
  });

  it('keeps a corner a corner: the speed jumps at the key as it did', () => {
    const track = rotationTrack({
      times: [0, 1, 2],
      values: [0, 0, 0, 1, 0, 0, 0.5, Math.sqrt(0.75), 0, 0, 0.5, Math.sqrt(0.75)],
    });
    const cubic = playAs(
      applied(track, { verb: 'convert', interpolation: 'CUBICSPLINE' }).track,
      'as-written',
    );
    expect(cubic.rate([0, 0, 0], 1 - 1e-6, 'own')[2] * DEGREES).toBeCloseTo(60, 3);
    expect(cubic.rate([0, 0, 0], 1 + 1e-6, 'own')[2] * DEGREES).toBeCloseTo(0, 3);
  });

  it('bakes cubics and angles to LINEAR within the stated angle, with no step over 120°', () => {
    const angles = fc
      .array(fc.tuple(...[0, 1, 2].map(() => fc.double({ min: -200, max: 200, noNaN: true }))), {
        minLength: 2,
        maxLength: 6,
      })
      .map((keys) =>
        rotationTrack({
          times: grid(keys.length, 2),
          values: keys.flat().map((angle) => angle / DEGREES),
          interpolation: 'EULER',
          sequence: 'ZXY',
        }),
      );
    const cubics = fc
      .tuple(motions, keyTimes())
      .map(([motion, times]) => keyed(motion, times, 'CUBICSPLINE'));
    fc.assert(
      fc.property(fc.oneof(angles, cubics), (track) => {
        const { track: after } = applied(track, { verb: 'convert', interpolation: 'LINEAR', within: 0.02 });
        expect(after.interpolation).toBe('LINEAR');
        expect(apart(track, after)).toBeLessThanOrEqual(0.02);
      }),
      { numRuns: 40 },
    );
  });

  it('there and back stays within both angles', () => {
    const track = keyed(WAVE, grid(20, 5), 'LINEAR');
    const cubic = applied(track, { verb: 'convert', interpolation: 'CUBICSPLINE' }).track;
    const back = applied(cubic, { verb: 'convert', interpolation: 'LINEAR' }).track;
    expect(apart(track, back)).toBeLessThanOrEqual(0.02);
  });

  it('keeps cuts cuts and rounds new times as they are stored', () => {
    const stored = { component: 'float32', timeComponent: 'float32' } as const;
    const track = rotationTrack({ ...keyed(WAVE, grid(5, 2), 'LINEAR'), breaks: [1], storage: stored });
    const { track: after } = applied(track, { verb: 'convert', interpolation: 'CUBICSPLINE', within: 1e-3 });
    expect(after.times.every((time) => Object.is(Math.fround(time), time))).toBe(true);
    const [cut] = after.breaks;
    expect(after.times[cut]).toBe(track.times[1]);
    expect(after.times[cut + 1]).toBe(track.times[2]);
  });

  it('refuses STEP, faulty keys and parts, and leaves a track that is so already', () => {
    const track = keyed(WAVE, grid(5), 'LINEAR');
    expect(applied(track, { verb: 'convert', interpolation: 'LINEAR' }).track).toBe(track);
    expect(codeOf(() => applied(track, { verb: 'convert' }))).toBe('step.needs-interpolation');
    expect(
      codeOf(() => applied(keyed(WAVE, grid(5), 'STEP'), { verb: 'convert', interpolation: 'LINEAR' })),
    ).toBe('step.needs-interpolation');
    const faulty = { ...track, times: Float64Array.of(0, 1, 1, 2, 3) };
    expect(codeOf(() => applied(faulty, { verb: 'convert', interpolation: 'CUBICSPLINE' }))).toBe(
      'step.faulty-keys',
    );
    expect(codeOf(() => applied(track, { verb: 'convert', interpolation: 'CUBICSPLINE', keep: [1] }))).toBe(
      'step.whole-track',
    );
  });
});
