import { describe, expect, test } from 'vitest';
import { playAs, storedTrack } from '@slewcurve/core';
import { applySteps } from '@slewcurve/mend';
import { surveyTrack } from '@slewcurve/survey';
import { grid, keyed } from '../../../support/smooth-track.js';
import { seededRandom } from '../../../support/seeded-random.js';

const CLEAN = keyed({ spin: [0, 20, 0], swing: [8, 0, 4], hertz: 0.4, phase: 1 }, grid(40), 'LINEAR');

function timed(change: Readonly<Record<number, number>>, values: Float64Array = CLEAN.values) {
  return storedTrack({ ...CLEAN, values, times: CLEAN.times.map((time, key) => change[key] ?? time) });
}
const orders = (track: Parameters<typeof surveyTrack>[0]) =>
  surveyTrack(track).filter(({ rule }) => rule === 'file.time-order');

// NEEDS A15.
describe('file.time-order', () => {
  test('rising times, negative ones too, are no finding', () => {
    expect(orders(CLEAN)).toEqual([]);
    expect(orders(storedTrack({ ...CLEAN, times: CLEAN.times.map((time) => time - 10) }))).toEqual([]);
  });

  test('a key earlier than one before it is an error that names it', () => {
    const [finding] = orders(timed({ 20: 0.5 }));
    expect(finding).toMatchObject({ level: 'error', keys: [20], count: 1, unit: 's' });
    expect(finding.message).toMatch(/^key 20 at 0\.500 s is 0\.133 s earlier than a key before it$/);
  });

  test('every key behind the latest time is named, not the first alone', () => {
    expect(orders(timed({ 10: 0.9 }))[0].occurrences.map(({ keys }) => keys[0])).toEqual(
      Array.from({ length: 17 }, (_, i) => i + 11),
    );
  });

  test('a repeat of time and values and two values at one time are told apart', () => {
    const values = Float64Array.from(CLEAN.values);
    values.copyWithin(80, 76, 80);
    expect(orders(timed({ 20: CLEAN.times[19] }, values))[0].message).toContain('repeats the key before it');
    expect(orders(timed({ 20: CLEAN.times[19] }))[0].message).toContain('if a cut is meant, declare it');
  });

  test('keys 1e-6 s apart are a warning: 10° there is 10 million deg/s', () => {
    const [finding] = orders(timed({ 20: CLEAN.times[19] + 1e-6 }));
    expect(finding).toMatchObject({ level: 'warning', keys: [20] });
    expect(finding.value).toBeCloseTo(1e-6, 11);
    expect(finding.message).toBe('key 20 comes 0.000001 s after the key before it (limit 0.00033 s)');
  });

  test('less than 1 % of the median gap is a warning, whatever the clock', () => {
    const slow = storedTrack({
      ...CLEAN,
      times: CLEAN.times.map((time, key) => (key === 20 ? 19.009 : key) || time),
    });
    expect(orders(slow)).toMatchObject([{ level: 'warning', limit: 0.01, keys: [20] }]);
  });

  test('sorting is proposed for keys out of order and exact repeats, and leaves no finding; two values at one time are left to people', () => {
    const values = Float64Array.from(CLEAN.values);
    values.copyWithin(80, 76, 80);
    for (const track of [timed({ 20: 0.51 }), timed({ 20: CLEAN.times[19] }, values)]) {
      const { remedy } = orders(track)[0];
      expect(remedy).toEqual({ verb: 'sort times', clip: 'Wave', track: 'Arm' });
      expect(orders(applySteps([track], [remedy!]).tracks[0])).toEqual([]);
    }
    expect(orders(timed({ 20: CLEAN.times[19] }))[0].remedy).toBeUndefined();
    expect(orders(timed({ 20: 0.5, 21: Number.NaN }))[0].remedy).toBeUndefined();
  });

  test('no order of times makes a survey or a playback throw or give NaN (seed 15)', () => {
    const random = seededRandom(15);
    const pool = [Number.NaN, Infinity, -Infinity, 0, -0, 1e-320, 1e308, -1e308, 0.5, 0.5, 0.5000001];
    for (let run = 0; run < 300; run++) {
      const times = CLEAN.times.map((time) =>
        random() < 0.4 ? pool[Math.floor(random() * pool.length)] : time,
      );
      const track = storedTrack({ ...CLEAN, times });
      const text = JSON.stringify(surveyTrack(track, { playbacks: ['as-written', 'finite-cubic', 'chord'] }));
      expect(text.includes('null')).toBe(false);
      const curve = playAs(track, 'as-written');
      const played = curve.orientation(new Float64Array(4), random() * 2);
      expect(Math.hypot(...played)).toBeCloseTo(1, 12);
    }
  });
});
