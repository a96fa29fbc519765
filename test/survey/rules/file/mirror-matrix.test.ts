import {
  storedTrack,
  type Clip,
  type MatrixFlaws,
  type RotationTrack,
  type SceneNode,
} from '@slewcurve/core';
import { bufferSource, openAnimation } from '@slewcurve/formats';
import { surveyClip, surveyTrack } from '@slewcurve/survey';
import { describe, expect, test } from 'vitest';
import { grid, keyed } from '../../../support/smooth-track.js';

const CLEAN = keyed({ spin: [0, 20, 0], swing: [8, 0, 4], hertz: 0.4, phase: 1 }, grid(6), 'LINEAR');

function found(track: RotationTrack): ReturnType<typeof surveyTrack> {
  return surveyTrack(track).filter(({ rule }) => rule === 'file.mirror-matrix');
}

function withMatrices(reflected: readonly number[], shear: readonly number[]): RotationTrack {
  const matrices: MatrixFlaws = {
    reflected: Uint8Array.from(reflected),
    shear: Float64Array.from(shear),
  };
  return storedTrack({ ...CLEAN, source: { ...CLEAN.source, matrices } });
}

async function readTable(rows: readonly (readonly number[])[]): Promise<RotationTrack> {
  const text = `t,m00,m01,m02,m10,m11,m12,m20,m21,m22\n${rows.map((row, i) => `${i / 30},${row.join(',')}\n`).join('')}`;
  const file = await openAnimation(bufferSource(new TextEncoder().encode(text)), { name: 'take.csv' });
  return file.clips[0].tracks[0];
}

/** Rows first, as a table has them: a turn about z. */
function aboutZ(degrees: number, scale: readonly [number, number, number] = [1, 1, 1]): number[] {
  const [c, s] = [Math.cos((degrees * Math.PI) / 180), Math.sin((degrees * Math.PI) / 180)];
  return [c * scale[0], -s * scale[1], 0, s * scale[0], c * scale[1], 0, 0, 0, scale[2]];
}

describe('file.mirror-matrix', () => {
  test('turns and uneven scales in a table are clean', async () => {
    const track = await readTable([0, 5, 10, 15].map((angle) => aboutZ(angle, [2, 1, 0.5])));
    expect(track.source.matrices).toBeDefined();
    expect(found(track)).toEqual([]);
    expect(found(CLEAN)).toEqual([]);
  });

  test('a table reflected all along is a warning; where the reflection comes and goes, an error', async () => {
    const all = found(await readTable([0, 5, 10, 15].map((angle) => aboutZ(angle, [-1, 1, 1]))));
    expect(all).toMatchObject([{ level: 'warning', keys: [0, 1, 2, 3], value: 4, unit: 'numbers' }]);
    expect(all[0].message).toBe('of 4 matrices 4 reflected, from key 0 on; the nearest turn is read');
    const some = found(
      await readTable([0, 5, 10, 15].map((angle) => aboutZ(angle, [angle === 10 ? -1 : 1, 1, 1]))),
    );
    expect(some).toMatchObject([{ level: 'error', keys: [2], value: 1 }]);
    expect(some[0].message).toContain('comes and goes');
  });

  test('a cosine above 1e-3 between columns is named with its angle, below it nothing', () => {
    const sheared = found(withMatrices([0, 0, 0, 0, 0, 0], [0, 0, 0.002, 0, 0.1, 0]));
    expect(sheared).toMatchObject([{ level: 'warning', keys: [2, 4], value: 2 }]);
    // asin(0.1) = 5.74°.
    expect(sheared[0].message).toBe(
      'of 6 matrices 2 sheared, up to 5.7° off square, from key 2 on; the nearest turn is read',
    );
    expect(found(withMatrices([0, 0, 0, 0, 0, 0], [9e-4, 0, 0, 0, 0, 0]))).toEqual([]);
  });

  test('a node’s matrix is told on the first track at or below it, once a clip', () => {
    const still = { rotation: [0, 0, 0, 1], translation: [0, 0, 0], scale: [1, 1, 1], joint: false };
    const nodes: SceneNode[] = [
      { ...still, path: 'Root', parent: -1, matrix: { reflected: true, shear: 0 } },
      { ...still, path: 'Root/Hip', parent: 0 },
      { ...still, path: 'Root/Hip/Knee', parent: 1, matrix: { reflected: false, shear: 0.1 } },
      { ...still, path: 'Aside', parent: -1, matrix: { reflected: true, shear: 0 } },
    ];
    const at = (node: number): RotationTrack =>
      storedTrack({ ...CLEAN, id: nodes[node].path, source: { ...CLEAN.source, node } });
    const tracks = [at(1), at(2)];
    const clip: Clip = { name: 'Walk', index: 0, tracks, start: 0, end: 1, loop: false, marks: [] };
    const all = surveyClip(clip, nodes).filter(({ rule }) => rule === 'file.mirror-matrix');
    expect(all.map(({ track, message }) => [track, message])).toEqual([
      ['Root/Hip', 'the matrix of Root above it is reflected: it turns a right hand into a left'],
      ['Root/Hip/Knee', 'the matrix of its node is sheared: its columns are up to 5.7° off square'],
    ]);
  });
});
