import { describe, expect, test } from 'vitest';
import {
  angleBetween,
  keyOrientation,
  measure,
  playAs,
  replaceTrack,
  rotationTrack,
  type RotationTrack,
} from '@slewcurve/core';
import { verbNamed, type EditResult, type Step } from '@slewcurve/mend';

const RADIANS = Math.PI / 180;
const KEYS = 40;
const BAD = 20;

/** Three smooth angles at 30 a second, the first past a whole turn; degrees to radians. */
const sweep = (sequence: string, at: (t: number) => readonly number[]): RotationTrack =>
  rotationTrack({
    times: Array.from({ length: KEYS }, (_, key) => key / 30),
    values: Array.from({ length: KEYS }, (_, key) => at(key / 30))
      .flat()
      .map((x) => x * RADIANS),
    interpolation: 'EULER',
    sequence,
    storage: { component: 'text', decimals: 4, timeComponent: 'float64' },
    clip: 'MOTION',
    id: 'Mast',
  });

const WAVE = (t: number): number[] => [340 + 60 * t, 20 * Math.sin(2 * t), 15 * Math.cos(t)];

function withKey(track: RotationTrack, key: number, degrees: readonly number[]): RotationTrack {
  const values = track.values.slice();
  values.set(
    degrees.map((x) => x * RADIANS),
    3 * key,
  );
  return replaceTrack(track, { values });
}

const apply = (track: RotationTrack, step: Partial<Step> & { verb: string }): EditResult =>
  verbNamed(step.verb).apply(track, { clip: '*', track: '*', ...step });

const turnAt = (a: RotationTrack, b: RotationTrack, key: number): number =>
  angleBetween(keyOrientation([0, 0, 0, 1], a, key), keyOrientation([0, 0, 0, 1], b, key)) / RADIANS;

describe('an edit of angles', () => {
  const clean = sweep('ZXY', WAVE);

  test('lifts out a lone key: its angles alone change, by turns that fit their neighbours', () => {
    const [z, x, y] = WAVE(BAD / 30);
    const spoilt = withKey(clean, BAD, [z + 8, x - 3, y]);
    const result = apply(spoilt, { verb: 'lift out', keys: [BAD] });
    expect(result).toMatchObject({ changed: [BAD], inserted: [], added: 0 });
    expect(result.track).toMatchObject({ interpolation: 'EULER', sequence: 'ZXY', storage: clean.storage });
    // The fit is a cubic through its neighbours: on this wave within 0.001 degrees of it.
    expect(turnAt(result.track, clean, BAD)).toBeLessThan(1e-3);
    expect(result.largest).toBeCloseTo(turnAt(spoilt, result.track, BAD), 9);
    for (let i = 0; i < 3 * KEYS; i++) {
      const part = i - 3 * BAD;
      const same = Object.is(result.track.values[i], spoilt.values[i]);
      expect(same).toBe(part < 0 || part > 2);
    }
    expect(result.track.values[3 * BAD] / RADIANS).toBeCloseTo(z, 2);
  });

  test('takes back a key that is written as the other triple and a degree off', () => {
    const [z, x, y] = WAVE(BAD / 30);
    const other = withKey(clean, BAD, [z - 180 + 3, 180 - x, y + 180]);
    expect(measure(playAs(other, 'as-written')).peakRate / RADIANS).toBeGreaterThan(5000);
    const { track } = apply(other, { verb: 'lift out', keys: [BAD] });
    expect(measure(playAs(track, 'as-written')).peakRate / RADIANS).toBeLessThan(80);
  });

  test('bridges a step, and re-seats what follows', () => {
    const shelf = Array.from({ length: KEYS - BAD }, (_, n) => BAD + n);
    const stepped = shelf.reduce((track, key) => {
      const [z, x, y] = WAVE(key / 30);
      return withKey(track, key, [z + 6, x, y]);
    }, clean);
    const bridged = apply(stepped, { verb: 'bridge', keys: [BAD], steps: 6 });
    expect(bridged.changed.length).toBeGreaterThan(2);
    expect(measure(playAs(bridged.track, 'as-written')).peakRate).toBeLessThan(
      measure(playAs(stepped, 'as-written')).peakRate / 1.5,
    );
    const seated = apply(stepped, { verb: 're-seat', keys: [BAD], side: 'parent' });
    expect(seated.changed).toEqual(shelf);
    // The step is fitted from its neighbours: within 0.01 degrees on this wave.
    expect(Math.max(...shelf.map((key) => turnAt(seated.track, clean, key)))).toBeLessThan(0.01);
  });

  test('mends a key that is no number', () => {
    const lost = withKey(clean, BAD, [NaN, NaN, NaN]);
    const { track } = apply(lost, { verb: 'bridge', keys: [BAD] });
    expect(turnAt(track, clean, BAD)).toBeLessThan(0.05);
    expect(track.values[3 * BAD] / RADIANS).toBeCloseTo(WAVE(BAD / 30)[0], 0);
  });

  test('gives the very track back where nothing changed', () => {
    const still = sweep('XYZ', () => [0, 0, 0]);
    expect(apply(still, { verb: 'lift out', keys: [BAD] })).toMatchObject({ changed: [] });
    expect(apply(still, { verb: 'lift out', keys: [BAD] }).track).toBe(still);
  });

  test('leaves verbs that put in keys or work on signs to quaternions', () => {
    expect(() => apply(clean, { verb: 'same side' })).toThrowError(
      expect.objectContaining({ code: 'step.needs-quaternions' }),
    );
  });
});
