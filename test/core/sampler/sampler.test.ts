import { dot, playAs, rotationTrack, slerp, storedTrack, type RotationTrack } from '@slewcurve/core';
import { sampler } from '@slewcurve/core/sampler';
import * as fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { degreesBetween } from '../../support/degrees-between.js';

function greatestDifference(track: RotationTrack, precision: 'float64' | 'float32', parts: number): number {
  const curve = playAs(track, 'as-written');
  const { sample } = sampler(track, { precision });
  const [mine, exact] = [new Float64Array(4), new Float64Array(4)];
  let worst = 0;
  for (let n = -1; n <= parts + 1; n++) {
    const t = curve.start + ((curve.end - curve.start) * n) / parts;
    worst = Math.max(worst, degreesBetween(sample(t, mine), curve.orientation(exact, t)));
  }
  for (const t of track.times)
    worst = Math.max(worst, degreesBetween(sample(t, mine), curve.orientation(exact, t)));
  return worst;
}

const number = fc.double({ min: -1, max: 1, noNaN: true });
const orientation = fc.tuple(number, number, number, number).filter((q) => Math.hypot(...q) > 0.1);
/** Seconds between keys, from a tick of a clock to minutes. */
const gap = fc.oneof(
  fc.constant(1 / 30),
  fc.double({ min: 1e-6, max: 100, noNaN: true }),
  fc.double({ min: 0.01, max: 0.02, noNaN: true }),
);
const keys = fc.array(fc.tuple(gap, orientation), { minLength: 1, maxLength: 30 });

function timesOf(list: readonly (readonly [number, readonly number[]])[], start: number): number[] {
  let time = start;
  return list.map(([step]) => (time += step));
}

const someBreaks = (count: number, seed: number): number[] =>
  Array.from({ length: count }, (_, key) => key).filter((key) => (seed >> (key % 30)) % 4 === 1);

describe('a sampled LINEAR track', () => {
  test('is within 1e-13 degrees of the curve as written, whatever the keys, their signs, times and breaks', () => {
    fc.assert(
      fc.property(keys, fc.double({ min: -50, max: 200, noNaN: true }), fc.nat(), (list, start, seed) => {
        const track = rotationTrack({
          times: timesOf(list, start),
          values: list.flatMap(([, q]) => q),
          breaks: someBreaks(list.length, seed),
        });
        expect(greatestDifference(track, 'float64', 60)).toBeLessThanOrEqual(1e-13);
      }),
      { seed: 41 },
    );
  });

  test('is within 1e-13 degrees over small turns and turns next to half a turn', () => {
    fc.assert(
      fc.property(
        orientation,
        orientation,
        fc.oneof(
          fc.double({ min: 1e-9, max: 1e-3, noNaN: true }),
          fc.double({ min: 0.999, max: 1, noNaN: true }),
        ),
        fc.double({ min: 0, max: 1, noNaN: true }),
        (a, b, part, u) => {
          // b moved to `part` of its own turn from a, past half a turn's arc by nothing.
          const from = slerp(new Float64Array(4), a, a, 0);
          const to = slerp(new Float64Array(4), a, b, part);
          const { sample } = sampler(rotationTrack({ times: [0, 1], values: [...from, ...to] }));
          const exact = slerp(new Float64Array(4), from, to, u);
          expect(degreesBetween(sample(u, new Float64Array(4)), exact)).toBeLessThanOrEqual(1e-13);
        },
      ),
      { seed: 42 },
    );
  });

  test('goes the way that the stored signs tell where two keys are exactly half a turn apart', () => {
    // The second key lies on the other side of the first, so that the third is met with a sign that was turned.
    const values = [0, 0, 0, 1, 0, 0, -0.6, -0.8, 0, 0, 0.8, -0.6, 0, 0, -0.6, -0.8];
    const track = rotationTrack({ times: [0, 1, 2, 3], values });
    expect(greatestDifference(track, 'float64', 30)).toBeLessThanOrEqual(1e-13);
  });

  test('float32 grade is within 2e-5 degrees', () => {
    fc.assert(
      fc.property(keys, (list) => {
        const track = rotationTrack({ times: timesOf(list, 0), values: list.flatMap(([, q]) => q) });
        // Keys and weights rounded to float32: 6e-8 a number, a turn twice that, over half-turn segments up to 1.2e-5 measured.
        expect(greatestDifference(track, 'float32', 60)).toBeLessThanOrEqual(2e-5);
      }),
      { seed: 43 },
    );
  });

  test('has unit length to 1e-15', () => {
    fc.assert(
      fc.property(keys, fc.double({ min: 0, max: 1, noNaN: true }), (list, part) => {
        const track = rotationTrack({ times: timesOf(list, 0), values: list.flatMap(([, q]) => q) });
        const { start, end, sample } = sampler(track);
        const [x, y, z, w] = sample(start + part * (end - start), new Float64Array(4));
        // 8 eps of the squared length may already be in a key that is taken as unit (unitScale).
        expect(Math.abs(Math.hypot(x, y, z, w) - 1)).toBeLessThanOrEqual(1.2e-15);
      }),
      { seed: 44 },
    );
  });

  test('gives its keys to the bit, up to their sign', () => {
    fc.assert(
      fc.property(keys, (list) => {
        const values = list.flatMap(([, q]) => [...slerp([0, 0, 0, 0], q, q, 0)]);
        const times = timesOf(list, 3);
        const { sample } = sampler(rotationTrack({ times, values }));
        times.forEach((time, key) => {
          const stored = values.slice(4 * key, 4 * key + 4);
          const played = sample(time, [0, 0, 0, 0]);
          const side = stored.some((v, i) => v * played[i] < 0) ? -1 : 1;
          expect(played.map((v) => side * v + 0)).toEqual(stored.map((v) => v + 0));
        });
      }),
      { seed: 45 },
    );
  });

  test('never jumps to its negative from one sample to the next', () => {
    fc.assert(
      fc.property(keys, (list) => {
        const track = rotationTrack({ times: timesOf(list, 0), values: list.flatMap(([, q]) => q) });
        const { start, end, sampleMany } = sampler(track);
        const times = [...track.times].flatMap((t) => [t - 1e-9, t]).filter((t) => t >= start && t <= end);
        const out = sampleMany(times, new Float64Array(4 * times.length));
        const least = times.map((_, i) => (i === 0 ? 1 : dot(out.subarray(4 * i - 4), out.subarray(4 * i))));
        expect(Math.min(...least)).toBeGreaterThan(-1e-12);
      }),
      { seed: 46 },
    );
  });

  test('finds its segment among clustered, distant, next to equal and float32 times', () => {
    const clustered = [0, ...Array.from({ length: 500 }, (_, i) => 900 + i * 1e-7), 1000];
    const frames = Array.from({ length: 700 }, (_, i) => Math.fround(i / 120));
    const beside = [1, 1 + 2 ** -52, 1 + 2 ** -51, 2];
    const tiny = [0, 5e-324, 1e-323];
    const distant = [-1e300, -1, 0, 1e300];
    for (const times of [clustered, frames, beside, tiny, distant]) {
      const values = times.flatMap((_, i) => [Math.sin(i), 0, 0, Math.cos(i)]);
      const track = rotationTrack({ times, values });
      const curve = playAs(track, 'as-written');
      const { sample } = sampler(track);
      const asked = times.flatMap((t, i) => [t, t + ((times[i + 1] ?? t) - t) / 2, t - 1e-12]);
      const off = asked.map((t) =>
        degreesBetween(sample(t, new Float64Array(4)), curve.orientation(new Float64Array(4), t)),
      );
      expect(Math.max(...off)).toBeLessThanOrEqual(1e-13);
    }
  });
});

describe('a sampled CUBICSPLINE track', () => {
  const tangent = fc.tuple(number, number, number, number);
  test('is within 1e-13 degrees of the curve as written, where the four numbers stay clear of zero', () => {
    fc.assert(
      fc.property(
        fc.array(fc.tuple(gap, orientation, tangent, tangent), { minLength: 2, maxLength: 12 }),
        fc.nat(),
        (list, seed) => {
          const times = timesOf(
            list.map(([step, q]) => [step, q]),
            0,
          );
          // Tangents of at most one a segment: with larger ones the four numbers pass so near zero that any rounding turns far.
          const values = list.flatMap(([step, q, a, b]) => [
            ...a.map((v) => v / Math.max(step, 100)),
            ...slerp([0, 0, 0, 0], list[0][1], q, 0.4),
            ...b.map((v) => v / Math.max(step, 100)),
          ]);
          const track = rotationTrack({
            times,
            values,
            interpolation: 'CUBICSPLINE',
            breaks: someBreaks(list.length, seed),
          });
          expect(greatestDifference(track, 'float64', 60)).toBeLessThanOrEqual(1e-13);
        },
      ),
      { seed: 47 },
    );
  });
});

/** From identity to its negative in a second, with these tangents. */
function opposed(leaving: number[], arriving: number): RotationTrack {
  const values = [0, 0, 0, 0, 0, 0, 0, 1, ...leaving, 0, 0, arriving, 0, 0, 0, 0, -1, 0, 0, 0, 0];
  return rotationTrack({ times: [0, 1], values, interpolation: 'CUBICSPLINE' });
}

describe('a sampled CUBICSPLINE track at its limits', () => {
  test('keeps the key before where the four numbers vanish half way to the negative of it', () => {
    const { sample } = sampler(opposed([0, 0, 0, 0], 0));
    expect(sample(0.5, [])).toEqual([0, 0, 0, 1]);
    expect(sample(0.75, [])).toEqual([0, 0, 0, -1]);
  });

  test('stays unit under the largest tangents that float64 holds', () => {
    const { sample } = sampler(opposed([1.7e308, 0, 0, 0], -1.7e308));
    for (const t of [0.001, 0.3, 0.5, 0.999]) expect(Math.hypot(...sample(t, []))).toBeCloseTo(1, 14);
  });
});

describe('a sampled STEP track', () => {
  test('holds each key to the bit until the next', () => {
    const values = [0, 0, 0, 1, 0, 0.6, 0, 0.8, -0.6, 0, 0, -0.8];
    const { sample } = sampler(rotationTrack({ times: [0, 1, 3], values, interpolation: 'STEP' }));
    const at = (t: number): number[] => sample(t, [0, 0, 0, 0]);
    expect([at(-1), at(0.999), at(1), at(2.999), at(3), at(9)]).toEqual(
      [0, 0, 1, 1, 2, 2].map((key) => values.slice(4 * key, 4 * key + 4)),
    );
  });
});

describe('any sampled track', () => {
  const half = [0, 0, Math.SQRT1_2, Math.SQRT1_2];

  test('holds its first key before and its last key after, and its first for a time that is no number', () => {
    for (const precision of ['float64', 'float32'] as const) {
      const { sample } = sampler(rotationTrack({ times: [1, 2], values: [0, 0, 0, 1, 0, 0.6, 0, 0.8] }), {
        precision,
      });
      const at = (t: number): number[] => sample(t, [0, 0, 0, 0]).map(Math.fround);
      expect([at(-Infinity), at(0), at(NaN)]).toEqual(Array.from({ length: 3 }, () => [0, 0, 0, 1]));
      const last = [0, 0.6, 0, 0.8].map(Math.fround);
      expect([at(2), at(3), at(Infinity)]).toEqual([last, last, last]);
    }
  });

  test.each(['LINEAR', 'STEP', 'CUBICSPLINE'] as const)('of no key is identity: %s', (interpolation) => {
    const { start, end, sample } = sampler(storedTrack({ times: [], values: [], interpolation }));
    expect([start, end, sample(0.5, [9, 9, 9, 9])]).toEqual([0, 0, [0, 0, 0, 1]]);
  });

  test('of one key stands still', () => {
    const one = sampler(rotationTrack({ times: [4], values: half }));
    expect([one.start, one.end, one.sample(0, []), one.sample(4, []), one.sample(5, [])]).toEqual([
      4,
      4,
      half,
      half,
      half,
    ]);
    const cubic = sampler(
      rotationTrack({ times: [4], values: [0, 0, 0, 0, ...half, 0, 0, 0, 0], interpolation: 'CUBICSPLINE' }),
    );
    expect(cubic.sample(5, [])).toEqual(half);
  });

  test('leaves out keys that cannot be played, as the curve as written does', () => {
    const values = [0, 0, 0, 1, NaN, 0, 0, 1, 0, 0.6, 0, 0.8, 0, 0, 0, 0, 0.6, 0, 0, 0.8];
    const track = storedTrack({ times: [0, 1, 2, 3, 2.5], values });
    expect(greatestDifference(track, 'float64', 30)).toBeLessThanOrEqual(1e-13);
  });

  test('holds the key before a break to the bit', () => {
    const values = [0, 0, 0, 1, ...half, 0, 0, 0, 1];
    for (const precision of ['float64', 'float32'] as const) {
      const { sample } = sampler(rotationTrack({ times: [0, 1, 2], values, breaks: [1] }), { precision });
      expect(sample(1.7, [])).toEqual(precision === 'float64' ? half : half.map(Math.fround));
    }
  });

  test('writes into any kind of array and gives it back', () => {
    const { sample, sampleMany } = sampler(
      rotationTrack({ times: [0, 1], values: [0, 0, 0, 1, 0, 0.6, 0, 0.8] }),
    );
    const exact = sample(0.25, new Float64Array(4));
    const out32 = new Float32Array(4);
    expect(sample(0.25, out32)).toBe(out32);
    expect(out32).toEqual(Float32Array.from(exact));
    expect(sampleMany([0.25, 0.25], [])).toEqual([...exact, ...exact]);
    expect(sampleMany(Float32Array.of(0.25), new Float64Array(4))).toEqual(exact);
  });

  test('of Euler angles is refused with a reason', () => {
    const track = rotationTrack({ times: [0], values: [0, 0, 0], interpolation: 'EULER', id: 'Hips' });
    expect(() => sampler(track)).toThrow(
      expect.objectContaining({ code: 'sampler.euler-track', place: { track: 'Hips', clip: '' } }),
    );
  });

  test('does not see later changes of the arrays that it was made of', () => {
    const values = Float64Array.of(0, 0, 0, 1, 0, 0.6, 0, 0.8);
    for (const interpolation of ['LINEAR', 'STEP'] as const) {
      const kept = Float64Array.from(values);
      const { sample } = sampler(storedTrack({ times: [0, 1], values: kept, interpolation }));
      const before = sample(0.5, new Float64Array(4));
      kept.fill(5);
      expect(sample(0.5, new Float64Array(4))).toEqual(before);
    }
  });
});
