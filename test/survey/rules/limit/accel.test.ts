import { type RotationTrack, measure, playAs, replaceTrack } from '@slewcurve/core';
import { verbNamed } from '@slewcurve/mend';
import { type HouseRules, NO_HOUSE_RULES, surveyTrack } from '@slewcurve/survey';
import { describe, expect, test } from 'vitest';
import { grid, keyed } from '../../../support/smooth-track.js';
import { turningTrack } from '../../../support/turning-track.js';

const DEGREES = 180 / Math.PI;
const limited = (acceleration: number, rate?: number): HouseRules => ({
  ...NO_HOUSE_RULES,
  roles: { '*': 'machine' },
  limits: { machine: { 'limit.accel': acceleration, ...(rate !== undefined && { 'limit.speed': rate }) } },
});
const over = (track: RotationTrack, houseRules: HouseRules) =>
  surveyTrack(track, { houseRules }).find(({ rule }) => rule === 'limit.accel');

describe('limit.accel', () => {
  test('straight segments step by 20 deg/s over half of either gap: 20 deg/s² at keys 1 s apart', () => {
    const finding = over(
      turningTrack((key) => [0, 10, 40, 50][key] ?? 0, 4, 1),
      limited(10),
    )!;
    expect(finding).toMatchObject({ level: 'warning', unit: 'deg/s²', limit: 10, count: 1 });
    expect(finding.value).toBeCloseTo(20, 6);
    // Both steps of 20 deg/s, a second each; acceleration falls with the square of the time.
    expect(finding.message).toContain('over it for 2.00 s; 1.41 times as slow it would keep it');
    expect(finding.message).toContain('its step spread over half of either gap');
  });

  test('a smooth curve is measured exactly, bends included, and the remedy keeps the limit', () => {
    const motion = { spin: [0, 30, 0], swing: [20, 10, 0], hertz: 0.3, phase: 1 } as const;
    const track = keyed(motion, grid(91), 'CUBICSPLINE');
    const curve = playAs(track, 'as-written');
    const finding = over(track, limited(30))!;
    expect(finding.value).toBeCloseTo(measure(curve).peakAcceleration * DEGREES, 3);
    const step = finding.remedy!;
    expect(step).toMatchObject({ verb: 'cap', acceleration: 30 });
    const capped = verbNamed('cap').apply(track, step).track;
    const left = over(capped, limited(30));
    // Cubics of four numbers ripple by some per cent about the cap's own acceleration.
    expect(left === undefined ? 0 : left.value).toBeLessThan(30 * 1.05);
    expect(over(track, limited(30, 12))?.remedy?.rate).toBe(12);
  });

  test('without a limit nothing is said; corners are rounded by the remedy, cuts count for nothing', () => {
    const track = turningTrack((key) => [0, 10, 40, 50][key] ?? 0, 4, 1);
    expect(over(track, NO_HOUSE_RULES)).toBeUndefined();
    const cut = replaceTrack(
      turningTrack((key) => [0, 10, 90, 100][key] ?? 0, 4, 1),
      { breaks: [1] },
    );
    expect(over(cut, limited(5))).toBeUndefined();
  });
});
