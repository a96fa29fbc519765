import { describe, expect, test } from 'vitest';
import { NO_HOUSE_RULES, surveyTrack } from '@slewcurve/survey';
import { turningTrack } from '../../../support/turning-track.js';

function lost(degreesAKey: number, rpm: number) {
  const spins = [{ clip: '*', track: '*', rpm }];
  const houseRules = { ...NO_HOUSE_RULES, declared: { ...NO_HOUSE_RULES.declared, spins } };
  return surveyTrack(
    turningTrack((key) => degreesAKey * key, 10),
    { houseRules },
  ).find(({ rule }) => rule === 'turn.lost');
}

describe('turn.lost', () => {
  test('a declared spin of 150° a key is named at every step, one of 120° is not', () => {
    expect(lost(150, 750)).toMatchObject({ level: 'warning', count: 9, value: 150, limit: 120.01 });
    expect(lost(120, 600)).toBeUndefined();
    expect(surveyTrack(turningTrack((key) => 150 * key, 10)).some(({ rule }) => rule === 'turn.lost')).toBe(
      false,
    );
  });

  test('1,200 turns a minute at 30 keys a second come out as 120° a key instead of 240°', () => {
    const finding = lost(240, 1200)!;
    expect(finding.value).toBeCloseTo(120, 6);
    expect(finding.limit).toBeCloseTo(240, 6);
  });
});
