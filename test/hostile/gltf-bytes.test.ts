import * as fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { replaceTrack, SlewcurveError } from '@slewcurve/core';
import { bufferSource, openAnimation, patchedBytes } from '@slewcurve/formats';
import { aboutZ, glb, gltf, Packer } from '../support/gltf-bytes.js';

const packer = new Packer();
const input = packer.add('SCALAR', [0, 0.5, 1]);
const output = packer.add('VEC4', [0, 90, 170].flatMap(aboutZ), 'short');
const indices = packer.view(Uint8Array.of(1));
const values = packer.view(new Uint8Array(Float32Array.from(aboutZ(90)).buffer));
const sparse = packer.add('VEC4', [0, 0, 0].flatMap(aboutZ), 'float', {
  sparse: { count: 1, indices: { bufferView: indices, componentType: 5121 }, values: { bufferView: values } },
});
const target = (node: number): object => ({ node, path: 'rotation' });
const asset = {
  ...packer.json,
  nodes: [
    { name: 'Mast', children: [1], matrix: [1, 0, 0, 0, 0, 1, 0, 0, 0, 0, 1, 0, 0, 0, 0, 1] },
    { name: 'Boom', rotation: [0, 0, 0, 1] },
  ],
  animations: [
    {
      name: 'Sweep',
      channels: [
        { sampler: 0, target: target(0) },
        { sampler: 1, target: target(1) },
      ],
      samplers: [
        { input, output },
        { input, output: sparse, interpolation: 'STEP' },
      ],
    },
  ],
};
const uri = `data:application/octet-stream;base64,${Buffer.from(packer.data).toString('base64')}`;
const SOUND = [
  glb(asset, packer.data),
  gltf({ ...asset, buffers: [{ byteLength: packer.data.byteLength, uri }] }),
];

/** Opens, changes and writes; nothing but a coded error may come out. */
async function survives(bytes: Uint8Array): Promise<'opened' | 'refused'> {
  try {
    const file = await openAnimation(bufferSource(bytes), { name: 'x' });
    const tracks = file.clips.flatMap((clip) => clip.tracks);
    const changed = tracks.map((track) => replaceTrack(track, { values: track.values.map((x) => -x) }));
    const plan = await file.plan(changed);
    const made = patchedBytes(bytes, plan);
    const again = await openAnimation(bufferSource(made), { name: 'x' });
    expect(again.clips.flatMap((clip) => clip.tracks)).toHaveLength(tracks.length);
    return 'opened';
  } catch (error) {
    if (!(error instanceof SlewcurveError)) throw error;
    return 'refused';
  }
}

const mutation = fc.tuple(
  fc.nat(1),
  fc.array(fc.tuple(fc.nat(4000), fc.integer({ min: 0, max: 255 })), { minLength: 1, maxLength: 6 }),
);

describe('bytes that were changed at random', () => {
  test('end in tracks or in a coded error, and what opens can be written (seed 1, 3,000 files)', async () => {
    const seen = { opened: 0, refused: 0 };
    await fc.assert(
      fc.asyncProperty(mutation, async ([which, changes]) => {
        const bytes = SOUND[which].slice();
        for (const [at, value] of changes) bytes[at % bytes.length] = value;
        seen[await survives(bytes)]++;
      }),
      { numRuns: 3000, seed: 1 },
    );
    expect(Math.min(seen.opened, seen.refused)).toBeGreaterThan(100);
  }, 60_000);

  test('of the JSON alone: any number made any other (seed 2, 1,000 files)', async () => {
    const text = new TextDecoder().decode(SOUND[1]);
    const numbers = [...text.matchAll(/(?<=[:[,])-?\d+(\.\d+)?(?=[,}\]])/g)];
    const odd = fc.constantFrom(
      '-1',
      '0',
      '1',
      '2',
      '3',
      '1e9',
      '1e308',
      '4294967296',
      '0.5',
      'null',
      '"a"',
      '{}',
      '[]',
      'true',
    );
    await fc.assert(
      fc.asyncProperty(fc.nat(numbers.length - 1), odd, async (which, instead) => {
        const { index, 0: old } = numbers[which];
        await survives(
          new TextEncoder().encode(text.slice(0, index) + instead + text.slice(index + old.length)),
        );
      }),
      { numRuns: 1000, seed: 2 },
    );
  }, 60_000);
});

describe('names that mean something to JavaScript', () => {
  test('are names', async () => {
    const text = JSON.stringify(asset)
      .replaceAll('"Mast"', '"__proto__"')
      .replaceAll('"Sweep"', '"constructor"')
      .replace('{', '{"__proto__":{"polluted":1},"toString":1,');
    const file = await openAnimation(bufferSource(glb(text, packer.data)), { name: 'x' });
    expect(file.clips[0].name).toBe('constructor');
    expect(file.clips[0].tracks.map(({ id }) => id)).toEqual(['__proto__', '__proto__/Boom']);
    expect(({} as { polluted?: number }).polluted).toBeUndefined();
    expect(await survives(glb(text, packer.data))).toBe('opened');
  });
});

describe('nesting without end', () => {
  test('100,000 lists deep is read past', async () => {
    const deep = `${'['.repeat(100_000)}${']'.repeat(100_000)}`;
    const text = JSON.stringify({ ...asset, extras: 0 }).replace('"extras":0', `"extras":${deep}`);
    expect(await survives(glb(text, packer.data))).toBe('opened');
  });
});
