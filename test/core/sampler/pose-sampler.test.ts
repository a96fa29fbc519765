import { playAs, rotationTrack, storedTrack, type RotationTrack } from '@slewcurve/core';
import { poseSampler, sampler } from '@slewcurve/core/sampler';
import * as fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { degreesBetween } from '../../support/degrees-between.js';

const EVEN = Array.from({ length: 9 }, (_, i) => i / 24);
const UNEVEN = [0, 0.01, 0.02, 0.3, 0.31, 0.32, 0.33, 0.4, 0.9];

/** A track of `times`, its keys told apart by `seed`. */
function made(
  times: number[],
  interpolation: 'LINEAR' | 'STEP' | 'CUBICSPLINE',
  seed: number,
  breaks: number[] = [],
): RotationTrack {
  const values = times.flatMap((_, key) => {
    const angle = Math.sin(seed * 3 + key * 2);
    const q = [0.6 * Math.sin(angle), 0, 0.8 * Math.sin(angle), Math.cos(angle)];
    return interpolation === 'CUBICSPLINE' ? [0.1, seed % 2, 0, 0, ...q, 0, 0.2, 0, seed % 3] : q;
  });
  return rotationTrack({ times, values, interpolation, breaks });
}

const MIXTURE = [
  made(EVEN, 'LINEAR', 1),
  made(UNEVEN, 'LINEAR', 2),
  made(EVEN, 'STEP', 3),
  made(EVEN, 'CUBICSPLINE', 4),
  made(EVEN, 'LINEAR', 5),
  storedTrack({ times: [], values: [] }),
  made(EVEN, 'LINEAR', 6, [2, 3]),
  made(UNEVEN, 'CUBICSPLINE', 7, [4]),
  made(EVEN, 'CUBICSPLINE', 8),
  made([0.1], 'LINEAR', 9),
  made(EVEN, 'STEP', 10, [1]),
  made(EVEN, 'LINEAR', 11, [2, 3]),
];
const ASKED = Array.from({ length: 60 }, (_, n) => -0.1 + n / 50);

describe.each(['float64', 'float32'] as const)('a pose of tracks of every kind, %s grade', (precision) => {
  const pose = poseSampler(MIXTURE, { precision });
  const each = MIXTURE.map((track) => sampler(track, { precision }));

  test('is what the tracks give one by one, in the order of the list', () => {
    // Not to the bit: the longer polynomial is taken for all tracks of a segment as soon as one of them turns far.
    const rounding = precision === 'float64' ? 4e-16 : 6e-8;
    for (const t of ASKED) {
      const one = each.flatMap(({ sample }) => [...sample(t, [0, 0, 0, 0])]);
      const together = pose.samplePose(t, new Float64Array(48));
      const off = one.map((v, i) => Math.abs(together[i] - v));
      expect(Math.max(...off)).toBeLessThanOrEqual(rounding);
    }
  });

  test('at many times is the poses one after the other', () => {
    const all = pose.samplePoses(ASKED, new Float64Array(48 * ASKED.length));
    ASKED.forEach((t, n) =>
      expect(all.subarray(48 * n, 48 * n + 48)).toEqual(pose.samplePose(t, new Float64Array(48))),
    );
  });

  test('does not depend on what was asked before', () => {
    const forward = ASKED.map((t) => [...pose.samplePose(t, new Float64Array(48))]);
    const backward = ASKED.map((_, n) => [...pose.samplePose(ASKED[59 - n], new Float64Array(48))]);
    expect(backward.map((_, n) => backward[59 - n])).toEqual(forward);
  });

  test('begins with the first key of all and ends with the last', () => {
    expect([pose.start, pose.end]).toEqual([0, 0.9]);
  });
});

test('each track of a pose plays as written', () => {
  const { samplePose } = poseSampler(MIXTURE);
  const out = new Float64Array(48);
  MIXTURE.forEach((track, i) => {
    const curve = playAs(track, 'as-written');
    const off = ASKED.map((t) =>
      degreesBetween(samplePose(t, out).subarray(4 * i), curve.orientation(new Float64Array(4), t)),
    );
    expect(Math.max(...off)).toBeLessThanOrEqual(1e-13);
  });
});

test('a pose of no tracks writes nothing', () => {
  const pose = poseSampler([]);
  expect([pose.start, pose.end, pose.samplePose(1, [7]), pose.samplePoses([1, 2], [7])]).toEqual([
    0,
    0,
    [7],
    [7],
  ]);
});

test('tracks with almost the same times are not taken for one another', () => {
  fc.assert(
    fc.property(fc.integer({ min: 1, max: 7 }), fc.double({ min: 0, max: 0.03, noNaN: true }), (key, by) => {
      const moved = EVEN.map((time, i) => (i === key ? time + by : time));
      const tracks = [made(EVEN, 'LINEAR', 1), made(moved, 'LINEAR', 1)];
      const t = EVEN[key];
      const out = poseSampler(tracks).samplePose(t, new Float64Array(8));
      expect(out.subarray(4)).toEqual(sampler(tracks[1]).sample(t, new Float64Array(4)));
    }),
    { seed: 51 },
  );
});
