import { describe, expect, test } from 'vitest';
import { bufferSource, openAnimation, type AnimationFile } from '@slewcurve/formats';
import { aboutZ, glb, oneTrack, type Component, type GltfJson, Packer } from '../../support/gltf-bytes.js';

const open = async (bytes: Uint8Array): Promise<AnimationFile> =>
  openAnimation(bufferSource(bytes), { name: 'mast.glb' });

/** Opens one track whose output accessor is what `accessor` makes. */
async function valuesOf(packer: Packer, input: number, output: number): Promise<Float64Array> {
  const file = await open(glb(asset(packer, input, output), packer.data));
  expect(file.problems.filter(({ code }) => code !== 'gltf.strided')).toEqual([]);
  return file.clips[0].tracks[0].values;
}

function asset(packer: Packer, input: number, output: number, interpolation = 'LINEAR'): GltfJson {
  return {
    ...packer.json,
    nodes: [{ name: 'Mast' }],
    animations: [
      {
        name: 'Turn',
        channels: [{ sampler: 0, target: { node: 0, path: 'rotation' } }],
        samplers: [{ input, output, interpolation }],
      },
    ],
  };
}

describe('rotation output', () => {
  // glTF 2.0, "Animations": f = max(c / 127.0, -1.0), c / 255.0, max(c / 32767.0, -1.0), c / 65535.0.
  test.each<[Component, string, number]>([
    ['byte', 'int8', 127],
    ['ubyte', 'uint8', 255],
    ['short', 'int16', 32_767],
    ['ushort', 'uint16', 65_535],
  ])('of normalised %s is read by the formula of the glTF text', async (component, name, top) => {
    const made = oneTrack([0, 15, 40], { component });
    const { tracks } = (await open(glb(made.asset, made.data))).clips[0];
    expect(tracks[0].storage.component).toBe(name);
    expect([...tracks[0].values]).toEqual([0, 15, 40].flatMap(aboutZ).map((x) => Math.round(x * top) / top));
  });

  test('of -128 and -32768 is -1, not less', async () => {
    for (const [component, Store] of [
      [5120, Int8Array],
      [5122, Int16Array],
    ] as const) {
      const packer = new Packer();
      const input = packer.add('SCALAR', [0]);
      const stored = Store.of(-32_768, 0, 0, 0);
      if (component === 5120) stored[0] = -128;
      packer.accessors.push({
        bufferView: packer.view(new Uint8Array(stored.buffer)),
        componentType: component,
        normalized: true,
        count: 1,
        type: 'VEC4',
      });
      expect([...(await valuesOf(packer, input, 1))]).toEqual([-1, 0, 0, 0]);
    }
  });

  test('without a buffer view is zeros, which rules may judge', async () => {
    const packer = new Packer();
    const input = packer.add('SCALAR', [0, 1]);
    packer.accessors.push({ componentType: 5126, count: 2, type: 'VEC4' });
    expect([...(await valuesOf(packer, input, 1))]).toEqual([0, 0, 0, 0, 0, 0, 0, 0]);
  });

  test('that is sparse is read over its base, or over zeros', async () => {
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
    expect([...(await valuesOf(packer, input, output))]).toEqual([0, 90, 0].flatMap(aboutZ).map(Math.fround));
    packer.accessors.push({ componentType: 5126, count: 3, type: 'VEC4', sparse });
    expect([...(await valuesOf(packer, input, output + 1))]).toEqual(
      [[0, 0, 0, 0], aboutZ(90).map(Math.fround), [0, 0, 0, 0]].flat(),
    );
  });

  test('that is strided is read by its stride, and reported', async () => {
    const packer = new Packer();
    const input = packer.add('SCALAR', [0, 1]);
    const stored = Float32Array.from([...aboutZ(0), 9, ...aboutZ(90), 9]);
    const view = packer.view(new Uint8Array(stored.buffer), { byteStride: 20 });
    packer.accessors.push({ bufferView: view, componentType: 5126, count: 2, type: 'VEC4' });
    expect([...(await valuesOf(packer, input, 1))]).toEqual([0, 90].flatMap(aboutZ).map(Math.fround));
  });

  test('that starts between two floats is read, and reported', async () => {
    const packer = new Packer();
    const input = packer.add('SCALAR', [0]);
    const bytes = new Uint8Array(20);
    bytes.set(new Uint8Array(Float32Array.from(aboutZ(90)).buffer), 2);
    packer.accessors.push({
      bufferView: packer.view(bytes),
      byteOffset: 2,
      componentType: 5126,
      count: 1,
      type: 'VEC4',
    });
    const file = await open(glb(asset(packer, input, 1), packer.data));
    expect([...file.clips[0].tracks[0].values]).toEqual(aboutZ(90).map(Math.fround));
    expect(file.problems.map(({ code }) => code)).toEqual(['gltf.misaligned']);
  });

  test('keeps numbers that are not finite', async () => {
    const packer = new Packer();
    const input = packer.add('SCALAR', [0, Number.NaN], 'float', { min: [0], max: [0] });
    const output = packer.add('VEC4', [Number.NaN, 0, 0, 1, 0, Infinity, 0, 1]);
    const file = await open(glb(asset(packer, input, output), packer.data));
    expect([...file.clips[0].tracks[0].times]).toEqual([0, Number.NaN]);
    expect([...file.clips[0].tracks[0].values]).toEqual([Number.NaN, 0, 0, 1, 0, Infinity, 0, 1]);
    expect(file.clips[0]).toMatchObject({ start: 0, end: 0 });
  });
});

describe('an accessor that lies', () => {
  const cases: [string, string, (packer: Packer) => void][] = [
    [
      'a billion keys in no view',
      'gltf.more-than-held',
      (p) =>
        p.accessors.forEach((a) => {
          a.count = 1e9;
          delete a.bufferView;
        }),
    ],
    [
      'a billion keys in a view of 16 bytes',
      'gltf.accessor-out-of-range',
      (p) => {
        p.accessors[1].count = 1e9;
        p.accessors[0].count = 1e9;
      },
    ],
    [
      'a view beyond its buffer',
      'gltf.view-out-of-range',
      (p) => {
        p.bufferViews[1].byteLength = 1e15;
      },
    ],
    [
      'an offset beyond its view',
      'gltf.accessor-out-of-range',
      (p) => {
        p.accessors[1].byteOffset = 4;
      },
    ],
    [
      'a view that is not there',
      'gltf.no-view',
      (p) => {
        p.accessors[1].bufferView = 7;
      },
    ],
    [
      'a view of no buffer',
      'gltf.bad-view',
      (p) => {
        p.bufferViews[1].buffer = 3;
      },
    ],
    [
      'a count of minus one',
      'gltf.bad-accessor',
      (p) => {
        p.accessors[1].count = -1;
      },
    ],
    [
      'half a key',
      'gltf.bad-accessor',
      (p) => {
        p.accessors[1].count = 1.5;
      },
    ],
    [
      'a component type called __proto__',
      'gltf.bad-accessor',
      (p) => {
        p.accessors[1].componentType = '__proto__';
      },
    ],
    [
      'a type called constructor',
      'gltf.bad-accessor',
      (p) => {
        p.accessors[1].type = 'constructor';
      },
    ],
    [
      'three numbers a key',
      'gltf.value-type',
      (p) => {
        p.accessors[1].type = 'VEC3';
      },
    ],
    [
      'integers that are not normalised',
      'gltf.value-type',
      (p) => {
        p.accessors[1].componentType = 5122;
      },
    ],
    [
      'integer times',
      'gltf.time-type',
      (p) => {
        p.accessors[0].componentType = 5123;
      },
    ],
    [
      'two times for one rotation',
      'gltf.count-mismatch',
      (p) => {
        p.accessors[1].count = 1;
      },
    ],
    [
      'a sparse part beyond its count',
      'gltf.bad-sparse',
      (p) => {
        p.accessors[1].sparse = { count: 5, indices: {}, values: {} };
      },
    ],
  ];
  test.each(cases)('by %s hides its channel alone, with the code %s', async (_, code, spoil) => {
    const packer = new Packer();
    packer.add('SCALAR', [0, 1]);
    packer.add('VEC4', [0, 90].flatMap(aboutZ));
    packer.add('SCALAR', [0, 1]);
    packer.add('VEC4', [0, 90].flatMap(aboutZ));
    spoil(packer);
    const target = { node: 0, path: 'rotation' };
    const json = {
      ...packer.json,
      nodes: [{ name: 'Mast' }],
      animations: [
        { name: 'Broken', channels: [{ sampler: 0, target }], samplers: [{ input: 0, output: 1 }] },
        { name: 'Sound', channels: [{ sampler: 0, target }], samplers: [{ input: 2, output: 3 }] },
      ],
    };
    // That clip is of zeros then, sound as they are.
    if (code === 'gltf.more-than-held') for (const sound of packer.accessors.slice(2)) sound.count = 2;
    const file = await open(glb(json, packer.data));
    expect(file.clips.map(({ tracks }) => tracks.length)).toEqual([0, 1]);
    expect(file.problems).toMatchObject([{ code, place: { file: 'mast.glb', clip: 'Broken' } }]);
    expect(file.problems[0].place.pointer).toMatch(/^\/(accessors|bufferViews)\//);
  });
});
