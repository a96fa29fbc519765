import { describe, expect, test } from 'vitest';
import { rotationTrack, type RotationTrack } from '@slewcurve/core';
import { NO_HOUSE_RULES, surveyTrack } from '@slewcurve/survey';
import { turningTrack } from '../../../support/turning-track.js';

const holes = (track: RotationTrack, houseRules = NO_HOUSE_RULES) =>
  surveyTrack(track, { houseRules }).filter(({ rule }) => rule === 'file.hole');

/** A turn of `speed` degrees a key without keys 21 to 25: a capture’s hole. */
function broken(speed: number): RotationTrack {
  const whole = turningTrack((key) => speed * key, 60);
  const kept = [...whole.times.keys()].filter((key) => key <= 20 || key > 25);
  return rotationTrack({
    ...whole,
    times: kept.map((key) => whole.times[key]),
    values: kept.flatMap((key) => [...whole.values.subarray(4 * key, 4 * key + 4)]),
    breaks: [20],
  });
}

describe('file.hole', () => {
  test('five lost samples of a turn of 30 deg/s are a warning that says how many and how far', () => {
    const [finding] = holes(broken(1));
    expect(finding).toMatchObject({ level: 'warning', keys: [21], unit: 's', count: 1 });
    expect(finding.value).toBeCloseTo(6 / 30, 6);
    expect(finding.message).toContain('some 5 samples are missing');
    expect(finding.message).toContain('it turns by 6.0°');
  });

  test('while it stands still they are a note', () => {
    expect(holes(broken(0.01))).toMatchObject([{ level: 'note' }]);
  });

  test('a whole track, and a declared cut, have none', () => {
    const whole = turningTrack((key) => key, 60);
    expect(holes(whole)).toEqual([]);
    const cuts = [{ clip: '*', track: '*', time: 1 }];
    expect(holes(whole, { ...NO_HOUSE_RULES, declared: { ...NO_HOUSE_RULES.declared, cuts } })).toEqual([]);
  });
});
