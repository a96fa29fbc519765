import { describe, expect, test } from 'vitest';
import type { RotationTrack } from '@slewcurve/core';
import { NO_HOUSE_RULES, surveyTrack, type HouseRules } from '@slewcurve/survey';
import { turningTrack } from '../../../support/turning-track.js';

const CAMERA: HouseRules = { ...NO_HOUSE_RULES, roles: { '*': 'camera-screen' } };
const hum = (track: RotationTrack, houseRules = CAMERA) =>
  surveyTrack(track, { houseRules }).find(({ rule }) => rule === 'shake.hum');

/** A pan of 5 deg/s, with a ripple between two times, at 60 keys a second for 20 s. */
function pan(hertz: number, amplitude: number, from = 0, to = 20): RotationTrack {
  return turningTrack(
    (key) =>
      (5 * key) / 60 +
      (key / 60 >= from && key / 60 <= to ? amplitude * Math.sin((2 * Math.PI * hertz * key) / 60) : 0),
    1200,
    60,
  );
}

const shorts = (track: RotationTrack): RotationTrack => ({
  ...track,
  values: track.values.map((value) => Math.round(value * 32767) / 32767),
  storage: { component: 'int16', timeComponent: 'float32' },
});

describe('shake.hum', () => {
  // NEEDS A11.
  test('a camera’s pan of 5 deg/s with ±0.1° at 8 Hz hums at 8 Hz; the pan alone does not', () => {
    const finding = hum(pan(8, 0.1))!;
    expect(finding).toMatchObject({ level: 'warning', unit: 'Hz', count: 1 });
    expect(Math.abs(finding.value - 8)).toBeLessThan(0.05);
    expect(finding.message).toContain('hums at 8.0 Hz by ±0.1');
    expect(hum(pan(8, 0))).toBeUndefined();
  });

  test('in shorts the pan is clean, and the ripple is still found', () => {
    expect(surveyTrack(shorts(pan(8, 0)), { houseRules: CAMERA })).toEqual([]);
    expect(hum(shorts(pan(8, 0.1)))!.value).toBeCloseTo(8, 1);
  });

  test('a hum of five seconds is told in its own time', () => {
    const finding = hum(pan(11, 0.2, 8, 13))!;
    expect(Math.abs(finding.value - 11)).toBeLessThan(0.1);
    // A window of 2.5 s hears it from 60 % of its own power on.
    expect(finding.span[0]).toBeGreaterThan(5.5);
    expect(finding.span[1]).toBeLessThan(15.5);
  });

  // Windows of 60, 63, 125, 222 (2·3·37) and 445 (5·89) keys: even, odd, and of a large prime.
  test.each([24, 25, 50, 88.8, 178])('at %d keys a second a hum of 9 Hz is heard as 9.0 Hz', (rate) => {
    const track = turningTrack(
      (key) => (5 * key) / rate + 0.3 * Math.sin((2 * Math.PI * 9 * key) / rate),
      Math.round(10 * rate),
      rate,
    );
    expect(Math.abs(hum(track)!.value - 9)).toBeLessThan(0.05);
  });

  test('slower than 4 Hz, smaller than the limit, or keyed sparsely it is no hum', () => {
    expect(hum(pan(3, 0.3))).toBeUndefined();
    expect(hum(pan(8, 0.03))).toBeUndefined();
    expect(hum(pan(8, 0.2), NO_HOUSE_RULES)).toBeUndefined();
    expect(hum(turningTrack((key) => key, 40, 4))).toBeUndefined();
  });
});
