import { describe, expect, test } from 'vitest';
import {
  angleBetween,
  keyOrientation,
  playAs,
  storedTrack,
  type RotationTrack,
  type Storage,
} from '@slewcurve/core';
import { verbNamed } from '@slewcurve/mend';
import { surveyTrack } from '@slewcurve/survey';
import { grid, keyed } from '../../../support/smooth-track.js';

const MOTION = { spin: [0, 20, 0], swing: [8, 0, 4], hertz: 0.4, phase: 1 } as const;

function off(track: RotationTrack, key: number, length: number, component: Storage['component'] = 'float32') {
  const size = track.values.length / track.times.length;
  const values = track.values.map((value, i) => (Math.floor(i / size) === key ? value * length : value));
  return storedTrack({ ...track, values, storage: { component, timeComponent: 'float32' } });
}
const lengths = (track: RotationTrack) =>
  surveyTrack(track).filter(({ rule }) => rule === 'file.not-normalised');

describe('file.not-normalised', () => {
  const clean = keyed(MOTION, grid(40), 'LINEAR');

  // NEEDS A22.
  test.each([
    [1.0009, undefined],
    [1.0011, 'warning'],
    [0.9989, 'warning'],
    [1.011, 'error'],
    [0.5, 'error'],
    [1e-7, 'error'],
  ])('length %s gives %s', (length, level) => {
    expect(lengths(off(clean, 9, length))[0]?.level).toBe(level);
  });

  test('normalised bytes are off by up to 7.4e-3 by design, which is no finding; shorts keep the usual limits', () => {
    expect(lengths(off(clean, 9, 1.0074, 'int8'))).toEqual([]);
    expect(lengths(off(clean, 9, 1.04, 'int8'))).toMatchObject([{ level: 'error' }]);
    expect(lengths(off(clean, 9, 1.0074, 'int16'))).toMatchObject([{ level: 'warning' }]);
  });

  test('the remedy keeps every angle and plays as before', () => {
    const track = off(clean, 9, 1.0011);
    const [{ remedy }] = lengths(track);
    expect(remedy).toMatchObject({ verb: 'normalise', keys: [9] });
    const mended = verbNamed('normalise').apply(track, remedy!).track;
    expect(lengths(mended)).toEqual([]);
    const [a, b] = [track, mended].map((one) => keyOrientation(new Float64Array(4), one, 9));
    // 1e-7° by EDITS; the rest is float64.
    expect(angleBetween(a, b)).toBeLessThan(1e-15);
    const [before, after] = [track, mended].map((one) => playAs(one, 'as-written'));
    for (let time = 0; time < 1.3; time += 0.01)
      expect(
        angleBetween(
          before.orientation(new Float64Array(4), time),
          after.orientation(new Float64Array(4), time),
        ),
      ).toBeLessThan(1e-14);
  });

  test('under half of unit length the key is bridged, and a key of no length is no key to play', () => {
    expect(lengths(off(clean, 9, 0.49))[0].remedy).toMatchObject({ verb: 'bridge', keys: [9] });
    const track = off(clean, 9, 0);
    expect(lengths(track)[0].message).toBe("key 9 is a quaternion of no length, so the key can't be played");
    expect(surveyTrack(verbNamed('bridge').apply(track, lengths(track)[0].remedy!).track)).toEqual([]);
  });

  test('tangents are never looked at', () => {
    const cubic = keyed(MOTION, grid(40), 'CUBICSPLINE');
    const values = cubic.values.map((value, i) => (i % 12 < 4 || i % 12 >= 8 ? value * 50 : value));
    expect(lengths(storedTrack({ ...cubic, values }))).toEqual([]);
  });
});
