import { type RotationTrack, playAs, rotationTrack } from '@slewcurve/core';
import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { applied, codeOf } from '../support/edit-acceptance.js';
import { repaced } from '../support/pace-acceptance.js';
import { grid, interpolations, keyed, motions } from '../support/smooth-track.js';

fc.configureGlobal({ ...fc.readConfigureGlobal(), seed: 6 });

const WAVE = { spin: [20, 35, -10], swing: [25, 10, 15], hertz: 0.4, phase: 1 } as const;
const PAN = { spin: [0, 30, 0], swing: [0, 0, 0], hertz: 1, phase: 0 } as const;

function rounded(track: RotationTrack, decimals: number): RotationTrack {
  return rotationTrack({ ...track, times: track.times.map((time) => Number(time.toFixed(decimals))) });
}

/** Least and greatest speed between keys over the mean. */
function ripple(track: RotationTrack): readonly [number, number] {
  const curve = playAs(track, 'as-written');
  const mean = curve.length(curve.start, curve.end) / (curve.end - curve.start);
  const speeds = Array.from(track.times.subarray(1), (time, key) => {
    const from = track.times[key];
    return curve.length(from, time) / (time - from) / mean - 1;
  });
  return [Math.min(...speeds), Math.max(...speeds)];
}

describe('re-time to grid', () => {
  it.each([
    [3, 60, -0.02, 0.042],
    [2, 60, -0.17, 0.67],
  ])(
    'takes the saw-tooth of %d decimals at %d frames a second off a steady pan',
    (decimals, fps, least, most) => {
      const track = rounded(keyed(PAN, grid(240, fps), 'LINEAR'), decimals);
      // What rounding does to the speed is RULES' own figure, measured there: -2.0…+4.2 % and -17…+67 %.
      const before = ripple(track);
      expect(before[0]).toBeCloseTo(least, 2);
      expect(before[1]).toBeCloseTo(most, 2);
      const after = repaced(track, { verb: 're-time to grid' }).track;
      expect(after.values).toEqual(track.values);
      // Times are exact to the bit of i/fps, so speeds are even to rounding of float64.
      after.times.forEach((time, key) => expect(time).toBe(key / fps));
      expect(Math.max(...ripple(after).map(Math.abs))).toBeLessThan(1e-9);
    },
  );

  it('gives back the frames, values to the bit, whatever the rate, the rounding and the gaps', () => {
    const cases = fc.tuple(
      motions,
      interpolations,
      fc.constantFrom(24, 25, 30, 48, 50, 60, 120),
      fc.array(fc.constantFrom(1, 1, 1, 1, 2, 5), { minLength: 24, maxLength: 60 }),
      fc.nat({ max: 50 }),
    );
    fc.assert(
      fc.property(cases, ([motion, interpolation, fps, gaps, first]) => {
        let frame = first;
        const frames = [first, ...gaps.map((gap) => (frame += gap))];
        const exact = keyed(
          motion,
          frames.map((one) => one / fps),
          interpolation,
        );
        const track = rounded(exact, 3);
        const { track: after } = applyAny(track, fps);
        expect(after.times).toEqual(exact.times);
        const isValue = (_: number, i: number): boolean =>
          interpolation !== 'CUBICSPLINE' || (i % 12 >= 4 && i % 12 < 8);
        expect(after.values.filter(isValue)).toEqual(track.values.filter(isValue));
      }),
      { numRuns: 40 },
    );
  });

  it('sets right a clock that drifts: Frame Time 0.033 loses 1.8 s in 3 minutes, after it none', () => {
    const track = keyed(
      PAN,
      Array.from({ length: 5400 }, (_, key) => key * 0.033),
      'LINEAR',
    );
    const { track: after, repaced: pace } = repaced(track, { verb: 're-time to grid' });
    // RULES: 54 frames in 3 minutes.
    expect(after.times[5399] - track.times[5399]).toBeCloseTo(54 / 30, 1);
    expect(after.times[5399]).toBe(5399 / 30);
    expect(pace.with).toBe('node');
  });

  it('counts 29.97 as 30000/1001, so that a day of frames stays on them', () => {
    const track = keyed(PAN, grid(100, 30000 / 1001), 'LINEAR');
    const late = rotationTrack({ ...track, times: track.times.map((time) => time + (3000 * 1001) / 30000) });
    const rough = rounded(late, 3);
    const { track: after } = repaced(rough, { verb: 're-time to grid', fps: 29.97 });
    after.times.forEach((time, key) => expect(time).toBeCloseTo(((3000 + key) * 1001) / 30000, 9));
  });

  it('scales the tangents of a cubic so that each segment plays its path, and leaves a track on its grid the very object', () => {
    const track = rounded(keyed(WAVE, grid(60), 'CUBICSPLINE'), 2);
    const { track: after, price } = repaced(track, { verb: 're-time to grid', fps: 30 });
    expect(price.degrees).toBeLessThan(1e-7);
    expect(applied(after, { verb: 're-time to grid' }).track).toBe(after);
  });

  it('refuses keys between frames, two on one frame, and a track on no grid that says none', () => {
    const uneven = keyed(WAVE, [0, 0.1, 0.15, 0.2], 'LINEAR');
    expect(codeOf(() => applied(uneven, { verb: 're-time to grid', fps: 10 }))).toBe('step.off-grid');
    expect(codeOf(() => applied(uneven, { verb: 're-time to grid', fps: 5 }))).toBe('step.off-grid');
    const odd = keyed(WAVE, [0, 0.171, 0.29, 0.5331], 'LINEAR');
    expect(codeOf(() => applied(odd, { verb: 're-time to grid' }))).toBe('step.needs-fps');
  });
});

function applyAny(track: RotationTrack, fps: number): { track: RotationTrack } {
  const isOnIt = track.times.every((time) => Object.is(Math.round(time * fps) / fps, time));
  return isOnIt
    ? applied(track, { verb: 're-time to grid', fps })
    : repaced(track, { verb: 're-time to grid', fps });
}
