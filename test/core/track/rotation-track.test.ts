import { replaceTrack, rotationTrack, storedTrack, type RotationTrackInput } from '@slewcurve/core';
import { describe, expect, test } from 'vitest';

const TWO: RotationTrackInput = {
  times: [0, 1],
  values: [0, 0, 0, 1, 0, 0, 1, 0],
  id: 'Root/Arm',
  clip: 'Wave',
};

describe('the checked door', () => {
  test.each([
    ['track.bad-length', { values: [0, 0, 0, 1] }],
    ['track.bad-break', { breaks: [2] }],
    ['track.bad-break', { breaks: [1, 0] }],
    ['track.bad-break', { breaks: [0.5] }],
    ['track.not-finite', { times: [0, Infinity] }],
    ['track.not-finite', { values: [0, 0, 0, 1, 0, NaN, 1, 0] }],
    ['track.time-order', { times: [0, 0] }],
    ['track.time-order', { times: [0, -1] }],
    ['track.zero-orientation', { values: [0, 0, 0, 1, 0, 0, 0, 0] }],
    ['track.zero-orientation', { values: [0, 0, 0, 1, 1e-7, 0, 0, 0] }],
  ])('refuses with %s: %o', (code, change) => {
    expect(() => rotationTrack({ ...TWO, ...change })).toThrow(
      expect.objectContaining({ code, place: expect.objectContaining({ track: 'Root/Arm', clip: 'Wave' }) }),
    );
  });

  test('refuses an interpolation that is none', () => {
    // @ts-expect-error what an untyped caller may pass
    expect(() => rotationTrack({ ...TWO, interpolation: 'QUINTIC' })).toThrow(
      expect.objectContaining({ code: 'track.unknown-interpolation' }),
    );
  });

  test('keeps float64 arrays as they are, copies others, and freezes the track', () => {
    const times = Float64Array.of(0, 1);
    const track = rotationTrack({ ...TWO, times });
    expect(track.times).toBe(times);
    expect(track.values).toEqual(Float64Array.from([0, 0, 0, 1, 0, 0, 1, 0]));
    expect(Object.isFrozen(track) && Object.isFrozen(track.breaks)).toBe(true);
  });

  test('takes no, one and two keys, of every length down to 1e-6 (B21, B28)', () => {
    expect(rotationTrack({ times: [], values: [] }).times).toHaveLength(0);
    expect(rotationTrack({ times: [7], values: [0, 0, 0, 1e-6] }).times).toHaveLength(1);
    expect(rotationTrack(TWO)).toMatchObject({ interpolation: 'LINEAR', breaks: [] });
  });
});

test('a stored track keeps faulty numbers for the rules to report', () => {
  const track = storedTrack({ times: [1, 0], values: [NaN, 0, 0, 0, 0, 0, 0, 0] });
  expect(track.values[0]).toBeNaN();
  expect([...track.times]).toEqual([1, 0]);
});

test('replaceTrack changes what is named, shares the rest and leaves the old track alone (B20)', () => {
  const track = rotationTrack(TWO);
  const moved = replaceTrack(track, { times: Float64Array.of(5, 6) });
  expect([...moved.times]).toEqual([5, 6]);
  expect(moved.values).toBe(track.values);
  expect([...track.times]).toEqual([0, 1]);
  expect(moved).toMatchObject({ id: 'Root/Arm', clip: 'Wave' });
  expect(() => replaceTrack(track, { interpolation: 'CUBICSPLINE' })).toThrow(
    expect.objectContaining({ code: 'track.bad-length' }),
  );
});
