import { SlewcurveError, rotationTrack, slerp, angleBetween, type RotationTrack } from '@slewcurve/core';
import { NO_HOUSE_RULES, parseHouseRules, surveyTrack, type Finding } from '@slewcurve/survey';
import * as fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { turningTrack } from '../../../support/turning-track.js';

const ASKED = parseHouseRules({ limits: { '*': { 'keys.too-many': 30 } } });

function found(track: RotationTrack, houseRules = ASKED): Finding | undefined {
  return surveyTrack(track, { houseRules }).find(({ rule }) => rule === 'keys.too-many');
}

describe('keys.too-many', () => {
  test('a steady turn of 61 keys needs two of them, and nobody is told who did not ask', () => {
    const track = turningTrack((key) => 2 * key, 61);
    expect(found(track)).toMatchObject({ level: 'note', unit: '%', limit: 30, keys: [], count: 1 });
    // 59 of 61 could go.
    expect(found(track)!.value).toBeCloseTo((100 * 59) / 61, 3);
    expect(found(track)!.message).toBe(
      '59 of its 61 keys (97 %, limit 30 %) could go and it would play within 0.25° and 10.0 deg/s',
    );
    expect(found(track, NO_HOUSE_RULES)).toBeUndefined();
  });

  test('keys that zigzag by 1° are all needed, and so is one on each side of a cut and of half a turn', () => {
    expect(found(turningTrack((key) => key % 2, 61))).toBeUndefined();
    // 300° in all: one key in the middle stays, at least.
    const wide = found(turningTrack((key) => 5 * key, 61))!;
    expect(wide.value).toBeLessThanOrEqual((100 * 58) / 61 + 1e-3);
    const steady = turningTrack((key) => 2 * key, 61);
    const cut = found(rotationTrack({ ...steady, breaks: [30] }))!;
    expect(cut.value).toBeCloseTo((100 * 57) / 61, 3);
  });

  test('STEP and CUBICSPLINE are not judged', () => {
    for (const interpolation of ['STEP', 'CUBICSPLINE'] as const)
      expect(found(turningTrack((key) => 2 * key, 61, 30, { interpolation }))).toBeUndefined();
  });

  test('no number of keys is claimed that a zigzag of a known size within the tolerance does not allow (seed 7)', () => {
    // Off the straight turn by less than 0.1° either way: a slerp from end to end stays within 0.2° of each key, and within 6 deg/s.
    fc.assert(
      fc.property(
        fc.array(fc.double({ min: -0.1, max: 0.1, noNaN: true }), { minLength: 3, maxLength: 60 }),
        (offs) => {
          const track = turningTrack((key) => key + (offs[key] ?? 0), offs.length);
          const finding = found(track);
          expect(finding!.value).toBeCloseTo((100 * (offs.length - 2)) / offs.length, 2);
          // What is claimed, looked at: the straight turn at every key.
          const ends = [track.values.subarray(0, 4), track.values.subarray(-4)] as const;
          for (let key = 0; key < offs.length; key++) {
            const straight = slerp(new Float64Array(4), ends[0], ends[1], key / (offs.length - 1));
            const off = angleBetween(straight, track.values.subarray(4 * key, 4 * key + 4));
            expect((off * 180) / Math.PI).toBeLessThan(0.25);
          }
        },
      ),
      { seed: 7 },
    );
  });

  test('house rules that name no such limit are refused', () => {
    expect(() => parseHouseRules({ limits: { prop: { 'keys.too-many': { angel: 1 } } } })).toThrow(
      SlewcurveError,
    );
  });
});
