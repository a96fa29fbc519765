import * as fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { replaceTrack } from '@slewcurve/core';
import { bufferSource, openAnimation, patchedBytes, type Source } from '@slewcurve/formats';
import {
  aboutZ,
  glb,
  gltf,
  jsonOf,
  oneTrack,
  Packer,
  type Component,
  type GltfJson,
} from '../../support/gltf-bytes.js';
import { negated, open, tracksOf, turned, withoutLast, write } from '../../support/written-gltf.js';

describe('what others read', () => {
  test('a buffer in a data URI is changed in its own letters', async () => {
    const made = oneTrack([0, 10, 20, 30]);
    const uri = `data:application/octet-stream;base64,${Buffer.from(made.data).toString('base64')}`;
    const bytes = gltf({ ...made.asset, buffers: [{ byteLength: made.data.byteLength, uri }] });
    const { plan, made: after } = await write(bytes, ([track]) => [negated(track, 2)]);
    expect(after).toHaveLength(bytes.byteLength);
    // Sixteen bytes touch at most seven groups of three.
    expect(plan.ranges.reduce((sum, { length }) => sum + length, 0)).toBeLessThanOrEqual(28);
  });

  test('a file beside the asset is never written: the new values come into the asset', async () => {
    const made = oneTrack([0, 10, 20]);
    const bytes = gltf({ ...made.asset, buffers: [{ byteLength: made.data.byteLength, uri: 'a.bin' }] });
    const sibling = async (): Promise<Source> => bufferSource(made.data);
    const file = await openAnimation(bufferSource(bytes), { name: 'a.gltf', sibling });
    const [track] = tracksOf(file);
    const after = patchedBytes(bytes, await file.plan([negated(track, 1)]));
    expect(jsonOf(after).buffers).toMatchObject([{ uri: 'a.bin' }, { byteLength: 48 }]);
    const again = await openAnimation(bufferSource(after), { name: 'a.gltf', sibling });
    expect(tracksOf(again)[0].values).toEqual(negated(track, 1).values);
  });

  test('an output of two clips is copied before one changes', async () => {
    const packer = new Packer();
    const input = packer.add('SCALAR', [0, 1]);
    const output = packer.add('VEC4', [0, 90].flatMap(aboutZ));
    const bytes = glb(
      turned(packer, [
        { input, output },
        { input, output },
      ]),
      packer.data,
    );
    expect(tracksOf(await open(bytes))[0].source.sharedWith).toEqual([
      '/animations/1/samplers/0/output',
      '/animations/1/samplers/0/input',
    ]);
    const { made } = await write(bytes, ([first]) => [negated(first, 1)]);
    expect(jsonOf(made).animations[1]).toEqual(jsonOf(bytes).animations[1]);
    expect(jsonOf(made).accessors).toHaveLength(3);
  });

  test('an output of two clips that change alike is changed where it stands', async () => {
    const packer = new Packer();
    const input = packer.add('SCALAR', [0, 1]);
    const output = packer.add('VEC4', [0, 90].flatMap(aboutZ));
    const bytes = glb(
      turned(packer, [
        { input, output },
        { input, output },
      ]),
      packer.data,
    );
    const { plan } = await write(bytes, (tracks) => tracks.map((track) => negated(track, 1)));
    expect(plan.ranges).toHaveLength(1);
    const apart = await write(bytes, (tracks) => tracks.map((track, i) => negated(track, i)));
    expect(jsonOf(apart.made).accessors).toHaveLength(3);
  });

  test('a sampler of two channels is copied before one changes', async () => {
    const packer = new Packer();
    const input = packer.add('SCALAR', [0, 1]);
    const output = packer.add('VEC4', [0, 90].flatMap(aboutZ));
    const channels = [0, 1].map((node) => ({ sampler: 0, target: { node, path: 'rotation' } }));
    const json = turned(packer, [], {
      animations: [{ name: 'Both', channels, samplers: [{ input, output }] }],
    });
    const bytes = glb(json, packer.data);
    expect(tracksOf(await open(bytes))[0].source.sharedWith).toEqual(['/animations/0/channels/1']);
    const { made } = await write(bytes, ([first]) => [negated(first, 1)]);
    expect(jsonOf(made).animations[0].samplers).toEqual([
      { input, output },
      { input, output: 2, interpolation: 'LINEAR' },
    ]);
    await write(bytes, (tracks) => tracks.map((track, i) => negated(track, i)));
    await write(bytes, (tracks) => tracks.map(withoutLast));
  });

  test('values that a mesh, an image or an overlapping accessor reads are copied', async () => {
    const others: ((packer: Packer, output: number) => GltfJson)[] = [
      (_, output) => ({ meshes: [{ primitives: [{ attributes: { _SPIN: output } }] }] }),
      (packer, output) => ({
        images: [{ bufferView: packer.accessors[output].bufferView, mimeType: 'image/png' }],
      }),
      (packer, output) => {
        packer.accessors.push({
          bufferView: packer.accessors[output].bufferView,
          componentType: 5126,
          count: 1,
          type: 'VEC4',
        });
        return {};
      },
      (packer, output) => {
        const view = packer.bufferViews[Number(packer.accessors[output].bufferView)];
        packer.bufferViews.push({ ...view, byteLength: 4 });
        return {};
      },
    ];
    for (const other of others) {
      const packer = new Packer();
      const input = packer.add('SCALAR', [0, 1]);
      const output = packer.add('VEC4', [0, 90].flatMap(aboutZ));
      const more = other(packer, output);
      const bytes = glb({ ...turned(packer, [{ input, output }]), ...more }, packer.data);
      const file = await open(bytes);
      const [track] = tracksOf(file);
      const after = patchedBytes(bytes, await file.plan([negated(track, 1)]));
      expect(tracksOf(await open(after))[0].values).toEqual(negated(track, 1).values);
      // The old bytes stand where they stood.
      expect(Buffer.from(after).includes(Buffer.from(packer.data))).toBe(true);
    }
  });

  test('a sparse accessor is written out dense', async () => {
    const packer = new Packer();
    const input = packer.add('SCALAR', [0, 1, 2]);
    const indices = packer.view(Uint8Array.of(1));
    const values = packer.view(new Uint8Array(Float32Array.from(aboutZ(90)).buffer));
    const sparse = {
      count: 1,
      indices: { bufferView: indices, componentType: 5121 },
      values: { bufferView: values },
    };
    const output = packer.add('VEC4', [0, 0, 0].flatMap(aboutZ), 'float', { sparse });
    const bytes = glb(turned(packer, [{ input, output }]), packer.data);
    const file = await open(bytes);
    const [track] = tracksOf(file);
    const after = patchedBytes(bytes, await file.plan([negated(track, 1)]));
    expect(jsonOf(after).accessors[output].sparse).toBeUndefined();
    expect(tracksOf(await open(after))[0].values).toEqual(negated(track, 1).values);
  });

  test('an asset with no buffer at all gets one', async () => {
    const json = turned(new Packer(), [{ input: 0, output: 1 }], {
      accessors: [
        { componentType: 5126, count: 1, type: 'SCALAR', min: [0], max: [0] },
        { componentType: 5126, count: 1, type: 'VEC4' },
      ],
      buffers: undefined,
      bufferViews: undefined,
    });
    for (const bytes of [glb(json), gltf(json)]) {
      const file = await open(bytes);
      const [track] = tracksOf(file);
      const after = patchedBytes(
        bytes,
        await file.plan([replaceTrack(track, { values: Float64Array.of(0, 0, 0, 1) })]),
      );
      expect([...tracksOf(await open(after))[0].values]).toEqual([0, 0, 0, 1]);
    }
  });
});

describe('any change of any tracks', () => {
  test('reads back as given while all others stay', async () => {
    const degrees = fc.array(fc.integer({ min: -180, max: 180 }), { minLength: 1, maxLength: 5 });
    await fc.assert(
      fc.asyncProperty(
        fc.array(fc.tuple(degrees, fc.constantFrom<Component>('float', 'short', 'byte'), fc.boolean()), {
          minLength: 1,
          maxLength: 4,
        }),
        fc.array(fc.tuple(fc.nat(3), degrees), { maxLength: 3 }),
        fc.boolean(),
        async (clips, edits, embedded) => {
          const packer = new Packer();
          const samplers: { input: number; output: number }[] = [];
          clips.forEach(([turns, component, shares], i) => {
            if (shares && i > 0) samplers.push(samplers[i - 1]);
            else
              samplers.push({
                input: packer.add(
                  'SCALAR',
                  turns.map((__, key) => key / 8),
                ),
                output: packer.add('VEC4', turns.flatMap(aboutZ), component),
              });
          });
          const json = turned(packer, samplers);
          const uri = `data:application/octet-stream;base64,${Buffer.from(packer.data).toString('base64')}`;
          const bytes = embedded
            ? gltf({ ...json, buffers: [{ byteLength: packer.data.byteLength, uri }] })
            : glb(json, packer.data);
          const wanted = new Map(edits.map(([clip, turns]) => [clip % clips.length, turns]));
          await write(
            bytes,
            (tracks) =>
              [...wanted].map(([clip, turns]) =>
                replaceTrack(tracks[clip], {
                  times: Float64Array.from(turns, (__, key) => key / 4),
                  values: Float64Array.from(turns.flatMap(aboutZ)),
                }),
              ),
            0.5 / 127,
          );
        },
      ),
      { numRuns: 60 },
    );
  });
});
