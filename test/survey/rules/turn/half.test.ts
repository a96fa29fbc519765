import * as fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { logMap, playAs, relative, rotationTrack, type RotationTrack, type SceneNode } from '@slewcurve/core';
import { verbNamed } from '@slewcurve/mend';
import { surveyTrack, type TrackSurveySettings } from '@slewcurve/survey';

const DEGREES = 180 / Math.PI;

function halfTurn(track: RotationTrack, settings: TrackSurveySettings = {}) {
  return surveyTrack(track, settings).find((finding) => finding.rule === 'turn.half');
}

/** Turns about z, degrees, one second apart. */
function turns(...angles: readonly number[]): RotationTrack {
  const values = angles.flatMap((angle) => [
    0,
    0,
    Math.sin(angle / 2 / DEGREES),
    Math.cos(angle / 2 / DEGREES),
  ]);
  return rotationTrack({ times: angles.map((_, key) => key), values });
}

/** Signed turn about z between two times, as played, degrees. */
function turnedBetween(track: RotationTrack, from: number, to: number): number {
  const curve = playAs(track, 'as-written');
  const [a, b] = [curve.orientation(new Float64Array(4), from), curve.orientation(new Float64Array(4), to)];
  return logMap(new Float64Array(3), relative(a, a, b))[2] * DEGREES;
}

describe('turn.half', () => {
  // NEEDS A2.
  test('149° is not flagged', () => {
    expect(halfTurn(turns(0, 149))).toBeUndefined();
  });

  test.each([
    [150, 'note'],
    [164.9, 'note'],
    [165, 'warning'],
    [174.9, 'warning'],
    [175, 'error'],
    [179.99, 'error'],
    [-179.99, 'error'],
  ])('%s° is flagged as %s', (angle, level) => {
    // A hair over the bound: 150° itself may be rounded to either side.
    const finding = halfTurn(turns(0, angle + Math.sign(angle) * 1e-9))!;
    expect(finding).toMatchObject({ level, count: 1, keys: [1], unit: 'deg' });
    expect(finding.value).toBeCloseTo(Math.abs(angle), 3);
  });

  test('179.99° and then −179.99° are one step of a half turn and one change of sign, both flagged', () => {
    const findings = surveyTrack(turns(0, 179.99, -179.99)).filter(({ rule }) => rule.startsWith('turn.'));
    expect(findings.map((finding) => [finding.rule, finding.keys])).toEqual([
      ['turn.sign-flip', [2]],
      ['turn.half', [1]],
    ]);
  });

  test.each([1e-16, -1e-16, 0])(
    'w = %s at half a turn is flagged, and the first way shown is the one slerp takes',
    (w) => {
      const track = rotationTrack({ times: [0, 1], values: [0, 0, 0, 1, 0, 0, 1, w] });
      const { ways, level, message } = halfTurn(track)!;
      expect(level).toBe('error');
      expect(ways).toHaveLength(2);
      expect(ways![0].angle).toBe(180);
      expect(ways![1].angle).toBe(180);
      expect(Math.sign(turnedBetween(track, 0, 0.25))).toBe(Math.sign(ways![0].axis[2]));
      expect(message).toContain('has to be decided');
      expect(message.includes('opposite signs')).toBe(w < 0);
    },
  );

  test('after either remedy the direction holds whatever the stored numbers are off by within 1e-6', () => {
    const signs = fc.array(fc.constantFrom(-1e-6, 0, 1e-6), { minLength: 12, maxLength: 12 });
    fc.assert(
      fc.property(fc.constantFrom(1e-16, -1e-16), fc.constantFrom(0, 1), signs, (w, which, offsets) => {
        const track = rotationTrack({ times: [0, 1], values: [0, 0, 0, 1, 0, 0, 1, w] });
        const { remedy, ways, occurrences } = halfTurn(track)!;
        const step = which === 0 ? remedy! : occurrences[0].alternatives![0];
        const { track: mended } = verbNamed(step.verb).apply(track, step);
        expect(halfTurn(mended)).toBeUndefined();
        const values = mended.values.map((value, i) => value + offsets[i]);
        const shaken = rotationTrack({ ...mended, values });
        expect(Math.sign(turnedBetween(shaken, 0, 0.4))).toBe(Math.sign(ways![which].axis[2]));
        expect(turnedBetween(shaken, 0, 0.5)).toBeCloseTo(90 * ways![which].axis[2], 2);
      }),
      { seed: 2 },
    );
  });

  test('ways are in the own frame of the earlier key', () => {
    // Both keys turned by 90° about x in the parent: the turn between them stays one about own z.
    const s = Math.SQRT1_2;
    const track = rotationTrack({ times: [0, 1], values: [s, 0, 0, s, 0, -s, s, 0] });
    expect(halfTurn(track)!.ways![0].axis.map(Math.abs)).toEqual([0, 0, 1]);
  });

  test('coarse storage makes it arbitrary earlier: within ten noise floors it is an error', () => {
    const values = [...turns(0, 172).values];
    const byte = { component: 'int8', timeComponent: 'float32' } as const;
    expect(halfTurn(rotationTrack({ times: [0, 1], values }))).toMatchObject({ level: 'warning' });
    // 2/127 rad = 0.90°, ten of them 9.0°.
    expect(halfTurn(rotationTrack({ times: [0, 1], values, storage: byte }))).toMatchObject({
      level: 'error',
    });
  });

  test('machines have narrower limits, by house rule', () => {
    const node: SceneNode = {
      path: 'Head',
      parent: -1,
      rotation: [],
      translation: [],
      scale: [],
      joint: false,
    };
    const track = { ...turns(0, 125), id: 'Head' };
    expect(halfTurn(track, { nodes: [node] })).toBeUndefined();
  });

  test('STEP tracks, held playbacks and declared cuts are spared', () => {
    const track = turns(0, 180);
    expect(halfTurn(rotationTrack({ ...track, interpolation: 'STEP' }))).toBeUndefined();
    expect(halfTurn(track, { playbacks: ['step'] })).toBeUndefined();
    expect(halfTurn(rotationTrack({ ...track, breaks: [0] }))).toBeUndefined();
  });
});
