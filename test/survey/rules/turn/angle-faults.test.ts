import { describe, expect, test } from 'vitest';
import { rotationTrack, toEuler, type RotationTrack } from '@slewcurve/core';
import { applySteps } from '@slewcurve/mend';
import { NO_HOUSE_RULES, surveyTrack, type TrackSurveySettings } from '@slewcurve/survey';
import { grid, poseAt } from '../../../support/smooth-track.js';

type Triple = readonly [number, number, number];

/** Angles in degrees, a key each tenth of a second. */
function angles(triples: readonly Triple[], sequence = 'XYZ'): RotationTrack {
  const values = triples.flat().map((angle) => (angle * Math.PI) / 180);
  const times = triples.map((_, key) => key / 10);
  return rotationTrack({ times, values, interpolation: 'EULER', sequence });
}

function turns(track: RotationTrack, settings: TrackSurveySettings = {}) {
  return surveyTrack(track, settings).filter(({ rule }) => /^turn\.(wrap|euler|gimbal|long)/.test(rule));
}

describe('rules of angle tracks', () => {
  // RULES 15: 350° travelled for 10° true.
  test('355° and then 5° is a wrap: 350° travelled for a true 10°', () => {
    const [finding, ...rest] = turns(
      angles([
        [340, 0, 0],
        [355, 0, 0],
        [5, 0, 0],
        [20, 0, 0],
      ]),
    );
    expect(rest).toEqual([]);
    expect(finding).toMatchObject({ rule: 'turn.wrap', level: 'warning', keys: [2], value: 350, limit: 180 });
    expect(finding.message).toContain('turns 350.0° for a true 10.0°');
  });

  // RULES 16: the other triple; a large detour for no turn at all.
  test('(30, 40, 50) and then (210, 140, 230) is one orientation written twice', () => {
    const [finding, ...rest] = turns(
      angles([
        [30, 40, 50],
        [30, 40, 50],
        [210, 140, 230],
      ]),
    );
    expect(rest).toEqual([]);
    expect(finding).toMatchObject({ rule: 'turn.euler-flip', keys: [2] });
    expect(finding.value).toBeGreaterThan(150);
    expect(finding.limit).toBeLessThan(1e-6);
  });

  test('unwrapping is proposed for both, and clears them without moving a key', () => {
    const track = angles([
      [340, 0, 0],
      [355, 0, 0],
      [5, 0, 0],
      [20, 0, 0],
      [200, 180, 180],
      [202, 179, 181],
    ]);
    const found = turns(track);
    expect(found.map(({ rule }) => rule)).toEqual(['turn.wrap', 'turn.euler-flip']);
    const steps = found.flatMap(({ occurrences }) => occurrences.map(({ remedy }) => remedy!));
    const { tracks, results } = applySteps([track], steps);
    expect(turns(tracks[0])).toEqual([]);
    for (const { result } of results) expect(result.largest).toBeLessThan(1e-5);
  });

  test('within 5° of the pole angles that race are named, and the detour between keys makes it a warning', () => {
    const [finding, ...rest] = turns(
      angles([
        [0, 86, 0],
        [80, 86, -80],
      ]),
    );
    expect(rest).toEqual([]);
    expect(finding).toMatchObject({ rule: 'turn.gimbal', keys: [1], unit: 'times', limit: 5 });
    const [calm] = turns(
      angles([
        [0, 88, 0],
        [8, 88, -8],
      ]),
    );
    expect(calm).toMatchObject({ rule: 'turn.gimbal', level: 'note' });
  });

  test('270° in one step leads another way round than quaternions would go, unless a spin is declared', () => {
    const spin = angles([
      [0, 0, 0],
      [170, 0, 0],
      [340, 0, 0],
      [510, 0, 0],
    ]);
    expect(turns(spin)).toEqual([]);
    const long = angles([
      [0, 0, 0],
      [200, 0, 0],
    ]);
    expect(turns(long)).toMatchObject([{ rule: 'turn.long-way', keys: [1], value: 200 }]);
    const spins = [{ clip: '*', track: '*', rpm: 333.3 }];
    const houseRules = { ...NO_HOUSE_RULES, declared: { ...NO_HOUSE_RULES.declared, spins } };
    expect(turns(long, { houseRules })).toEqual([]);
    expect(turns(long, { playbacks: ['short-way'] })).toEqual([]);
  });

  // NEEDS A16.
  test.each(['XYZ', 'ZYX', 'YXZ', 'ZXZ', 'xyz', 'YZX'])(
    'a smooth motion written in %s raises no jump; each jump of its angles is one finding here',
    (sequence) => {
      const motion = { spin: [25, 40, 10], swing: [30, 20, 10], hertz: 0.4, phase: 1 } as const;
      const times = grid(300, 60);
      const values = times.flatMap((time) => [
        ...toEuler(new Float64Array(3), poseAt(motion, time), sequence),
      ]);
      const track = rotationTrack({ times, values, interpolation: 'EULER', sequence });
      expect(surveyTrack(track).filter(({ rule }) => rule.startsWith('jump.'))).toEqual([]);
      const jumps = times.flatMap((_, key) =>
        key > 0 && [0, 1, 2].some((i) => Math.abs(values[3 * key + i] - values[3 * key - 3 + i]) > Math.PI)
          ? [key]
          : [],
      );
      const found = turns(track).flatMap(({ occurrences }) => occurrences.flatMap(({ keys }) => keys));
      expect(found).toEqual(expect.arrayContaining(jumps));
    },
  );
});
