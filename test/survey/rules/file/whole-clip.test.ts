import { describe, expect, test } from 'vitest';
import {
  expMap,
  multiply,
  replaceTrack,
  storedTrack,
  type Clip,
  type RotationTrack,
  type SceneNode,
} from '@slewcurve/core';
import { verbNamed } from '@slewcurve/mend';
import { surveyClip, type Finding } from '@slewcurve/survey';
import { seededRandom } from '../../../support/seeded-random.js';

const RADIANS = Math.PI / 180;
const RULES = ['file.component-order', 'file.degrees-or-radians', 'file.axes-suspect'];

function clipOf(tracks: readonly RotationTrack[]): Clip {
  return { name: 'Walk', index: 0, tracks, start: 0, end: 59 / 30, frameRate: 30, loop: false, marks: [] };
}

/** Joints of a skeleton at rest in the identity. */
function skeleton(count: number): SceneNode[] {
  return Array.from({ length: count }, (_, i) => ({
    path: `j${i}`,
    parent: i - 1,
    rotation: [0, 0, 0, 1],
    translation: [0, 0.1, 0],
    scale: [1, 1, 1],
    joint: true,
  }));
}

/** A swing of up to 30° of each joint about its own axis; quaternions, or angles in radians. */
function walking(count: number, angles = false): RotationTrack[] {
  const random = seededRandom(7);
  const times = Array.from({ length: 60 }, (_, k) => k / 30);
  return Array.from({ length: count }, (_, node) => {
    const axis = [random() - 0.5, random() - 0.5, random() - 0.5];
    const turns = times.map((time) => axis.map((part) => 60 * RADIANS * part * Math.sin(3 * time + node)));
    return storedTrack({
      times,
      values: turns.flatMap((turn) => (angles ? turn : [...expMap(new Float64Array(4), turn)])),
      ...(angles && { interpolation: 'EULER', sequence: 'XYZ' }),
      id: `j${node}`,
      clip: 'Walk',
      source: { clip: 'Walk', clipIndex: 0, node, sharedWith: [] },
    });
  });
}

const whole = (
  tracks: readonly RotationTrack[],
  nodes: readonly SceneNode[] = skeleton(tracks.length),
): Finding[] => surveyClip(clipOf(tracks), nodes).filter(({ rule }) => RULES.includes(rule));

const numbers = (track: RotationTrack, change: (values: Float64Array) => Float64Array): RotationTrack =>
  replaceTrack(track, { values: change(track.values) });

/** x y z w written as w x y z, and read as x y z w. */
const wFirst = (values: Float64Array): Float64Array =>
  values.map((_, i) => values[i - (i % 4) + ((i + 3) % 4)]);

describe('rules of a whole file', () => {
  test('a walk is clean, in quaternions and in angles', () => {
    expect(whole(walking(20))).toEqual([]);
    expect(whole(walking(20, true))).toEqual([]);
  });

  test('w first read as w last is told once, on the first track, and restating it makes the clip clean', () => {
    const swapped = walking(20).map((track) => numbers(track, wFirst));
    const [finding, ...rest] = whole(swapped);
    expect(rest).toEqual([]);
    expect(finding).toMatchObject({ rule: 'file.component-order', level: 'warning', track: 'j0', keys: [] });
    expect(finding.remedy).toMatchObject({ verb: 'restate', clip: '*', track: '*', components: 'wxyz' });
    const mended = swapped.map((track) => verbNamed('restate').apply(track, finding.remedy!).track);
    expect(mended.map(({ values }) => [...values])).toEqual(walking(20).map(({ values }) => [...values]));
    expect(whole(mended)).toEqual([]);
  });

  test('a few props that lie upside down are not', () => {
    expect(whole(walking(9).map((track) => numbers(track, wFirst)))).toEqual([]);
  });

  test('radians read as degrees are told, and restating them gives the angles back', () => {
    const wrong = walking(20, true).map((track) =>
      numbers(track, (values) => values.map((x) => x * RADIANS * 2)),
    );
    const [finding] = whole(wrong);
    expect(finding).toMatchObject({ rule: 'file.degrees-or-radians', level: 'warning', limit: 6.3 });
    expect(finding.remedy).toMatchObject({ verb: 'restate', angles: 'radians' });
    const mended = verbNamed('restate').apply(wrong[0], finding.remedy!).track;
    mended.values.forEach((value, i) => expect(value).toBeCloseTo(2 * walking(20, true)[0].values[i], 9));
  });

  test('degrees read as radians race; a few calm tracks of angles are a note', () => {
    const racing = walking(20, true).map((track) =>
      numbers(track, (values) => values.map((x) => (4 * x) / RADIANS)),
    );
    expect(whole(racing)).toMatchObject([{ rule: 'file.degrees-or-radians', remedy: { angles: 'degrees' } }]);
    const calm = walking(2, true).map((track) => numbers(track, (values) => values.map((x) => x / 6)));
    expect(whole(calm)).toMatchObject([{ rule: 'file.degrees-or-radians', level: 'note' }]);
  });

  test.each([
    ['90° about x, as from Z up', [90, 0, 0], true],
    ['180° about z', [0, 0, 180], true],
    ['120° about the diagonal', [69.282, 69.282, 69.282], true],
    ['90° about the up axis', [0, 90, 0], false],
    ['50° about x', [50, 0, 0], false],
  ])('a root that begins %s is told if it exchanges axes and moves the up axis', (_, degrees, isTold) => {
    const turn = expMap(
      new Float64Array(4),
      degrees.map((angle) => angle * RADIANS),
    );
    const [root, ...below] = walking(20);
    const turned = numbers(root, (values) => {
      const after = values.slice();
      for (let at = 0; at < values.length; at += 4)
        after.set(multiply(new Float64Array(4), turn, values.subarray(at, at + 4)), at);
      return after;
    });
    expect(whole([turned, ...below]).map(({ rule, level }) => [rule, level])).toEqual(
      isTold ? [['file.axes-suspect', 'note']] : [],
    );
  });
});
