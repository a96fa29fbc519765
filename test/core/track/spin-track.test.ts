import {
  angleBetween,
  angleTrackToLinear,
  fromAxisAngle,
  measure,
  playAs,
  rotationTrack,
  segmentAngle,
  spinTrack,
  subdivideAngles,
  turnsCurve,
} from '@slewcurve/core';
import { describe, expect, test } from 'vitest';

const DEGREES = 180 / Math.PI;
const RADIANS = Math.PI / 180;

describe('A3: whole turns are kept', () => {
  test('a spin of 360° in 2 s has 4 keys, travels 360.000° and turns at 180 deg/s everywhere', () => {
    const track = spinTrack({ axis: [0, 3, 0], angle: 2 * Math.PI, duration: 2 });
    expect(track.times.length).toBeGreaterThanOrEqual(4);
    for (let key = 0; key + 1 < track.times.length; key++)
      expect(segmentAngle(track, key) * DEGREES).toBeLessThan(120 + 1e-9);
    const curve = playAs(track, 'as-written');
    expect(Math.abs(measure(curve).travelled * DEGREES - 360)).toBeLessThan(1e-4);
    for (let n = 0; n < 100; n++)
      expect(curve.rate([0, 0, 0], n / 50, 'parent')[1] * DEGREES).toBeCloseTo(180, 9);
  });

  test('angles 0° to 360°, typed as a track, are subdivided before they become quaternions; −270° stays −270°', () => {
    for (const end of [360, -270, 1080]) {
      const typed = rotationTrack({
        times: [0, 2],
        values: [0, 0, 0, 0, 0, end * RADIANS],
        interpolation: 'EULER',
        sequence: 'XYZ',
      });
      const track = angleTrackToLinear(typed);
      expect(track.times.length).toBeGreaterThanOrEqual(Math.ceil(Math.abs(end) / 120) + 1);
      const curve = playAs(track, 'as-written');
      expect(measure(curve).travelled * DEGREES).toBeCloseTo(Math.abs(end), 9);
      for (let n = 0; n < 50; n++)
        expect(curve.rate([0, 0, 0], n / 25, 'own')[2] * DEGREES).toBeCloseTo(end / 2, 8);
      for (let n = 4; n < track.values.length; n += 4) {
        const dot = [0, 1, 2, 3].reduce((sum, k) => sum + track.values[n + k] * track.values[n - 4 + k], 0);
        expect(dot).toBeGreaterThan(0);
      }
      // As angles joined by numbers, with no keys put in, it is the same motion.
      expect(measure(playAs(typed, 'euler-linear')).travelled * DEGREES).toBeCloseTo(Math.abs(end), 9);
    }
  });

  test('turns given by number wind between two keys, against the short way where negative', () => {
    const values = [0, 1].flatMap((angle) => fromAxisAngle<number[]>([], [1, 0, 0], angle));
    const track = rotationTrack({ times: [0, 2], values });
    for (const turns of [-2, -1, 0, 3]) {
      const curve = turnsCurve(track, turns);
      const angle = 1 + 2 * Math.PI * turns;
      expect(curve.rate([0, 0, 0], 1, 'own')[0]).toBeCloseTo(angle / 2, 12);
      expect(curve.length(0, 2)).toBeCloseTo(Math.abs(angle), 12);
      expect(curve.peak(0, 2).rate).toBeCloseTo(Math.abs(angle) / 2, 12);
      expect(curve.acceleration([9, 9, 9], 1, 'own')).toEqual([0, 0, 0]);
      expect(
        angleBetween(curve.orientation<number[]>([], 0.5), fromAxisAngle<number[]>([], [1, 0, 0], angle / 4)),
      ).toBeLessThan(1e-14);
      expect(angleBetween(curve.orientation<number[]>([], 2), values.slice(4))).toBe(0);
    }
    expect(turnsCurve(track, [1]).length(0, 2)).toBeCloseTo(1 + 2 * Math.PI, 12);
    expect(playAs(track, 'long-way').length(0, 2)).toBeCloseTo(2 * Math.PI - 1, 12);
    const still = rotationTrack({ times: [0, 1], values: [0, 0, 0, 1, 0, 0, 0, -1] });
    expect(playAs(still, 'long-way').length(0, 1)).toBe(0);
    expect(playAs(still, 'long-way').rate([9, 9, 9], 0.5, 'own').map(Math.abs)).toEqual([0, 0, 0]);
  });
});

test('A8: a spin about a fixed parent axis of a tilted body has one rate in parent axes and the turned one in own', () => {
  const tilt = fromAxisAngle<number[]>([], [1, 0, 0], Math.PI / 3);
  const track = spinTrack({ axis: [0, 1, 0], about: 'parent', angle: 7, duration: 2, from: tilt });
  const flipped = rotationTrack({
    times: track.times,
    values: track.values.map((part, n) => (Math.floor(n / 4) % 2 === 1 ? -part : part)),
  });
  for (const curve of [playAs(track, 'short-way'), playAs(flipped, 'short-way')])
    for (let n = 0; n <= 20; n++) {
      const parent = curve.rate([0, 0, 0], n / 10, 'parent');
      const own = curve.rate([0, 0, 0], n / 10, 'own');
      expect(Math.hypot(parent[0], parent[1] - 3.5, parent[2])).toBeLessThan(1e-9);
      // R(x, 60°)⁻¹ of 3.5 about y.
      expect(
        Math.hypot(own[0], own[1] - 3.5 * Math.cos(Math.PI / 3), own[2] + 3.5 * Math.sin(Math.PI / 3)),
      ).toBeLessThan(1e-9);
    }
});

test('a spin about own axes starts from its orientation and turns on about them', () => {
  const from = fromAxisAngle<number[]>([], [1, 1, 0], 1);
  const track = spinTrack({ axis: [0, 0, 2], angle: -1, duration: 3, start: 5, from, id: 'Fan', clip: 'On' });
  expect(track).toMatchObject({ id: 'Fan', clip: 'On' });
  expect([...track.times]).toEqual([5, 8]);
  expect(playAs(track, 'short-way').rate([0, 0, 0], 6, 'own')[2]).toBeCloseTo(-1 / 3, 13);
});

test('a spin without axis or time is refused by name', () => {
  expect(() => spinTrack({ axis: [0, 0, 0], angle: 1, duration: 1 })).toThrow(
    expect.objectContaining({ code: 'spin.no-axis' }),
  );
  expect(() => spinTrack({ axis: [0, 0, 1], angle: 1, duration: 0 })).toThrow(
    expect.objectContaining({ code: 'spin.bad-duration' }),
  );
});

test('subdividing keeps the keys that went in to the bit, counts the steps of all three angles, and puts nothing in after a break', () => {
  const { times, angles, keys } = subdivideAngles([0, 1, 2], [0, 0, 0, 1, 1, 1, 9, 1, 1], 1.5, [1]);
  expect([...keys]).toEqual([0, 2, 3]);
  expect([...times]).toEqual([0, 0.5, 1, 2]);
  expect([...angles]).toEqual([0, 0, 0, 0.5, 0.5, 0.5, 1, 1, 1, 9, 1, 1]);
});

test('playbacks that need angles refuse tracks without, and the long way is its own complement', () => {
  const track = rotationTrack({ times: [0, 1], values: [0, 0, 0, 1, 0, 0, 1, 0] });
  expect(() => playAs(track, 'euler-linear')).toThrow(
    expect.objectContaining({ code: 'playback.needs-angles' }),
  );
  expect(() => rotationTrack({ times: [], values: [], interpolation: 'EULER', sequence: 'XXY' })).toThrow(
    expect.objectContaining({ code: 'euler.unknown-sequence' }),
  );
});
