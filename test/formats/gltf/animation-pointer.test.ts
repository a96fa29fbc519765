// KHR_animation_pointer (Khronos, ratified): a channel names what it moves by a JSON pointer.
import { describe, expect, test } from 'vitest';
import { bufferSource, openAnimation } from '@slewcurve/formats';
import { aboutZ, glb, jsonOf, Packer, type GltfJson } from '../../support/gltf-bytes.js';
import { negated, open, tracksOf, write } from '../../support/written-gltf.js';

function pointed(pointer: unknown, more: GltfJson = {}): GltfJson {
  return { path: 'pointer', extensions: { KHR_animation_pointer: { pointer } }, ...more };
}

function asset(...targets: readonly GltfJson[]): { json: GltfJson; data: Uint8Array } {
  const packer = new Packer();
  const input = packer.add('SCALAR', [0, 0.5, 1]);
  const turn = packer.add('VEC4', [0, 40, 90].flatMap(aboutZ));
  const move = packer.add('VEC3', [0, 0, 0, 1, 0, 0, 2, 0, 0]);
  const samplers = targets.map((target) => ({
    input,
    output: JSON.stringify(target).includes('translation') ? move : turn,
  }));
  const json = {
    ...packer.json,
    extensionsUsed: ['KHR_animation_pointer'],
    nodes: [{ name: 'Mast', children: [1] }, { name: 'Boom' }],
    animations: [
      { name: 'Turn', channels: targets.map((target, sampler) => ({ sampler, target })), samplers },
    ],
  };
  return { json, data: packer.data };
}

async function read(...targets: readonly GltfJson[]): ReturnType<typeof open> {
  const { json, data } = asset(...targets);
  return open(glb(json, data));
}

describe('a channel that points at a rotation', () => {
  test('is a track of that node, as one that names it is', async () => {
    const file = await read(pointed('/nodes/1/rotation'), { node: 0, path: 'rotation' });
    expect(file.problems).toEqual([]);
    expect(tracksOf(file).map(({ id, source }) => [id, source.node])).toEqual([
      ['Mast/Boom', 1],
      ['Mast', 0],
    ]);
    expect([...tracksOf(file)[0].values]).toEqual([0, 40, 90].flatMap(aboutZ).map(Math.fround));
  });

  test('is written back where it stands; its target keeps every byte', async () => {
    const { json, data } = asset(pointed('/nodes/1/rotation'));
    const { made } = await write(glb(json, data), ([track]) => [negated(track, 1)]);
    expect(jsonOf(made)).toEqual(json);
  });

  test('and one that names the same node are told as two of one', async () => {
    const file = await read(pointed('/nodes/1/rotation'), { node: 1, path: 'rotation' });
    expect(file.problems.map(({ code }) => code)).toEqual(['gltf.doubled-target']);
  });

  test.each([
    ['/nodes/7/rotation', {}, 'gltf.no-node'],
    ['nodes/1/rotation', {}, 'gltf.bad-target'],
    [undefined, {}, 'gltf.bad-target'],
    [7, {}, 'gltf.bad-target'],
    ['/nodes/1/rotation', { path: 'rotation' }, 'gltf.bad-target'],
    ['/nodes/1/rotation', { node: 1 }, 'gltf.pointer-with-node'],
  ])('%j with %j is told: %s', async (pointer, more, code) => {
    const { problems } = await read(pointed(pointer, more));
    expect(problems.map((problem) => problem.code)).toEqual([code]);
  });

  test.each([
    '/nodes/1/translation',
    '/nodes/01/rotation',
    '/nodes/1/rotation/0',
    '/materials/0/pbrMetallicRoughness/baseColorFactor',
    '/materials/0/emissiveTexture/extensions/KHR_texture_transform/rotation',
    '/extensions/ACME_rig/bones/0/rotation',
    '',
  ])('%j is no rotation of a node', async (pointer) => {
    const file = await read(pointed(pointer));
    expect([tracksOf(file), file.problems]).toEqual([[], []]);
  });

  test('takes the moves of its node along, also where those are pointed at', async () => {
    const { json, data } = asset(
      pointed('/nodes/1/rotation'),
      pointed('/nodes/1/translation'),
      pointed('/nodes/0/translation'),
    );
    const bytes = glb(json, data);
    const file = await openAnimation(bufferSource(bytes), { name: 'mast.glb' });
    const follower = { clip: 'Turn', track: 'Mast/Boom', turnsBack: false, newTime: (t: number) => 2 * t };
    const { ranges } = await file.plan([], [follower]);
    expect(ranges.map(({ what }) => what).join()).toMatch(/animations\/0\/channels\/1|samplers/);
    expect(ranges.map(({ what }) => what).join()).not.toMatch(/channels\/2/);
  });
});
