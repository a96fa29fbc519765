import {
  EULER_SEQUENCES,
  type RotationTrack,
  angleBetween,
  playAs,
  rotateVector,
  rotationTrack,
} from '@slewcurve/core';
import { applySteps } from '@slewcurve/mend';
import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { applied, codeOf } from '../support/edit-acceptance.js';
import { grid, keyed, keyTimes, motions, smoothTracks } from '../support/smooth-track.js';

fc.configureGlobal({ ...fc.readConfigureGlobal(), seed: 6 });

const WAVE = { spin: [20, 35, -10], swing: [25, 10, 15], hertz: 0.4, phase: 1 } as const;
const AXES = ['x z -y', 'x -z y', '-x y z', 'y z x', 'z -y -x', '-z -x -y'];

/** What a change of axes makes of a vector, by its words alone. */
function restated(words: string, vector: readonly number[]): number[] {
  return words
    .split(' ')
    .map((word) => (word.startsWith('-') ? -1 : 1) * vector['xyz'.indexOf(word.replace('-', ''))]);
}

function speeds(track: RotationTrack): number[] {
  const curve = playAs(track, 'as-written');
  return Array.from({ length: 200 }, (_, i) => {
    const t = curve.start + ((curve.end - curve.start) * (i + 0.3)) / 200;
    return Math.hypot(...curve.rate([0, 0, 0], t, 'own'));
  });
}

function sizes({ values }: RotationTrack): number[] {
  return Array.from(values, Math.abs).toSorted((a, b) => a - b);
}

function angleTracks(): fc.Arbitrary<RotationTrack> {
  const triple = fc.tuple(...[0, 1, 2].map(() => fc.double({ min: -4, max: 4, noNaN: true })));
  return fc
    .tuple(fc.constantFrom(...EULER_SEQUENCES), fc.array(triple, { minLength: 3, maxLength: 8 }))
    .map(([sequence, keys]) =>
      rotationTrack({ times: grid(keys.length), values: keys.flat(), interpolation: 'EULER', sequence }),
    );
}

describe('restate', () => {
  it('turns every vector as it did, written in the new axes, and no speed by more than 1e-6 of itself', () => {
    const cases = fc.tuple(fc.oneof(smoothTracks, angleTracks()), fc.constantFrom(...AXES));
    fc.assert(
      fc.property(cases, ([track, axes]) => {
        const { track: after } = applied(track, { verb: 'restate', axes });
        const [was, is] = [playAs(track, 'as-written'), playAs(after, 'as-written')];
        for (const t of [was.start, (was.start + was.end) / 2.1, was.end])
          for (const vector of [
            [1, 0, 0],
            [0, 1, 0],
            [0.2, -0.3, 0.9],
          ]) {
            const old = rotateVector([0, 0, 0], was.orientation([], t), vector);
            const now = rotateVector([0, 0, 0], is.orientation([], t), restated(axes, vector));
            restated(axes, old).forEach((part, i) => expect(now[i]).toBeCloseTo(part, 12));
          }
        const before = speeds(track);
        const off = speeds(after).map((speed, i) => Math.abs(speed - before[i]) - 1e-6 * before[i]);
        expect(Math.max(...off)).toBeLessThanOrEqual(1e-12);
      }),
      { numRuns: 40 },
    );
  });

  it('keeps the digits: numbers change their places and signs alone, and the way back gives the very numbers', () => {
    fc.assert(
      fc.property(fc.oneof(smoothTracks, angleTracks()), (track) => {
        const there = applied(track, { verb: 'restate', axes: 'x z -y' }).track;
        expect(sizes(there)).toEqual(sizes(track));
        const back = applied(there, { verb: 'restate', axes: 'x -z y' }).track;
        expect(back.sequence).toBe(track.sequence);
        // 0 and -0 are one number.
        expect(back.values.every((value, i) => value === track.values[i])).toBe(true);
      }),
      { numRuns: 40 },
    );
  });

  it('names the new axes in a sequence of angles: Z first becomes Y first where z becomes y', () => {
    const track = rotationTrack({
      times: [0, 1],
      values: [1, 2, 3, 4, 5, 6],
      interpolation: 'EULER',
      sequence: 'ZXY',
    });
    const { track: after } = applied(track, { verb: 'restate', axes: 'x z -y' });
    expect(after.sequence).toBe('YXZ');
    expect([...after.values]).toEqual([1, 2, -3, 4, 5, -6]);
  });

  it('reads w first where w stands first, tangents too', () => {
    fc.assert(
      fc.property(
        motions,
        keyTimes(),
        fc.constantFrom('LINEAR', 'CUBICSPLINE'),
        (motion, times, interpolation) => {
          const track = keyed(motion, times, interpolation === 'LINEAR' ? 'LINEAR' : 'CUBICSPLINE');
          const misread = rotationTrack({
            ...track,
            values: track.values.map((_, i) => track.values[i - (i % 4) + [3, 0, 1, 2][i % 4]]),
          });
          expect(applied(misread, { verb: 'restate', components: 'wxyz' }).track.values).toEqual(
            track.values,
          );
        },
      ),
      { numRuns: 30 },
    );
  });

  it('reads radians where they were taken for degrees: 57.3 times as fast', () => {
    const track = rotationTrack({
      times: [0, 1],
      values: [0, 0, 0, 0.01, 0, 0],
      interpolation: 'EULER',
      sequence: 'XYZ',
    });
    const { track: after } = applied(track, { verb: 'restate', angles: 'radians' });
    expect(speeds(after)[0] / speeds(track)[0]).toBeCloseTo(180 / Math.PI, 9);
    const back = applied(after, { verb: 'restate', angles: 'degrees' }).track;
    expect(back.values[3]).toBeCloseTo(0.01, 15);
    // Quaternions have no unit.
    const quaternions = keyed(WAVE, grid(3), 'LINEAR');
    expect(applied(quaternions, { verb: 'restate', angles: 'degrees' }).track).toBe(quaternions);
  });

  it('is for whole files: a card that leaves a track out is refused, and so is a restatement of nothing', () => {
    const tracks = ['a', 'b'].map((id) => ({ ...keyed(WAVE, grid(3), 'LINEAR'), id }));
    const step = { verb: 'restate', clip: '*', axes: 'x z -y' };
    expect(codeOf(() => applySteps(tracks, [{ ...step, track: 'a' }]))).toBe('step.whole-file');
    const { tracks: after } = applySteps(tracks, [{ ...step, track: '*' }]);
    after.forEach((track, i) =>
      expect(angleBetween(track.values.subarray(0, 4), tracks[i].values.subarray(0, 4))).toBeGreaterThan(0),
    );
    expect(codeOf(() => applied(tracks[0], { verb: 'restate' }))).toBe('step.needs-convention');
  });
});
