import {
  type RotationTrack,
  angleBetween,
  keyOrientation,
  logMap,
  multiply,
  playAs,
  relative,
  replaceTrack,
  rotationTrack,
} from '@slewcurve/core';
import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { captured, panTilt } from '../support/captured.js';
import { applied, codeOf, numbersOf } from '../support/edit-acceptance.js';
import { turningTrack } from '../support/turning-track.js';

fc.configureGlobal({ ...fc.readConfigureGlobal(), seed: 17 });

const DEGREES = 180 / Math.PI;

function key(track: RotationTrack, at: number): Float64Array {
  return keyOrientation(new Float64Array(4), track, at);
}

/** Degrees from the last pose to the first. */
function gapOf(track: RotationTrack): number {
  return angleBetween(key(track, track.times.length - 1), key(track, 0)) * DEGREES;
}

/** Degrees from key to key, and the sum of them. */
function stepsOf(track: RotationTrack): number[] {
  return Array.from(
    { length: track.times.length - 1 },
    (_, k) => angleBetween(key(track, k), key(track, k + 1)) * DEGREES,
  );
}

/**
 * By how much the rate steps at the seam, as a share of the faster side: each side's rate from its three last keys by the one-sided difference of second order,
 * (3y₀ − 4y₁ + y₂)/2h, on even keys. Independent of the edit's own weights.
 */
function kinkOf(track: RotationTrack): number {
  const last = track.times.length - 1;
  const h = track.times[1] - track.times[0];
  const turn = (a: number, b: number): number[] =>
    logMap([0, 0, 0], relative([0, 0, 0, 1], key(track, a), key(track, b)));
  const [y1, y2] = [turn(0, 1), turn(0, 2)];
  const start = y1.map((_, i) => (4 * y1[i] - y2[i]) / (2 * h));
  const [z1, z2] = [turn(last, last - 1), turn(last, last - 2)];
  const end = z1.map((_, i) => (z2[i] - 4 * z1[i]) / (2 * h));
  const most = Math.max(Math.hypot(...start), Math.hypot(...end));
  return Math.hypot(...start.map((part, i) => part - end[i])) / most;
}

const signs = (k: number): number => (k % 5 === 2 ? -1 : 1);

const stride = (k: number): number => 20 * Math.sin((2 * Math.PI * k) / 40);

const motion = (t: number): Float64Array =>
  panTilt(30 * Math.sin(Math.PI * t) + 8 * t * t, 10 * Math.cos(Math.PI * t) + 3 * t, 0);

describe('close loop', () => {
  // NEEDS A14: 0 to 350° leaves 10°; after it under 0.01°, and a speed gap under 1 %.
  it.each(['tail', 'evenly'] as const)('closes 0 to 350° spread %s, with its one whole turn', (spread) => {
    const sound = turningTrack((k) => 10 * k, 36);
    const track = replaceTrack(sound, {
      values: sound.values.map((x, i) => x * signs(Math.floor(i / 4))),
    });
    expect(gapOf(track)).toBeCloseTo(10, 9);
    const { track: after } = applied(track, { verb: 'close loop', spread });
    expect(gapOf(after)).toBeLessThan(0.01);
    const steps = stepsOf(after);
    expect(steps.reduce((sum, step) => sum + step, 0)).toBeCloseTo(360, 6);
    // A steady turn meets itself: first and last segment, as played.
    const played = Math.abs(steps[34] / steps[0] - 1);
    expect(spread === 'evenly' ? played : 0).toBeLessThan(0.01);
    expect(kinkOf(after)).toBeLessThan(0.01);
  });

  // EDITS: seam at most 0.01°, kink at most 2 %, the untouched part identical.
  it('closes any smooth dense loop to 0.01° and 2 %, and keeps every key before its tail to the byte', () => {
    const angle = fc.double({ min: -40, max: 40, noNaN: true });
    fc.assert(
      fc.property(
        fc.tuple(angle, angle, angle),
        fc.tuple(angle, angle, angle),
        fc.integer({ min: 30, max: 90 }),
        fc.constantFrom('tail' as const, 'evenly' as const),
        (swing, drift, keys, spread) => {
          // The drift bends, so that the rates at both ends differ as well.
          const track = captured(
            (t) => {
              const u = (t * 30) / (keys - 1);
              const wave = Math.sin(2 * Math.PI * u + 0.4);
              const [x, y, z] = swing.map((part, i) => part * wave + 0.7 * drift[i] * u * u);
              return panTilt(x, y, z);
            },
            { keys, rate: 30 },
          );
          fc.pre(gapOf(track) > 0.1 && Math.hypot(...swing) > 2);
          const { track: after } = applied(track, { verb: 'close loop', spread });
          expect(gapOf(after)).toBeLessThan(0.01);
          expect(kinkOf(after)).toBeLessThan(0.02);
          const end = track.times[keys - 1];
          const before = Array.from(track.times.keys()).filter(
            (k) => spread === 'tail' && track.times[k] <= 0.75 * end,
          );
          for (const k of before) expect(numbersOf(after, k)).toEqual(numbersOf(track, k));
          expect(numbersOf(after, 0)).toEqual(numbersOf(track, 0));
        },
      ),
      { numRuns: 60 },
    );
  });

  it('spreads over the span, and behind the last kept key', () => {
    const track = turningTrack((k) => 20 * Math.sin((2 * Math.PI * k) / 40) + 0.2 * k, 41);
    const end = track.times[40];
    const { changed } = applied(track, { verb: 'close loop', span: [end - 0.2, end] });
    expect(changed).toEqual([35, 36, 37, 38, 39, 40]);
    expect(applied(track, { verb: 'close loop', spread: 'evenly', keep: [10, 20] }).changed[0]).toBe(21);
  });

  it('takes a steady drift out evenly, without a bend', () => {
    const track = turningTrack((k) => stride(k) + 0.1 * k, 41);
    const { track: after } = applied(track, { verb: 'close loop', spread: 'evenly' });
    stepsOf(after).forEach((step, k) => expect(step).toBeCloseTo(Math.abs(stride(k + 1) - stride(k)), 3));
  });

  it('lets a last key that repeats the one before become the first pose', () => {
    const track = turningTrack((k) => 3.6 * Math.min(k, 99), 101, 10);
    const { track: after, changed } = applied(track, { verb: 'close loop' });
    expect(changed).toEqual([100]);
    expect(gapOf(after)).toBeLessThan(1e-9);
    for (const step of stepsOf(after)) expect(step).toBeCloseTo(3.6, 6);
    // Where both already are the first pose, the clip is too long, and only its maker can shorten it.
    const long = turningTrack((k) => 3.6 * Math.min(k, 100), 102, 10);
    expect(codeOf(() => applied(long, { verb: 'close loop' }))).toBe('step.doubled-end');
  });

  it('closes the pose alone of sparse keys, which turn corners anyway', () => {
    const track = turningTrack((k) => [0, 40, 10, -20, 5][k], 5, 1);
    const { track: after, changed } = applied(track, { verb: 'close loop' });
    expect(changed).toEqual([4]);
    expect(gapOf(after)).toBeLessThan(1e-9);
  });

  it('meets pose and rate of a CUBICSPLINE by its tangents', () => {
    const times = Array.from({ length: 9 }, (_, k) => k / 4);
    const values = times.flatMap((t) => {
      const tangent = motion(t).map((_, i) => (motion(t + 1e-5)[i] - motion(t - 1e-5)[i]) / 2e-5);
      return [...tangent, ...motion(t), ...tangent];
    });
    const track = rotationTrack({ times, values, interpolation: 'CUBICSPLINE' });
    expect(gapOf(track)).toBeGreaterThan(20);
    const { track: after } = applied(track, { verb: 'close loop', span: [1, 2] });
    expect(gapOf(after)).toBeLessThan(1e-9);
    const curve = playAs(after, 'as-written');
    const start = curve.rate([0, 0, 0], 0, 'parent');
    const end = curve.rate([0, 0, 0], 2 - 1e-12, 'parent');
    expect(Math.hypot(...start.map((part, i) => part - end[i]))).toBeLessThan(0.001 * Math.hypot(...start));
    for (const k of [0, 1, 2, 3, 4]) expect(numbersOf(after, k)).toEqual(numbersOf(track, k));
  });

  it('leaves a loop alone that closes', () => {
    const track = turningTrack((k) => 20 * Math.sin((2 * Math.PI * k) / 40), 41);
    // Rounding of the last key, at most.
    expect(applied(track, { verb: 'close loop' }).largest).toBeLessThan(0.02);
  });

  it('works on angles, and keeps the turns that they count', () => {
    const times = Array.from({ length: 37 }, (_, k) => k / 30);
    const values = times.flatMap((_, k) => [(700 + 9.7 * k) / DEGREES, 0, 0]);
    const storage = { component: 'text', decimals: 6, timeComponent: 'float64' } as const;
    const track = rotationTrack({ times, values, interpolation: 'EULER', sequence: 'YXZ', storage });
    const { track: after } = applied(track, { verb: 'close loop', spread: 'evenly' });
    expect(after.values[3 * 36] * DEGREES).toBeCloseTo(1060, 6);
  });

  it('says what to do where it cannot be applied', () => {
    const track = turningTrack((k) => 10 * k, 30);
    const code = (step: object, on = track): string | undefined =>
      codeOf(() => applied(on, { verb: 'close loop', ...step }));
    expect(code({ keep: [29] })).toBe('step.nothing-left');
    expect(code({ span: [0, 0.5] })).toBe('step.nothing-left');
    expect(
      code(
        {},
        turningTrack((k) => 10 * k, 2),
      ),
    ).toBe('step.too-few-keys');
    expect(
      code(
        {},
        turningTrack((k) => 10 * k, 19),
      ),
    ).toBe('step.too-far');
    expect(
      code(
        {},
        turningTrack((k) => 10 * k, 30, 30, { interpolation: 'STEP' }),
      ),
    ).toBe('step.plays-no-turn');
  });

  it('turns with its parent: closing a turned track is the closed track turned', () => {
    const track = turningTrack((k) => 20 * Math.sin((2 * Math.PI * k) / 40) + 0.2 * k, 41);
    const parent = panTilt(33, -20, 70);
    const turn = (one: RotationTrack): RotationTrack =>
      replaceTrack(one, {
        values: Float64Array.from(
          Array.from(one.times).flatMap((_, k) => [...multiply(new Float64Array(4), parent, key(one, k))]),
        ),
      });
    const [a, b] = [
      turn(applied(track, { verb: 'close loop' }).track),
      applied(turn(track), { verb: 'close loop' }).track,
    ];
    for (let k = 0; k < 41; k++) expect(angleBetween(key(a, k), key(b, k)) * DEGREES).toBeLessThan(1e-9);
  });
});
