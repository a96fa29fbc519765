import * as fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { alignSigns, playAs, rotationTrack, type RotationTrack } from '@slewcurve/core';
import { verbNamed } from '@slewcurve/mend';
import { surveyTrack, type TrackSurveySettings } from '@slewcurve/survey';
import { grid, keyed, motions } from '../../../support/smooth-track.js';
import { seededRandom } from '../../../support/seeded-random.js';

const DEGREES = 180 / Math.PI;

function signFlips(track: RotationTrack, settings: TrackSurveySettings = {}) {
  return surveyTrack(track, settings).find((finding) => finding.rule === 'turn.sign-flip');
}

/** The track with the listed keys negated, tangents too. */
function negated(track: RotationTrack, keys: readonly number[]): RotationTrack {
  const size = track.values.length / track.times.length;
  const chosen = new Set(keys);
  return rotationTrack({
    ...track,
    values: track.values.map((value, i) => (chosen.has(Math.floor(i / size)) ? -value : value)),
  });
}

const MOTION = { spin: [20, 5, 0], swing: [10, 0, 15], hertz: 0.3, phase: 1 } as const;

describe('turn.sign-flip', () => {
  test('a clean track gives no finding', () => {
    expect(signFlips(keyed(MOTION, grid(60), 'LINEAR'))).toBeUndefined();
  });

  test('one negated key of a LINEAR track is two changes of sign and a note, with key, time and both angles', () => {
    const finding = signFlips(negated(keyed(MOTION, grid(60), 'LINEAR'), [20]))!;
    expect(finding).toMatchObject({
      level: 'note',
      count: 2,
      playback: 'as-written',
      unit: 'deg',
      limit: 180,
    });
    expect(finding.occurrences.map((place) => place.keys[0] ?? -1).toSorted((a, b) => a - b)).toEqual([
      20, 21,
    ]);
    expect(finding.message).toMatch(
      /^key 2[01] is stored on the other side of key \d+: [\d.]+° the short way, 35\d\.\d° the long way/,
    );
    expect(finding.time).toBeCloseTo(finding.keys[0] / 30, 12);
  });

  test.each(['raw-chord', 'finite-cubic'] as const)(
    '%s makes it an error, whatever else plays it',
    (playback) => {
      const track = negated(keyed(MOTION, grid(60), 'LINEAR'), [20]);
      expect(signFlips(track, { playbacks: ['short-way', playback] })).toMatchObject({
        level: 'error',
        playback,
      });
      expect(signFlips(track, { playbacks: ['short-way', 'chord'] })).toMatchObject({ level: 'note' });
    },
  );

  test('in CUBICSPLINE it is an error as written: the standard’s formula has no sign care', () => {
    // glTF 2.0, Appendix C: the cubic blends the stored numbers. 0° → 10° with the second key negated turns 350°.
    const half = 5 / DEGREES;
    const values = [
      0,
      0,
      0,
      0,
      0,
      0,
      0,
      1,
      0,
      0,
      0,
      0,
      0,
      0,
      0,
      0,
      -Math.sin(half),
      0,
      0,
      -Math.cos(half),
      0,
      0,
      0,
      0,
    ];
    const track = rotationTrack({ times: [0, 1], values, interpolation: 'CUBICSPLINE' });
    expect(signFlips(track)).toMatchObject({ level: 'error', value: 350 });
    expect(playAs(track, 'as-written').length(0, 1) * DEGREES).toBeCloseTo(350, 6);
    const mended = verbNamed('same side').apply(track, signFlips(track)!.remedy!).track;
    expect(signFlips(mended)).toBeUndefined();
    expect(playAs(mended, 'as-written').length(0, 1) * DEGREES).toBeCloseTo(10, 9);
    // NEEDS A1: 15.0 deg/s, 1.5 times the mean of a cubic with still ends; the chord of 10° adds under 0.1 %.
    expect(playAs(mended, 'as-written').peak(0, 1).rate * DEGREES).toBeCloseTo(15, 1);
  });

  test('a 1,000-key track with a random subset of signs flipped comes back clean and plays the same', () => {
    fc.assert(
      fc.property(motions, fc.integer(), (motion, seed) => {
        const random = seededRandom(seed);
        const clean = keyed(motion, grid(1000, 60), 'LINEAR');
        const flipped = negated(
          clean,
          [...clean.times.keys()].filter(() => random() < 0.3),
        );
        const found = signFlips(flipped);
        const mended = found ? verbNamed('same side').apply(flipped, found.remedy!).track : flipped;
        expect(signFlips(mended)).toBeUndefined();
        expect([...mended.values]).toEqual([...alignSigns(flipped).track.values]);
      }),
      { seed: 1, numRuns: 20 },
    );
  });

  test('no sign change counts across a declared cut or in a STEP track', () => {
    const track = negated(
      keyed(MOTION, grid(40), 'LINEAR'),
      Array.from({ length: 20 }, (_, i) => i + 20),
    );
    expect(signFlips(track)).toMatchObject({ count: 1 });
    expect(signFlips(rotationTrack({ ...track, breaks: [19] }))).toBeUndefined();
    expect(signFlips(rotationTrack({ ...track, interpolation: 'STEP' }))).toBeUndefined();
  });
});
