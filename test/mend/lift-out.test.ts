import {
  angleBetween,
  expMap,
  keyOrientation,
  logMap,
  multiply,
  playAs,
  relative,
  rotationTrack,
} from '@slewcurve/core';
import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { applied, codeOf, numbersOf } from '../support/edit-acceptance.js';
import { grid, interpolations, keyTimes, keyed, motions, poseAt, turned } from '../support/smooth-track.js';

fc.configureGlobal({ ...fc.readConfigureGlobal(), seed: 2 });

const DEGREES = 180 / Math.PI;
const WAVE = { spin: [20, 35, -10], swing: [25, 10, 15], hertz: 0.4, phase: 1 } as const;
const STILL = { spin: [0, 0, 0], swing: [0, 0, 0], hertz: 0.1, phase: 0 } as const;

/** Turns about one skew axis by the given angles, degrees. */
function aboutOneAxis(times: readonly number[], angles: readonly number[]): ReturnType<typeof rotationTrack> {
  const axis = [2 / 7, 3 / 7, 6 / 7];
  const values = angles.flatMap((angle) => [
    ...expMap(
      new Float64Array(4),
      axis.map((n) => (n * angle) / DEGREES),
    ),
  ]);
  return rotationTrack({ times, values });
}

/** EDITS' formula, once, from the stored key itself. */
function formulaOnce(track: ReturnType<typeof rotationTrack>, key: number): Float64Array {
  const pose = keyOrientation(new Float64Array(4), track, key);
  const sum = new Float64Array(3);
  for (const [j, weight] of [
    [-2, -1],
    [-1, 4],
    [1, 4],
    [2, -1],
  ]) {
    const to = relative(new Float64Array(4), pose, keyOrientation(new Float64Array(4), track, key + j));
    logMap(new Float64Array(3), to).forEach((angle, axis) => (sum[axis] += (weight * angle) / 6));
  }
  return multiply(pose, pose, expMap(new Float64Array(4), sum));
}

const offset = fc
  .tuple(
    fc.double({ min: -1, max: 1, noNaN: true }),
    fc.double({ min: -1, max: 1, noNaN: true }),
    fc.double({ min: 2, max: 170, noNaN: true }),
  )
  .map(([x, y, angle]): [number, number, number] => {
    const length = Math.hypot(x, y, 1);
    return [(x / length) * angle, (y / length) * angle, angle / length];
  });

/** Angles over time, degrees. */
const cubic = (t: number): number => 3 + 40 * t - 20 * t * t + 15 * t ** 3;
const square = (t: number): number => 5 + 30 * t - 25 * t * t;

describe('lift out', () => {
  it('gives back a key of any motion that is cubic in the angle, however far the key was off', () => {
    for (const times of [grid(9, 10), [0, 0.1, 0.22, 0.29, 0.4, 0.47, 0.6, 0.68, 0.8]])
      for (const off of [0.5, 30, 175]) {
        const track = aboutOneAxis(
          times,
          times.map((t, key) => cubic(t) + (key === 4 ? off : 0)),
        );
        const { track: after, changed, largest } = applied(track, { verb: 'lift out', keys: [4] });
        expect(changed).toEqual([4]);
        expect(largest).toBeCloseTo(off, 9);
        const [is, wanted] = [after, aboutOneAxis(times, times.map(cubic))].map((of) =>
          keyOrientation(new Float64Array(4), of, 4),
        );
        expect(angleBetween(is, wanted) * DEGREES).toBeLessThan(1e-10);
      }
  });

  it('changes the listed key alone and brings it back to the motion', () => {
    fc.assert(
      fc.property(
        motions,
        interpolations,
        offset,
        fc.integer({ min: 2, max: 11 }),
        (motion, kind, off, key) => {
          const good = keyed(motion, grid(14), kind);
          const track = turned(good, [key], off);
          const { track: after, changed } = applied(track, { verb: 'lift out', keys: [key] });
          expect(changed).toEqual([key]);
          const rest = angleBetween(
            keyOrientation(new Float64Array(4), after, key),
            poseAt(motion, good.times[kind === 'STEP' ? key - 1 : key]),
          );
          // A sixth of these motions' fourth differences at 30 Hz, 0.003° (0.0016° measured); under STEP the pose before it stays.
          expect(rest * DEGREES).toBeLessThan(kind === 'STEP' ? 1e-9 : 0.01);
        },
      ),
    );
  });

  it('holds what every edit owes on sparse, uneven, short and odd tracks too', () => {
    fc.assert(
      fc.property(
        motions,
        keyTimes(1),
        interpolations,
        fc.array(fc.nat(39), { minLength: 1, maxLength: 4 }),
        (motion, times, kind, some) => {
          const track = keyed(motion, times, kind);
          const keys = [...new Set(some.map((key) => key % times.length))];
          fc.pre(keys.length < times.length);
          const { track: after, changed } = applied(track, { verb: 'lift out', keys });
          expect(keys).toEqual(expect.arrayContaining([...changed]));
          expect(after.values.every(Number.isFinite)).toBe(true);
        },
      ),
    );
  });

  it("is EDITS' formula, repeated until it stands still: one pass from the stored key comes within 1 % of the offset", () => {
    for (const off of [1, 6, 12]) {
      const track = turned(keyed(WAVE, grid(14), 'LINEAR'), [6], [0, off, 0]);
      const { track: after } = applied(track, { verb: 'lift out', keys: [6] });
      const once = formulaOnce(track, 6);
      expect(angleBetween(once, keyOrientation(new Float64Array(4), after, 6)) * DEGREES).toBeLessThan(
        0.01 * off,
      );
    }
  });

  it('next to an end goes by the nearest three, and beside a cut never across it', () => {
    const times = grid(8, 10);
    const wanted = aboutOneAxis(times, times.map(square));
    for (const key of [0, 1, 6, 7]) {
      const track = turned(wanted, [key], [20, 0, 0]);
      const { track: after } = applied(track, { verb: 'lift out', keys: [key] });
      numbersOf(after, key).forEach((n, i) => expect(n).toBeCloseTo(numbersOf(wanted, key)[i], 12));
    }
    const cut = rotationTrack({
      ...aboutOneAxis(
        times,
        times.map((t, key) => square(t) + (key > 3 ? 90 : 0) + (key === 4 ? 20 : 0)),
      ),
      breaks: [3],
    });
    const { track: after } = applied(cut, { verb: 'lift out', keys: [4] });
    const beside = [4, 5].map((key) => keyOrientation(new Float64Array(4), after, key));
    expect(angleBetween(beside[0], beside[1]) * DEGREES).toBeCloseTo(Math.abs(square(0.5) - square(0.4)), 9);
  });

  it('does not go by other listed keys, nor by keys that hold no orientation', () => {
    const good = keyed(WAVE, grid(14), 'LINEAR');
    const two = applied(turned(good, [6, 7], [50, 0, 0]), { verb: 'lift out', keys: [6, 7] }).track;
    const values = turned(good, [6], [50, 0, 0]).values.map((n, i) => (i >> 2 === 7 ? NaN : n));
    const beside = applied({ ...good, values }, { verb: 'lift out', keys: [6] }).track;
    for (const [track, key] of [
      [two, 6],
      [two, 7],
      [beside, 6],
    ] as const)
      expect(
        angleBetween(keyOrientation(new Float64Array(4), track, key), poseAt(WAVE, key / 30)) * DEGREES,
      ).toBeLessThan(0.01);
  });

  it('under CUBICSPLINE gives the key the rate of the motion through it, and zero tangents outside the ends', () => {
    const good = keyed(WAVE, grid(14), 'CUBICSPLINE');
    const { track: after } = applied(turned(good, [6], [30, 0, 0]), { verb: 'lift out', keys: [6] });
    const rate = (of: typeof good): Float64Array =>
      playAs(of, 'as-written').rate(new Float64Array(3), 0.2, 'own');
    // deg/s: the slope of a cubic through four keys at 30 Hz, of a motion at up to 0.4 Hz.
    rate(good).forEach((component, i) =>
      expect(Math.abs(rate(after)[i] - component) * DEGREES).toBeLessThan(0.2),
    );
    const ends = applied(good, { verb: 'lift out', keys: [0, 13] }).track;
    expect(numbersOf(ends, 0).slice(0, 4)).toEqual([0, 0, 0, 0]);
    expect(numbersOf(ends, 13).slice(8)).toEqual([0, 0, 0, 0]);
  });

  it('stays on the side of the key before, so that no sign change comes in', () => {
    const good = keyed(STILL, grid(9), 'LINEAR');
    const values = good.values.map((n, i) => (i >> 2 >= 4 ? -n : n));
    const { track } = applied(turned({ ...good, values }, [6], [5, 0, 0]), { verb: 'lift out', keys: [6] });
    expect(numbersOf(track, 6).map((n) => n + 0)).toEqual([0, 0, 0, -1]);
  });

  it('refuses what it cannot do', () => {
    const track = keyed(WAVE, grid(5), 'LINEAR');
    const code = (rest: object, of = track): string | undefined =>
      codeOf(() => applied(of, { verb: 'lift out', ...rest }));
    expect(code({})).toBe('step.needs-keys');
    expect(code({ keys: [5] })).toBe('step.bad-key');
    expect(code({ keys: [-1] })).toBe('step.bad-key');
    expect(code({ keys: [2], keep: [2] })).toBe('step.nothing-left');
    expect(code({ keys: [2], span: [0, 0.01] })).toBe('step.nothing-left');
    expect(code({ keys: [0, 1, 2, 3, 4] })).toBe('step.no-neighbours');
    expect(code({ keys: [0] }, keyed(WAVE, [0], 'LINEAR'))).toBe('step.no-neighbours');
  });
});
