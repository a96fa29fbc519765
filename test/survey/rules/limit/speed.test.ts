import { type RotationTrack, rotationTrack } from '@slewcurve/core';
import { verbNamed } from '@slewcurve/mend';
import { type HouseRules, NO_HOUSE_RULES, surveyTrack } from '@slewcurve/survey';
import * as fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { played } from '../../../support/pace-tracks.js';
import { peakOf } from '../../../support/pace-acceptance.js';
import { seededRandom } from '../../../support/seeded-random.js';
import { turningTrack } from '../../../support/turning-track.js';

fc.configureGlobal({ ...fc.readConfigureGlobal(), seed: 5 });

const limited = (rate: number, role: 'machine' | 'prop' = 'machine'): HouseRules => ({
  ...NO_HOUSE_RULES,
  roles: { '*': role },
  limits: { '*': { 'limit.speed': rate } },
});
const over = (track: RotationTrack, houseRules: HouseRules) =>
  surveyTrack(track, { houseRules }).find(({ rule }) => rule === 'limit.speed');

describe('limit.speed', () => {
  test('a machine’s 40 deg/s for 1 s of 3 s is over 20: peak, seconds over and the least stretch are told', () => {
    const track = turningTrack((key) => [0, 10, 50, 60][key] ?? 0, 4, 1);
    const finding = over(track, limited(20))!;
    expect(finding).toMatchObject({
      level: 'warning',
      unit: 'deg/s',
      limit: 20,
      keys: [2],
      count: 1,
      span: [1, 2],
    });
    expect(finding.value).toBeCloseTo(40, 6);
    expect(finding.message).toContain('over it for 1.00 s; 2.00 times as slow it would keep it');
    expect(over(track, limited(20, 'prop'))?.level).toBe('note');
  });

  test('the remedy caps at the limit, and then nothing is over it; so does the stretch that is told', () => {
    fc.assert(
      fc.property(played, fc.double({ min: 0.4, max: 0.9, noNaN: true }), (track, share) => {
        const rate = peakOf(track) * share;
        fc.pre(rate > 0.5);
        const finding = over(track, limited(rate))!;
        expect(finding.value).toBeCloseTo(peakOf(track), 2);
        const step = finding.remedy!;
        expect(step).toMatchObject({ verb: 'cap', rate });
        expect(over(verbNamed('cap').apply(track, step).track, limited(rate))).toBeUndefined();
        const length = track.times[track.times.length - 1] - track.times[0];
        const seconds = (length * finding.value) / rate;
        const slower = verbNamed('stretch').apply(track, { ...step, verb: 'stretch', seconds });
        expect(over(slower.track, limited(rate))).toBeUndefined();
      }),
      { numRuns: 10, endOnFailure: true },
    );
  });

  test('0.5 % over is kept, nothing is claimed of grain, and without a limit nothing is said', () => {
    const pan = turningTrack((key) => 20 * key, 4, 1);
    expect(over(pan, limited(19.95))).toBeUndefined();
    expect(over(pan, limited(19.8))?.value).toBeCloseTo(20, 6);
    expect(over(pan, NO_HOUSE_RULES)).toBeUndefined();
    // Grain of 0.1° an axis at 50 Hz runs at some 20 deg/s by itself.
    const random = seededRandom(7);
    const noise = (): number => ((random() + random() + random() - 1.5) * 0.2 * Math.PI) / 180;
    const values = Array.from({ length: 400 }, () => [noise() / 2, noise() / 2, noise() / 2, 1]).flat();
    const times = Array.from({ length: 400 }, (_, key) => key / 50);
    const still = rotationTrack({ times, values });
    expect(peakOf(still)).toBeGreaterThan(15);
    expect(over(still, limited(5))).toBeUndefined();
    expect(over(still, limited(5))?.value).toBeUndefined();
  });

  test('declared whips and held poses are none', () => {
    const pan = turningTrack((key) => 20 * key, 4, 1);
    const whips = [{ clip: '*', track: '*', span: [0, 3] as const }];
    const house = limited(5);
    expect(over(pan, { ...house, declared: { ...house.declared, whips } })).toBeUndefined();
    expect(
      over(
        turningTrack((key) => 20 * key, 4, 1, { interpolation: 'STEP' }),
        house,
      ),
    ).toBeUndefined();
  });
});
