import { playAs, PLAYBACKS, rotationTrack, storedTrack, type PlaybackId } from '@slewcurve/core';
import { describe, expect, test } from 'vitest';

const LINEAR = rotationTrack({ times: [0, 1], values: [0, 0, 0, 1, 0, 0.6, 0, -0.8] });
const NONE = [0, 0, 0, 0];
const CUBIC = rotationTrack({
  times: [0, 1],
  values: [...NONE, 0, 0, 0, 1, ...NONE, ...NONE, 0, 0.6, 0, -0.8, ...NONE],
  interpolation: 'CUBICSPLINE',
});
const STEPS = rotationTrack({ ...LINEAR, interpolation: 'STEP' });

test('every playback stands under its own id, frozen', () => {
  for (const [id, playback] of Object.entries(PLAYBACKS)) {
    expect(playback.id).toBe(id);
    expect(Object.isFrozen(playback)).toBe(true);
    expect(playback.says).not.toBe('');
  }
});

describe('as-written', () => {
  test('plays each track by its own mode', () => {
    expect(playAs(LINEAR, 'as-written').length(0, 1)).toBeCloseTo(2 * Math.atan2(0.6, 0.8), 12);
    expect(playAs(STEPS, 'as-written').orientation([], 0.999)).toEqual([0, 0, 0, 1]);
    expect(playAs(CUBIC, 'as-written').length(0, 1)).toBe(playAs(CUBIC, 'stored-cubic').length(0, 1));
  });

  test('is sign-safe where its mode is: great arcs and steps are, cubics are not', () => {
    expect([LINEAR, STEPS, CUBIC].map((track) => PLAYBACKS['as-written'].signSafe(track))).toEqual([
      true,
      true,
      false,
    ]);
  });
});

test.each(['short-way', 'chord', 'raw-chord', 'finite-cubic', 'step'] as const)(
  '%s says truly whether the sign of a key matters',
  (id) => {
    const values = LINEAR.values.map((part, i) => (i < 4 ? part : -part));
    const flipped = rotationTrack({ ...LINEAR, values });
    const same = Math.abs(playAs(LINEAR, id).length(0, 1) - playAs(flipped, id).length(0, 1)) < 1e-9;
    expect(PLAYBACKS[id].signSafe(LINEAR)).toBe(same);
  },
);

test('stored-cubic refuses a track without tangents and says what to do', () => {
  expect(() => playAs({ ...LINEAR, id: 'Root/Arm' }, 'stored-cubic')).toThrow(
    expect.objectContaining({ code: 'playback.needs-tangents', place: { track: 'Root/Arm', clip: '' } }),
  );
});

test('an id that is none is refused by name', () => {
  const id: string = 'sideways';
  // oxlint-disable-next-line typescript/no-unsafe-type-assertion -- what an untyped caller would pass
  expect(() => playAs(LINEAR, id as PlaybackId)).toThrow(
    expect.objectContaining({ code: 'playback.unknown' }),
  );
});

test('a cubic with a key that cannot be played plays the rest (A15)', () => {
  const values = [...CUBIC.values, NaN, ...CUBIC.values.subarray(1, 12)];
  const curve = playAs(storedTrack({ ...CUBIC, times: [0, 1, 2], values }), 'stored-cubic');
  expect([curve.start, curve.end]).toEqual([0, 1]);
});

test.each(['as-written', 'short-way', 'long-way', 'chord', 'raw-chord', 'finite-cubic', 'step'] as const)(
  '%s is finite at every key gap and turn that float64 can hold, down to 5e-324',
  (id) => {
    for (const times of [
      [0, 5e-324],
      [0, 1e-310, 1],
      [0, 1, 1 + 2 ** -52],
    ])
      for (const small of [0, 5e-324, 1e-310, 1e-160, 1e-17]) {
        const values = [
          [0, 0, 0, 1],
          [small, 0, 0, 1],
          [0, 0.6, 0, 0.8],
        ]
          .slice(0, times.length)
          .flat();
        const curve = playAs(rotationTrack({ times, values }), id);
        for (const t of [...times, times[1] / 2])
          for (const frame of ['own', 'parent'] as const)
            expect(
              [
                ...curve.orientation<number[]>([], t),
                ...curve.rate<number[]>([], t, frame),
                ...curve.acceleration<number[]>([], t, frame),
              ].every(Number.isFinite),
            ).toBe(true);
      }
  },
);
