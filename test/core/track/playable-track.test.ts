import { keyOrientation, playableTrack, segmentAngle, storedTrack } from '@slewcurve/core';
import { expect, test } from 'vitest';

const NONE = [0, 0, 0, 0];
const ONE = [0, 0, 0, 1];
const TURN = [0, 0, 1, 0];

test('drops what cannot be played: not finite, of no length, not later; and keeps the rest to the bit', () => {
  const times = [0, 1, 1, 2, NaN, 3, 4, 2.5, 5];
  const keys = [ONE, TURN, ONE, [NaN, 0, 0, 1], ONE, NONE, TURN, ONE, ONE];
  const track = playableTrack(storedTrack({ times, values: keys.flat() }));
  expect([...track.times]).toEqual([0, 1, 4, 5]);
  expect([...track.values]).toEqual([ONE, TURN, TURN, ONE].flat());
});

test('a cubic key falls with any of its twelve numbers', () => {
  const values = [...NONE, ...ONE, ...NONE, ...NONE, ...TURN, 0, Infinity, 0, 0];
  const track = playableTrack(storedTrack({ times: [0, 1], values, interpolation: 'CUBICSPLINE' }));
  expect([...track.times]).toEqual([0]);
});

test('a cut after a dropped key moves to the key before it', () => {
  const values = [ONE, ONE, NONE, TURN, TURN].flat();
  const track = playableTrack(storedTrack({ times: [0, 1, 2, 3, 4], values, breaks: [2, 3] }));
  expect(track.breaks).toEqual([1, 2]);
});

test('a sound track is given back itself, whatever its number of keys (B21)', () => {
  for (const count of [0, 1, 2, 5]) {
    const times = Array.from({ length: count }, (_, i) => i);
    const track = storedTrack({ times, values: times.flatMap(() => ONE) });
    expect(playableTrack(track)).toBe(track);
  }
});

test('an orientation is read out of every layout, unit, and identity where there is none (B22, B29)', () => {
  const linear = storedTrack({ times: [0, 1, 2], values: [[0, 0, 2, 0], NONE, [NaN, 0, 0, 1]].flat() });
  expect(keyOrientation([], linear, 0)).toEqual([0, 0, 1, 0]);
  expect(keyOrientation([], linear, 1)).toEqual(ONE);
  expect(keyOrientation([], linear, 2)).toEqual(ONE);
  expect(keyOrientation([], linear, 9)).toEqual(ONE);
  const cubic = storedTrack({
    times: [0],
    values: [...NONE, ...TURN, ...NONE],
    interpolation: 'CUBICSPLINE',
  });
  expect(keyOrientation([], cubic, 0)).toEqual(TURN);
  const angles = storedTrack({
    times: [0],
    values: [0, 0, Math.PI],
    interpolation: 'EULER',
    sequence: 'XYZ',
  });
  expect(keyOrientation([], angles, 0)[2]).toBeCloseTo(1, 15);
});

test('the angle of a segment is the shortest between its keys, 0 to π, whatever their signs', () => {
  const track = storedTrack({ times: [0, 1, 2], values: [ONE, TURN, [0, 0, 0, -1]].flat() });
  expect(segmentAngle(track, 0)).toBeCloseTo(Math.PI, 15);
  expect(segmentAngle(track, 1)).toBeCloseTo(Math.PI, 15);
});

test('cuts among dropped keys fall on the key kept before each, once', () => {
  const values = [NONE, ONE, NONE, NONE, TURN, NONE, ONE].flat();
  const track = playableTrack(
    storedTrack({ times: [0, 1, 2, 3, 4, 5, 6], values, breaks: [0, 1, 2, 3, 5, 6] }),
  );
  expect([...track.times]).toEqual([1, 4, 6]);
  expect(track.breaks).toEqual([0, 1, 2]);
});
