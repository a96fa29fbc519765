import { type RotationTrack, expMap, multiply, replaceTrack } from '@slewcurve/core';
import { type Step, applySteps } from '@slewcurve/mend';
import { type HouseRules, NO_HOUSE_RULES, type Occurrence, surveyTrack } from '@slewcurve/survey';
import { describe, expect, test } from 'vitest';
import { captured, moved, panTilt } from '../support/captured.js';
import { grid, keyed, turned } from '../support/smooth-track.js';
import { turningTrack } from '../support/turning-track.js';

const LOOP: HouseRules = { ...NO_HOUSE_RULES, loops: ['*'] };
const CAMERA: HouseRules = { ...NO_HOUSE_RULES, roles: { '*': 'camera-screen' } };
const HELD: HouseRules = {
  ...NO_HOUSE_RULES,
  declared: { ...NO_HOUSE_RULES.declared, holds: [{ clip: '*', track: '*', span: [0, 100] }] },
};

/** The first place of a rule's finding. */
function placeOf(rule: string, track: RotationTrack, houseRules: HouseRules): Occurrence | undefined {
  return surveyTrack(track, { houseRules }).find((finding) => finding.rule === rule)?.occurrences[0];
}

/** A gust of 170° in 0.35 s on a calm day, with noise. */
const gust = captured((t) => panTilt(moved(t, 5, 5.35, 170), 0), { keys: 600, rate: 60, grain: 0.15 });
const whip: HouseRules = {
  ...NO_HOUSE_RULES,
  declared: { ...NO_HOUSE_RULES.declared, whips: [{ clip: '*', track: '*', span: [5, 5.35] }] },
};

const stretch = Array.from({ length: 20 }, (_, i) => 40 + i);
const overturned = (side: 'own' | 'parent'): RotationTrack =>
  turned(
    keyed({ spin: [0, 20, 0], swing: [8, 0, 4], hertz: 0.4, phase: 1 }, grid(120), 'LINEAR'),
    stretch,
    [0, 0, 120],
    side,
  );

const wave = turningTrack((key) => 40 * Math.sin(key / 60), 300, 60);

const CASES: readonly (readonly [rule: string, verb: string, track: RotationTrack, house: HouseRules])[] = [
  ['shake.grain', 'smooth', gust, whip],
  [
    'shake.hum',
    'take out hum',
    captured((t) => panTilt(moved(t, 0, 20, 60) + 0.2 * Math.sin(2 * Math.PI * 9 * t), 0), {
      keys: 1200,
      rate: 60,
    }),
    CAMERA,
  ],
  ['shake.creep', 'take out drift', turningTrack((key) => (0.25 * key) / 60, 1201, 60), HELD],
  ['seam.loop-gap', 'close loop', turningTrack((key) => 10 * key, 36), LOOP],
  ['seam.loop-kink', 'close loop', turningTrack((key) => 20 * Math.sin((key * Math.PI) / 60), 61), LOOP],
  ['seam.doubled-end', 'close loop', turningTrack((key) => 3.6 * Math.min(key, 99), 101, 10), LOOP],
  ['seam.doubled-end', 'trim', turningTrack((key) => 3.6 * Math.min(key, 100), 102, 10), LOOP],
  [
    'jump.first-key',
    'trim',
    turningTrack((key) => (key === 0 ? 70 : 8 * Math.sin(key / 10)), 90),
    NO_HOUSE_RULES,
  ],
  ['jump.turned-over', 're-seat', overturned('own'), NO_HOUSE_RULES],
  ['jump.turned-over', 're-seat', overturned('parent'), NO_HOUSE_RULES],
];

describe('a remedy that a rule names', () => {
  test.each(CASES)('mends %s by "%s", and raises no new warning', (rule, verb, track, house) => {
    const place = placeOf(rule, track, house);
    expect(place?.remedy?.verb).toBe(verb);
    const steps: Step[] = place?.remedy ? [place.remedy] : [];
    const { tracks } = applySteps([track], steps);
    const left = surveyTrack(tracks[0], { houseRules: house });
    expect(left.map((finding) => finding.rule)).not.toContain(rule);
    const known = surveyTrack(track, { houseRules: house }).map((finding) => finding.rule);
    const raised = left.filter(({ level, rule: other }) => level !== 'note' && !known.includes(other));
    expect(raised.map((finding) => finding.message)).toEqual([]);
  });

  test('guards declared whips and marks when it smooths', () => {
    const marks = [{ clip: '*', time: 8, name: 'a hit' }];
    const house = { ...whip, declared: { ...whip.declared, marks } };
    expect(placeOf('shake.grain', gust, house)?.remedy).toMatchObject({
      sigma: 0.1,
      guard: 60,
      guards: [
        [5, 5.35],
        [7.9, 8.1],
      ],
    });
  });

  test('closes a loop by its shelf where that alone keeps it open', () => {
    const ankle = turningTrack((key) => 8 * Math.sin((2 * Math.PI * key) / 36 + 1.6), 37);
    const off = expMap(new Float64Array(4), [0.15, 0, 0.03]);
    const values = Float64Array.from(ankle.values);
    for (let key = 22; key < 37; key++)
      values.set(multiply(new Float64Array(4), off, values.slice(4 * key, 4 * key + 4)), 4 * key);
    const remedy = placeOf('seam.loop-gap', replaceTrack(ankle, { values }), LOOP)?.remedy;
    expect(remedy).toMatchObject({ verb: 're-seat', keys: [22] });
  });

  test('smooths a coarse track within its lattice where the file holds more, and nowhere else', () => {
    const values = wave.values.map((value) => Math.round(value * 127) / 127);
    const floats = replaceTrack(wave, {
      values,
      storage: { component: 'float32', timeComponent: 'float32' },
    });
    const remedy = placeOf('file.coarse', floats, NO_HOUSE_RULES)?.remedy;
    expect(remedy?.verb).toBe('smooth');
    // A component good to half a step of 1/127 is a turn good to 2/127 rad, 0.9°.
    expect(remedy?.within).toBeCloseTo((2 / 127) * (180 / Math.PI), 2);
    const bytes = replaceTrack(wave, {
      values,
      storage: { component: 'int8', timeComponent: 'float32' },
    });
    expect(placeOf('file.coarse', bytes, NO_HOUSE_RULES)?.remedy).toBeUndefined();
  });
});
