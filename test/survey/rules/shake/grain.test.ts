import { describe, expect, test } from 'vitest';
import { expMap, multiply, rotationTrack, type RotationTrack } from '@slewcurve/core';
import { surveyTrack } from '@slewcurve/survey';
import { seededRandom } from '../../../support/seeded-random.js';
import { turningTrack } from '../../../support/turning-track.js';

/** The track with normal noise of a standard deviation, degrees, about each own axis. */
function noisy(track: RotationTrack, deviation: number): RotationTrack {
  const random = seededRandom(7);
  // Box and Muller's normal numbers.
  const normal = (): number =>
    Math.sqrt(-2 * Math.log(1 - random())) * Math.cos(2 * Math.PI * random()) * deviation * (Math.PI / 180);
  const values = Float64Array.from(track.values);
  for (let at = 0; at < values.length; at += 4) {
    const noise = expMap(new Float64Array(4), [normal(), normal(), normal()]);
    values.set(multiply(noise, values.slice(at, at + 4), noise), at);
  }
  return rotationTrack({ ...track, values });
}

const grain = (track: RotationTrack) => surveyTrack(track).find(({ rule }) => rule === 'shake.grain');
const slow = (rate: number) =>
  turningTrack((key) => 20 * Math.sin((2 * Math.PI * 0.3 * key) / rate), 20 * rate, rate);

describe('shake.grain', () => {
  test.each([0.15, 0.5, 1])('noise of %f° an axis at 60 keys a second is measured to 6 %%', (deviation) => {
    const finding = grain(noisy(slow(60), deviation))!;
    expect(finding).toMatchObject({ level: 'warning', keys: [], unit: 'deg', limit: 0.1, count: 1 });
    // The median of 1,196 lengths, each of which shares values with its neighbours: 2 % is one standard error.
    expect(Math.abs(finding.value / deviation - 1)).toBeLessThan(0.06);
  });

  test('0.05° is below a prop’s limit, a clean motion far below, and slow rates are let read more', () => {
    expect(grain(noisy(slow(60), 0.05))).toBeUndefined();
    expect(grain(slow(60))).toBeUndefined();
    expect(grain(noisy(slow(30), 0.2))).toBeUndefined();
    expect(grain(noisy(slow(30), 0.3))!.limit).toBeCloseTo(0.25, 3);
  });

  test('where all keys are fast nothing is told', () => {
    const fast = turningTrack((key) => 3 * key, 300, 60);
    expect(grain(noisy(fast, 0.3))).toBeUndefined();
  });
});
