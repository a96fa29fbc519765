import * as fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { bufferSource, openAnimation, type AnimationFile } from '@slewcurve/formats';
import { toMat4 } from '@slewcurve/core';
import { gltf, type GltfJson } from '../../support/gltf-bytes.js';

async function open(json: GltfJson): Promise<AnimationFile> {
  return openAnimation(bufferSource(gltf({ asset: { version: '2.0' }, ...json })), { name: 'rig.gltf' });
}

describe('node paths', () => {
  test('join names from the root; ~ and / are escaped; equal siblings are numbered; nameless ones have their index', async () => {
    const { nodes, problems } = await open({
      nodes: [
        { name: 'Hips', children: [1, 2, 3, 4] },
        { name: 'Spine' },
        { name: 'Leg' },
        { name: 'Leg' },
        { children: [5] },
        { name: 'a/b~c' },
        { name: '' },
      ],
    });
    expect(problems).toEqual([]);
    expect(nodes.map(({ path }) => path)).toEqual([
      'Hips',
      'Hips/Spine',
      'Hips/Leg[0]',
      'Hips/Leg[1]',
      'Hips/#4',
      'Hips/#4/a~1b~0c',
      '#6',
    ]);
    expect(nodes.map(({ parent }) => parent)).toEqual([-1, 0, 0, 0, 0, 4, -1]);
  });

  test('never meet, whatever the names', async () => {
    const name = fc.constantFrom(
      'a',
      'a[0]',
      'a[1]',
      '#0',
      '#1',
      '',
      '__proto__',
      'a/b',
      'a~1b',
      'constructor',
    );
    await fc.assert(
      fc.asyncProperty(fc.array(fc.tuple(name, fc.nat(5)), { maxLength: 12 }), async (made) => {
        const list: { name: string; children: number[] }[] = made.map(([label]) => ({
          name: label,
          children: [],
        }));
        made.forEach(([, parent], index) => {
          if (parent < index) list[parent].children.push(index);
        });
        const { nodes } = await open({ nodes: list });
        expect(new Set(nodes.map(({ path }) => path)).size).toBe(list.length);
      }),
    );
  });

  test('stay short in a chain of 20,000 nodes', async () => {
    const list = Array.from({ length: 20_000 }, (_, i) => ({
      name: 'Link',
      children: i < 19_999 ? [i + 1] : [],
    }));
    const { nodes } = await open({ nodes: list });
    expect(Math.max(...nodes.map(({ path }) => path.length))).toBeLessThanOrEqual(4096);
    expect(new Set(nodes.map(({ path }) => path)).size).toBe(20_000);
  });
});

describe('a node graph that is no tree', () => {
  test('is cut: a ring at its first node, a second parent and a missing child left out', async () => {
    const { nodes, problems } = await open({
      nodes: [{ children: [1] }, { children: [2] }, { children: [0] }, { children: [1, 3, 9] }],
    });
    expect(problems.map(({ code, place }) => [code, place.pointer])).toEqual([
      ['gltf.two-parents', '/nodes/3/children/0'],
      ['gltf.no-node', '/nodes/3/children/2'],
      ['gltf.node-ring', '/nodes/0'],
      ['gltf.node-ring', '/nodes/3'],
    ]);
    expect(nodes.map(({ parent }) => parent)).toEqual([-1, 0, 1, -1]);
  });
});

describe('the rest pose', () => {
  test('is what the node says, or identity', async () => {
    const { nodes } = await open({
      nodes: [{}, { rotation: [0, 0, 1, 0], translation: [1, 2, 3], scale: [2, 2, 2] }, { rotation: [1, 2] }],
    });
    expect(nodes[0]).toMatchObject({
      rotation: [0, 0, 0, 1],
      translation: [0, 0, 0],
      scale: [1, 1, 1],
      joint: false,
    });
    expect(nodes[1]).toMatchObject({ rotation: [0, 0, 1, 0], translation: [1, 2, 3], scale: [2, 2, 2] });
    expect(nodes[2]).toMatchObject({ rotation: [0, 0, 0, 1] });
  });

  test('comes out of a matrix', async () => {
    const turned = [...toMat4(new Float64Array(16), [0.5, 0.5, 0.5, 0.5])];
    const matrix = turned.map((x, i) => (i < 4 ? 2 * x : x));
    matrix.splice(12, 3, 7, 8, 9);
    const { nodes } = await open({
      nodes: [{ matrix }, { matrix: [0, 0, 0, 0, 0, 1, 0, 0, 0, 0, 1, 0, 4, 5, 6, 1] }],
    });
    expect(nodes[0].translation).toEqual([7, 8, 9]);
    // Rounding of nine float64 products and a 4×4 eigenvector.
    for (const part of nodes[0].rotation) expect(part).toBeCloseTo(0.5, 12);
    expect(nodes[0].scale[0]).toBeCloseTo(2, 12);
    expect(nodes[0].matrix).toMatchObject({ reflected: false });
    expect(nodes[0].matrix!.shear).toBeLessThan(1e-15);
    expect(nodes[1]).toMatchObject({ rotation: [0, 0, 0, 1], translation: [4, 5, 6], scale: [0, 1, 1] });
  });

  test('names joints of skins and view angles of cameras', async () => {
    const { nodes } = await open({
      nodes: [{ camera: 0 }, { camera: 1 }, {}],
      cameras: [
        { type: 'perspective', perspective: { yfov: 0.7, aspectRatio: 1.5, znear: 0.1 } },
        { type: 'orthographic', orthographic: {} },
      ],
      skins: [{ joints: [2] }],
    });
    expect(nodes[0].camera).toEqual({ verticalView: 0.7, aspect: 1.5 });
    expect(nodes[1].camera).toBeUndefined();
    expect(nodes.map(({ joint }) => joint)).toEqual([false, false, true]);
  });
});
