import { firstKeyAfter, firstKeyAt, holdStretches, keyLine, nearestKey } from '@slewcurve/elements/plot';
import { describe, expect, test } from 'vitest';

const columns = (greatest: number[]): { greatest: Float32Array; least: Float32Array } => ({
  greatest: Float32Array.from(greatest),
  least: Float32Array.from(greatest),
});

describe('the key line', () => {
  test('has a post a key where they can be told apart, and two caps where kept', () => {
    expect(keyLine([0, 1, 2], 0, 10, 100, [1])).toEqual({
      posts: [
        { key: 0, x: 0, kept: false },
        { key: 1, x: 10, kept: true },
        { key: 2, x: 20, kept: false },
      ],
      rails: [],
    });
  });

  test('has a rail where a key stands every 20 ms, and says so', () => {
    const times = Array.from({ length: 500 }, (_, i) => i * 0.02);
    const { posts, rails } = keyLine(times, 0, 10, 1000, [77]);
    expect(rails).toHaveLength(1);
    expect(rails[0].gap).toBeCloseTo(0.02, 12);
    expect(posts).toEqual([{ key: 77, x: expect.closeTo(154, 9), kept: true }]);
  });

  test('keeps keys of other rows out', () => {
    expect(keyLine([0, 1, 2, 3], 1, 2, 100).posts.map((post) => post.key)).toEqual([1, 2]);
  });
});

describe('finding a key', () => {
  const times = [0, 0.5, 1];
  test('at, after and nearest to a time', () => {
    expect([firstKeyAt(times, 0.5), firstKeyAfter(times, 0.5)]).toEqual([1, 2]);
    expect([-1, 0.2, 0.3, 5].map((time) => nearestKey(times, time))).toEqual([0, 0, 1, 2]);
    expect(nearestKey([], 1)).toBe(-1);
  });
});

describe('holds', () => {
  test('are stretches at or below the noise floor that last', () => {
    expect(holdStretches(columns([9, 0, 0, 0, 9, 0, 9, 0, 0, 0]), 0.1, 3)).toEqual([
      { from: 1, to: 4 },
      { from: 7, to: 10 },
    ]);
  });

  test('are not where there is no motion', () => {
    expect(holdStretches(columns([0, 0, 0, Number.NaN, Number.NaN]), 0.1, 3)).toEqual([{ from: 0, to: 3 }]);
  });
});
