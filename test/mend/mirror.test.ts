import {
  EULER_SEQUENCES,
  type SceneNode,
  mirror,
  playAs,
  rotateVector,
  rotationTrack,
} from '@slewcurve/core';
import { applySteps } from '@slewcurve/mend';
import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { applied, codeOf } from '../support/edit-acceptance.js';
import { grid, keyed, smoothTracks } from '../support/smooth-track.js';

fc.configureGlobal({ ...fc.readConfigureGlobal(), seed: 6 });

const WAVE = { spin: [20, 35, -10], swing: [25, 10, 15], hertz: 0.4, phase: 1 } as const;
const normals = fc.constantFrom('x' as const, 'y' as const, 'z' as const);

const angleTracks = fc
  .tuple(
    fc.constantFrom(...EULER_SEQUENCES),
    fc.array(fc.tuple(...[0, 1, 2].map(() => fc.double({ min: -4, max: 4, noNaN: true }))), {
      minLength: 2,
      maxLength: 8,
    }),
  )
  .map(([sequence, keys]) =>
    rotationTrack({ times: grid(keys.length), values: keys.flat(), interpolation: 'EULER', sequence }),
  );

function node(path: string, rotation: readonly number[] = [0, 0, 0, 1]): SceneNode {
  return { path, parent: -1, rotation, translation: [0, 0, 0], scale: [1, 1, 1], joint: true };
}

describe('mirror', () => {
  it('done twice is what it was, to the bit', () => {
    fc.assert(
      fc.property(fc.oneof(smoothTracks, angleTracks), normals, (track, normal) => {
        const once = applied(track, { verb: 'mirror', normal }).track;
        expect(applied(once, { verb: 'mirror', normal }).track.values).toEqual(track.values);
      }),
      { numRuns: 50 },
    );
  });

  it('turns the mirror image of every vector to the mirror image of where it went, at any time', () => {
    fc.assert(
      fc.property(fc.oneof(smoothTracks, angleTracks), normals, (track, normal) => {
        const { track: after } = applied(track, { verb: 'mirror', normal });
        const flip = (vector: readonly number[]): number[] =>
          vector.map((part, i) => ('xyz'[i] === normal ? -part : part));
        const [was, is] = [playAs(track, 'as-written'), playAs(after, 'as-written')];
        const t = was.start + 0.37 * (was.end - was.start);
        const vector = [0.3, -0.8, 0.5];
        const old = flip(rotateVector<number[]>([], was.orientation([], t), vector));
        const now = rotateVector<number[]>([], is.orientation([], t), flip(vector));
        old.forEach((part, i) => expect(now[i]).toBeCloseTo(part, 12));
      }),
      { numRuns: 50 },
    );
  });

  it('lets named sides change places, all at once, and the middle mirror itself', () => {
    const tracks = ['Hips', 'Hips/LeftLeg', 'Hips/RightLeg'].map((id, i) => ({
      ...keyed({ ...WAVE, spin: [10 * i, 10, 5] }, grid(6), 'LINEAR'),
      id,
    }));
    const step = { verb: 'mirror', clip: '*', track: '*', normal: 'x', pairs: [['Left', 'Right']] } as const;
    const nodes = tracks.map(({ id }) => node(id));
    const { tracks: after } = applySteps(tracks, [step], nodes);
    const image = (at: number): number[] =>
      [...tracks[at].times.keys()].flatMap((key) =>
        mirror<number[]>([], tracks[at].values.subarray(4 * key, 4 * key + 4), [1, 0, 0]),
      );
    [0, 2, 1].forEach((from, at) =>
      after[at].values.forEach((part, i) => expect(part).toBeCloseTo(image(from)[i], 15)),
    );
    const { tracks: twice } = applySteps(tracks, [step, step], nodes);
    twice.forEach((track, at) => expect(track.values).toEqual(tracks[at].values));
  });

  it('gives a side the other one’s times, and its angles in its own sequence', () => {
    const left = rotationTrack({
      id: 'ArmL',
      times: [0, 1],
      values: [0.1, 0.2, 0.3, 0.4, 0.5, 0.6],
      interpolation: 'EULER',
      sequence: 'ZXY',
    });
    const right = rotationTrack({
      id: 'ArmR',
      times: [0, 1, 2],
      values: [1, 2, 3, 0.4, 0.1, 0.2, 0, 1, 0].map((n) => n / 3),
      interpolation: 'EULER',
      sequence: 'XYZ',
    });
    const step = { verb: 'mirror', clip: '*', track: '*', normal: 'z', pairs: [['ArmL', 'ArmR']] } as const;
    const { tracks } = applySteps([left, right], [step]);
    expect(tracks.map(({ times, sequence }) => [times.length, sequence])).toEqual([
      [3, 'ZXY'],
      [2, 'XYZ'],
    ]);
    const { tracks: twice } = applySteps([left, right], [step, step]);
    twice.forEach((track, at) =>
      track.values.forEach((angle, i) => expect(angle).toBeCloseTo([left, right][at].values[i], 12)),
    );
  });

  it('checks the pair: no partner, one not named, rest poses that are no images of each other', () => {
    const tracks = ['LeftArm', 'RightArm', 'LeftEye'].map((id) => ({
      ...keyed(WAVE, grid(3), 'LINEAR'),
      id,
    }));
    const step = { verb: 'mirror', clip: '*', normal: 'x', pairs: [['Left', 'Right']] } as const;
    expect(codeOf(() => applySteps(tracks, [{ ...step, track: 'LeftEye' }]))).toBe('step.no-partner');
    expect(codeOf(() => applySteps(tracks, [{ ...step, track: 'LeftArm' }]))).toBe('step.no-partner');
    const nodes = [node('LeftArm'), node('RightArm', [0, 0, 0.1, 1])];
    expect(codeOf(() => applySteps(tracks.slice(0, 2), [{ ...step, track: '*' }], nodes))).toBe(
      'step.unlike-pair',
    );
    expect(codeOf(() => applied(tracks[0], { verb: 'mirror' }))).toBe('step.needs-normal');
    expect(codeOf(() => applied(tracks[0], { verb: 'mirror', normal: 'x', keep: [0] }))).toBe(
      'step.whole-track',
    );
  });
});
