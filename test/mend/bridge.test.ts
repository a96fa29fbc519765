import { type RotationTrack, angleBetween, keyOrientation, playAs, rotationTrack } from '@slewcurve/core';
import { shelfEnds } from '@slewcurve/mend';
import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { applied, codeOf, numbersOf } from '../support/edit-acceptance.js';
import { grid, interpolations, keyTimes, keyed, motions, poseAt, turned } from '../support/smooth-track.js';

fc.configureGlobal({ ...fc.readConfigureGlobal(), seed: 2 });

const DEGREES = 180 / Math.PI;
const WAVE = { spin: [20, 35, -10], swing: [25, 10, 15], hertz: 0.4, phase: 1 } as const;
const STILL = { spin: [0, 0, 0], swing: [0, 0, 0], hertz: 0.1, phase: 0 } as const;

/** The motion with everything from `key` on turned in own axes. */
function shelf(track: RotationTrack, key: number, degrees: [number, number, number]): RotationTrack {
  const tail = Array.from({ length: track.times.length - key }, (_, i) => key + i);
  return turned(track, tail, degrees);
}

/** deg/s between two keys as written. */
function peakOf(track: RotationTrack, from: number, to: number): number {
  return playAs(track, 'as-written').peak(track.times[from], track.times[to]).rate * DEGREES;
}

function angleOf(track: RotationTrack, from: number, to: number): number {
  const [a, b] = [from, to].map((key) => keyOrientation(new Float64Array(4), track, key));
  return angleBetween(a, b) * DEGREES;
}

/** EDITS: at most 1.9 times the mean of the bridge, or the faster neighbour. */
function limitOf(track: RotationTrack, from: number, to: number): number {
  const speed = (key: number): number =>
    key < 0 || key + 1 >= track.times.length
      ? 0
      : angleOf(track, key, key + 1) / (track.times[key + 1] - track.times[key]);
  const mean = angleOf(track, from, to) / (track.times[to] - track.times[from]);
  return Math.max(1.9 * mean, speed(from - 1), speed(to));
}

/** deg/s that a CUBICSPLINE key's tangents say; they stay as stored. */
function endRate(track: RotationTrack, key: number): number {
  const curve = playAs(track, 'as-written');
  const rates = [-1e-9, 0].map((aside) => curve.rate(new Float64Array(3), track.times[key] + aside, 'own'));
  return Math.max(...rates.map((rate) => Math.hypot(...rate))) * DEGREES;
}

describe('bridge', () => {
  it('over n steps spans a = k − 1 − ⌊n/2⌋ to b = a + n', () => {
    const track = keyed(WAVE, grid(40), 'LINEAR');
    for (const steps of [2, 3, 4, 5, 8, 11]) {
      const { from, to, keys } = shelfEnds(track, 20, steps);
      expect(from).toBe(20 - 1 - Math.floor(steps / 2));
      expect(to).toBe(from + steps);
      expect(keys).toEqual(Array.from({ length: steps - 1 }, (_, i) => from + 1 + i));
    }
  });

  it('moves and shrinks its window at ends, cuts, kept keys and keys that hold no orientation', () => {
    const track = keyed(WAVE, grid(12), 'LINEAR');
    const window = (key: number, of = track, may?: (key: number) => boolean): number[] => {
      const { from, to } = shelfEnds(of, key, 6, may);
      return [from, to];
    };
    expect(window(6)).toEqual([2, 8]);
    expect(window(1)).toEqual([0, 6]);
    expect(window(11)).toEqual([5, 11]);
    expect(window(6, rotationTrack({ ...track, breaks: [3] }))).toEqual([4, 10]);
    expect(window(6, track, (key) => key !== 4 && key !== 7)).toEqual([4, 7]);
    const values = track.values.map((n, i) => (i >> 2 === 2 ? NaN : n));
    expect(window(6, { ...track, values })).toEqual([3, 8]);
    expect(codeOf(() => shelfEnds(track, 6, 6, (key) => key !== 5 && key !== 6))).toBe('step.no-room');
  });

  it('over a shelf changes the keys between both ends alone, at up to 1.9 times its mean or the faster neighbour', () => {
    fc.assert(
      fc.property(
        motions,
        keyTimes(16),
        fc.constantFrom('LINEAR', 'CUBICSPLINE'),
        fc.integer({ min: 4, max: 12 }),
        fc.integer({ min: 3, max: 12 }),
        fc.tuple(...[1, 2, 3].map(() => fc.double({ min: -60, max: 60, noNaN: true }))),
        (motion, times, kind, steps, key, [x, y, z]) => {
          const track = shelf(keyed(motion, times, kind), key, [x, y, z]);
          const { track: after, changed } = applied(track, { verb: 'bridge', keys: [key], steps });
          const { from, to, keys } = shelfEnds(track, key, steps);
          expect(keys).toEqual(expect.arrayContaining([...changed]));
          const others = [...times.keys()].filter((other) => other <= from || other >= to);
          for (const other of others) expect(numbersOf(after, other)).toEqual(numbersOf(track, other));
          // The neighbours of a cubic bridge meet it at the rates that their tangents say.
          const ends = kind === 'LINEAR' ? [] : [endRate(track, from), endRate(track, to)];
          const limit = Math.max(limitOf(track, from, to), ...ends);
          // 1e-9: rounding of a peak found by search; deg/s and relative.
          expect(peakOf(after, from, to)).toBeLessThanOrEqual(limit * (1 + 1e-9) + 1e-9);
        },
      ),
    );
  });

  it('at rest turns a 60° shelf over 4 steps at 1.375 times its mean: the cubic step, key to key', () => {
    const track = shelf(keyed(STILL, grid(20), 'LINEAR'), 10, [60, 0, 0]);
    const { track: after, largest } = applied(track, { verb: 'bridge', keys: [10], steps: 4 });
    const mean = 60 / (4 / 30);
    expect(peakOf(after, 0, 19)).toBeCloseTo(1.375 * mean, 9);
    // Ends at keys 7 and 11; the step lay between 9 and 10, where the cubic has reached 1/2 and 27/32 of the way.
    expect(largest).toBeCloseTo(30, 9);
    expect(peakOf(track, 0, 19)).toBeCloseTo(1800, 6);
  });

  it('meets both ends at the rates of the segments just outside', () => {
    const track = shelf(keyed({ ...STILL, spin: [0, 60, 0] }, grid(30, 60), 'CUBICSPLINE'), 15, [0, 12, 0]);
    const { track: after } = applied(track, { verb: 'bridge', keys: [15], steps: 8 });
    const { from, to } = shelfEnds(track, 15, 8);
    const curve = playAs(after, 'as-written');
    for (const key of [from, to])
      for (const side of [-1e-7, 1e-7])
        expect(curve.rate(new Float64Array(3), track.times[key] + side, 'own')[1] * DEGREES).toBeCloseTo(
          60,
          3,
        );
  });

  it('bridges keys that hold no orientation from the nearest that do, each run by itself', () => {
    for (const kind of ['LINEAR', 'CUBICSPLINE', 'STEP'] as const) {
      const good = keyed(WAVE, grid(24), kind);
      const bad = [5, 6, 7, 15];
      const values = good.values.map((n, i) =>
        bad.includes(Math.floor((i * good.times.length) / good.values.length)) ? NaN : n,
      );
      const track = { ...good, values };
      const { track: after, changed, largest } = applied(track, { verb: 'bridge', keys: bad });
      expect(changed).toEqual(bad);
      expect(largest).toBe(0);
      for (const key of bad) {
        const pose = kind === 'STEP' ? (key === 15 ? 14 : 4) : key;
        const off =
          angleBetween(keyOrientation(new Float64Array(4), after, key), poseAt(WAVE, pose / 30)) * DEGREES;
        // The rates outside are means of segments, so those of half a step earlier: at up to 158 deg/s² that is 2.6 deg/s at each
        // end, and over 4 steps of 1/30 s 2.6 · 0.133 · ¼ = 0.09° in the middle.
        expect(off).toBeLessThan(0.12);
      }
    }
  });

  it('at an end of the track lets lost keys take the pose of the one neighbour', () => {
    const good = keyed(WAVE, grid(8), 'LINEAR');
    const values = good.values.map((n, i) => (i >> 2 < 2 ? NaN : n));
    const { track: after } = applied({ ...good, values }, { verb: 'bridge', keys: [0, 1] });
    for (const key of [0, 1]) expect(numbersOf(after, key)).toEqual(numbersOf(good, 2));
  });

  it('holds what every edit owes when keys are listed, on any track', () => {
    fc.assert(
      fc.property(
        motions,
        keyTimes(2),
        interpolations,
        fc.array(fc.nat(39), { minLength: 1, maxLength: 6 }),
        (motion, times, kind, some) => {
          const track = keyed(motion, times, kind);
          const keys = [...new Set(some.map((key) => key % times.length))];
          fc.pre(keys.length < times.length);
          const { track: after } = applied(track, { verb: 'bridge', keys });
          expect(after.values.every(Number.isFinite)).toBe(true);
        },
      ),
    );
  });

  it('leaves kept keys as stored and ends on them', () => {
    const track = shelf(keyed(WAVE, grid(20), 'LINEAR'), 10, [0, 20, 0]);
    const { changed } = applied(track, { verb: 'bridge', keys: [10], steps: 6, keep: [8, 12] });
    expect(changed).toEqual([9, 10, 11]);
    expect(applied(track, { verb: 'bridge', keys: [9, 10], keep: [9] }).changed).toEqual([10]);
  });

  it('refuses what it cannot do', () => {
    const track = keyed(WAVE, grid(12), 'LINEAR');
    const code = (rest: object, of: RotationTrack = track): string | undefined =>
      codeOf(() => applied(of, { verb: 'bridge', ...rest }));
    expect(code({})).toBe('step.needs-keys');
    expect(code({ keys: [0], steps: 4 })).toBe('step.bad-key');
    expect(code({ keys: [12], steps: 4 })).toBe('step.bad-key');
    expect(code({ keys: [6], steps: 4, keep: [5, 6] })).toBe('step.no-room');
    expect(code({ keys: [6], keep: [6] })).toBe('step.nothing-left');
    expect(code({ keys: grid(12, 1) })).toBe('step.no-neighbours');
    expect(code({ keys: [6], steps: 4 }, keyed(WAVE, grid(12), 'STEP'))).toBe('step.nothing-between');
    expect(code({ keys: [6], steps: 4 }, rotationTrack({ ...track, breaks: [5] }))).toBe(
      'step.nothing-between',
    );
    const times = track.times.map((time, key) => (key === 6 ? 0.01 : time));
    expect(code({ keys: [6], steps: 4 }, { ...track, times })).toBe('step.time-order');
  });
});
