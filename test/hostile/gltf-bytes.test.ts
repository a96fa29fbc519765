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

function broken(count: number): Uint8Array {
  const channels = Array.from({ length: count }, () => 0);
  return gltf({ ...asset, animations: [{ channels, samplers: [] }] });
}

describe('a small file that asks for much', () => {
  test('10,000 broken channels are told in a thousand lines and a count', async () => {
    const file = await openAnimation(bufferSource(broken(10_000)), { name: 'x.gltf' });
    expect(file.problems).toHaveLength(1001);
    expect(file.problems.at(-1)?.message).toBe('x.gltf: 9000 more problems of the same kinds.');
  });

  test('a megabyte of them is no animation', async () => {
    await expect(openAnimation(bufferSource(broken(500_000)), { name: 'x.gltf' })).rejects.toMatchObject({
      code: 'gltf.too-broken',
    });
  });

  test('20,000 tracks of the same 10,000 keys are as many as its bytes allow, and the others are told', async () => {
    const long = new Packer();
    const keys = Array.from({ length: 10_000 }, (_, key) => key);
    const clock = long.add('SCALAR', keys);
    const turn = long.add('VEC4', keys.flatMap(aboutZ), 'byte');
    const many = Array.from({ length: 20_000 }, (_, node) => node);
    const json = {
      ...long.json,
      nodes: many.map(() => ({})),
      animations: [
        {
          samplers: [{ input: clock, output: turn }],
          channels: many.map((node) => ({ sampler: 0, target: target(node) })),
        },
      ],
    };
    const bytes = glb(json, long.data);
    const file = await openAnimation(bufferSource(bytes), { name: 'x.glb' });
    const read = file.clips[0].tracks.length * 5 * keys.length;
    expect(read).toBeGreaterThan(bytes.byteLength);
    // 64 times what the file and its buffer hold, the buffer being in the file.
    expect(read).toBeLessThan(64 * (2 * bytes.byteLength + 65_536));
    expect(file.problems[0]).toMatchObject({ code: 'gltf.more-than-held', level: 'error' });
  });

  test('a kilobyte that claims a billion keys holds none', async () => {
    const small = {
      asset: { version: '2.0' },
      nodes: [{}],
      accessors: [
        { componentType: 5126, type: 'SCALAR', count: 1e9, min: [0], max: [1] },
        { componentType: 5126, type: 'VEC4', count: 1e9 },
      ],
      animations: [{ samplers: [{ input: 0, output: 1 }], channels: [{ sampler: 0, target: target(0) }] }],
    };
    const bytes = gltf(small);
    expect(bytes.byteLength).toBeLessThan(1024);
    const before = process.memoryUsage().arrayBuffers;
    const file = await openAnimation(bufferSource(bytes), { name: 'x.gltf' });
    expect(process.memoryUsage().arrayBuffers - before).toBeLessThan(1e6);
    expect(file.clips[0].tracks).toEqual([]);
    expect(file.problems).toMatchObject([{ code: 'gltf.more-than-held', level: 'error' }]);
  });

  test('rings, shared children and nodes without end are read in time', async () => {
    const nodes = Array.from({ length: 50_000 }, (_, i) => ({ children: [(i + 1) % 50_000] }));
    nodes[7].children.push(...Array.from({ length: 5000 }, (_, i) => i));
    const file = await openAnimation(bufferSource(gltf({ ...asset, nodes })), { name: 'x.gltf' });
    expect(file.nodes).toHaveLength(50_000);
    expect(file.nodes.filter(({ parent }) => parent === -1)).toHaveLength(1);
  });

  test('doubled keys: the last one counts, in reading and in writing', async () => {
    const text = JSON.stringify(asset).replace(
      '"name":"Sweep"',
      '"name":"First","name":"Second","channels":[],"name":"Sweep"',
    );
    const file = await openAnimation(bufferSource(glb(text, packer.data)), { name: 'x' });
    expect(file.clips[0]).toMatchObject({ name: 'Sweep' });
    expect(file.clips[0].tracks).toHaveLength(2);
    expect(await survives(glb(text, packer.data))).toBe('opened');
  });
});
