import fc from 'fast-check';
import { validateBytes } from 'gltf-validator';
import { describe, expect, test } from 'vitest';
import { replaceTrack, type RotationTrack } from '@slewcurve/core';
import {
  bufferSource,
  invertPatchPlan,
  openAnimation,
  patchedBytes,
  type AnimationFile,
  type PatchPlan,
} from '@slewcurve/formats';
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

const NAME = 'mast.glb';
const open = async (bytes: Uint8Array): Promise<AnimationFile> =>
  openAnimation(bufferSource(bytes), { name: NAME });
const tracksOf = (file: AnimationFile): RotationTrack[] => file.clips.flatMap(({ tracks }) => tracks);

async function issuesOf(bytes: Uint8Array): Promise<string[]> {
  const { issues } = await validateBytes(bytes, { maxIssues: 0 });
  return issues.messages.map(({ code, pointer, offset }) => `${code} ${pointer ?? offset}`);
}

interface Written {
  readonly plan: PatchPlan;
  readonly made: Uint8Array;
  readonly file: AnimationFile;
}

/**
 * Writes changed tracks and checks what every write must hold: what was not named by the plan is equal, the plan turned
 * round restores the file, the validator finds nothing new, the changed tracks read back as given (to `within`), every
 * other track as before.
 */
async function write(
  bytes: Uint8Array,
  change: (tracks: RotationTrack[]) => RotationTrack[],
  within = 0,
): Promise<Written> {
  const before = await open(bytes);
  const old = tracksOf(before);
  const changed = change(old);
  const plan = await before.plan(changed);
  const made = patchedBytes(bytes, plan);
  const back = await invertPatchPlan(bufferSource(bytes), plan);
  expect(Buffer.compare(patchedBytes(made, back), bytes)).toBe(0);
  const known = new Set(await issuesOf(bytes));
  expect((await issuesOf(made)).filter((issue) => !known.has(issue))).toEqual([]);
  const file = await open(made);
  const now = tracksOf(file);
  expect(now.map(({ clip, id }) => [clip, id])).toEqual(old.map(({ clip, id }) => [clip, id]));
  now.forEach((track, i) => {
    const wanted = changed.find(({ clip, id }) => clip === track.clip && id === track.id) ?? old[i];
    const tolerance = changed.includes(wanted) ? within : 0;
    expect(track.interpolation).toBe(wanted.interpolation);
    expectNumbers(track.times, wanted.times, tolerance);
    expectNumbers(track.values, wanted.values, tolerance);
  });
  return { plan, made, file };
}

function expectNumbers(actual: Float64Array, wanted: Float64Array, within: number): void {
  expect(actual).toHaveLength(wanted.length);
  const worst = actual.reduce(
    (most, x, i) => Math.max(most, Object.is(x, wanted[i]) ? 0 : Math.abs(x - wanted[i])),
    0,
  );
  expect(worst).toBeLessThanOrEqual(within);
}

/** The track with the values of some keys negated: the same orientations, other numbers. */
function negated(track: RotationTrack, ...keys: number[]): RotationTrack {
  const size = track.values.length / track.times.length;
  return replaceTrack(track, {
    values: track.values.map((x, i) => (keys.includes(Math.floor(i / size)) ? -x : x)),
  });
}

function withoutLast(track: RotationTrack): RotationTrack {
  const size = track.values.length / track.times.length;
  return replaceTrack(track, { times: track.times.slice(0, -1), values: track.values.slice(0, -size) });
}

describe('a plan for no change', () => {
  test.each([
    ['no track', (): RotationTrack[] => []],
    ['tracks as they are', (tracks: RotationTrack[]): RotationTrack[] => tracks],
    [
      'equal numbers in another array',
      ([track]: RotationTrack[]) => [replaceTrack(track, { values: track.values.slice() })],
    ],
    [
      'a change below the rounding of float32',
      ([track]: RotationTrack[]) => [
        replaceTrack(track, { values: track.values.map((x) => x * (1 + 1e-9)) }),
      ],
    ],
  ])('has no range: %s', async (_, change) => {
    const made = oneTrack([0, 15, 40]);
    const bytes = glb(made.asset, made.data);
    const file = await open(bytes);
    const plan = await file.plan(change(tracksOf(file)));
    expect(plan).toEqual({ ranges: [], size: bytes.byteLength });
  });
});

describe('a change of values', () => {
  test('overwrites only the keys that changed, one range a stretch', async () => {
    const made = oneTrack([0, 10, 20, 30, 40, 50]);
    const bytes = glb(made.asset, made.data);
    const { plan } = await write(bytes, ([track]) => [negated(track, 1, 2, 5)]);
    const values = bytes.byteLength - 6 * 16;
    expect(plan.ranges.map(({ at, length, what }) => [at, length, what])).toEqual([
      [values + 16, 32, 'Turn Mast: values of keys 1 to 2'],
      [values + 80, 16, 'Turn Mast: values of key 5'],
    ]);
  });

  test.each<[Component, number]>([
    ['byte', 0.5 / 127],
    ['short', 0.5 / 32_767],
  ])(
    'is rounded to %s, at most half a step off, and reads back as it was stored',
    async (component, half) => {
      const made = oneTrack([0, 15, 40], { component });
      const turned = [0, 16, 41].flatMap(aboutZ);
      const { plan, file } = await write(
        glb(made.asset, made.data),
        ([track]) => [replaceTrack(track, { values: Float64Array.from(turned) })],
        half,
      );
      expect(plan.size).toBe(glb(made.asset, made.data).byteLength);
      expect(tracksOf(file)[0].storage.component).toBe(component === 'byte' ? 'int8' : 'int16');
      const [read] = tracksOf(file);
      expect((await file.plan([replaceTrack(read, { values: read.values.slice() })])).ranges).toEqual([]);
    },
  );

  test('keeps the bytes of the numbers in a changed key that stay: -128 beside its twin -127', async () => {
    const made = oneTrack([0, 0], { component: 'byte' });
    const stored = made.data;
    stored.set([0x80, 0, 0, 10], 12);
    const bytes = glb(made.asset, stored);
    const { made: after } = await write(bytes, ([track]) => {
      const values = track.values.slice();
      values[7] = 8 / 127;
      return [replaceTrack(track, { values })];
    });
    expect([...after.subarray(-4)]).toEqual([0x80, 0, 0, 8]);
  });

  test('that unsigned bytes cannot hold moves the track to float', async () => {
    const made = oneTrack([0, 15, 40], { component: 'ubyte' });
    const { file } = await write(glb(made.asset, made.data), ([track]) => [negated(track, 1)], 1e-7);
    expect(tracksOf(file)[0].storage.component).toBe('float32');
    expect(tracksOf(file)[0].values[7]).toBeLessThan(0);
  });

  test('keeps the bounds of values true where there are any', async () => {
    const packer = new Packer();
    const input = packer.add('SCALAR', [0, 1]);
    const output = packer.add('VEC4', [0, 0, 0, 1, 0, 0, 1, 0], 'float', {
      min: [0, 0, 0, 0],
      max: [0, 0, 1, 1],
    });
    const { made } = await write(glb(turned(packer, [{ input, output }]), packer.data), ([track]) => [
      negated(track, 1),
    ]);
    expect(jsonOf(made).accessors[output]).toMatchObject({ min: [0, 0, -1, 0], max: [0, 0, 0, 1] });
  });
});

/** A clip for each sampler, each turning node 0. */
function turned(packer: Packer, samplers: readonly GltfJson[], more: GltfJson = {}): GltfJson {
  return {
    ...packer.json,
    nodes: [{ name: 'Mast' }, { name: 'Arm' }],
    animations: samplers.map((sampler, i) => ({
      name: `Clip ${i}`,
      channels: [{ sampler: 0, target: { node: 0, path: 'rotation' } }],
      samplers: [sampler],
    })),
    ...more,
  };
}

describe('a change of keys', () => {
  test.each(['glb', 'gltf'] as const)(
    'moves what a %s holds alone, and leaves nothing unused behind',
    async (kind) => {
      const made = oneTrack([0, 15, 40]);
      const uri = `data:application/octet-stream;base64,${Buffer.from(made.data).toString('base64')}`;
      const bytes =
        kind === 'glb'
          ? glb(made.asset, made.data)
          : gltf({ ...made.asset, buffers: [{ byteLength: made.data.byteLength, uri }] });
      const { made: after } = await write(bytes, ([track]) => [withoutLast(track)]);
      const json = jsonOf(after);
      expect(json.accessors).toHaveLength(2);
      expect(json.bufferViews).toHaveLength(2);
      expect(json.accessors[0]).toMatchObject({ count: 2, min: [0], max: [Math.fround(1 / 24)] });
    },
  );

  test('between LINEAR and CUBICSPLINE sets the mode with the values', async () => {
    const made = oneTrack([0, 15, 40]);
    const { file } = await write(glb(made.asset, made.data), ([track]) => {
      const still = [0, 0, 0, 0];
      const values = [0, 15, 40].flatMap((degrees) => [
        ...still,
        ...aboutZ(degrees).map(Math.fround),
        ...still,
      ]);
      return [replaceTrack(track, { interpolation: 'CUBICSPLINE', values: Float64Array.from(values) })];
    });
    expect(tracksOf(file)[0].interpolation).toBe('CUBICSPLINE');
  });

  test('of the times alone writes times and their bounds in place', async () => {
    const made = oneTrack([0, 15, 40]);
    const bytes = glb(made.asset, made.data);
    const { plan } = await write(bytes, ([track]) => [
      replaceTrack(track, { times: Float64Array.of(0, 0.125, 0.25) }),
    ]);
    expect(plan.ranges.map(({ what }) => what)).toEqual(
      [
        'length of the file',
        'length of the JSON chunk',
        'JSON /accessors/0/max/0',
        'JSON padding',
        'Turn Mast: times of keys 1 to 2',
      ].filter((what) => plan.ranges.some((range) => range.what === what)),
    );
    expect(plan.ranges.map(({ what }) => what)).toContain('Turn Mast: times of keys 1 to 2');
  });
});

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
    const sibling = async () => bufferSource(made.data);
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
        const view = packer.bufferViews[packer.accessors[output].bufferView as number];
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
      const bin = bytes.byteLength - packer.data.byteLength;
      const moved = after.indexOf(0x42, bin - 5);
      expect(moved).toBeGreaterThan(0);
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

describe('a plan that cannot be', () => {
  test('says which track is unknown, given twice or no quaternions', async () => {
    const made = oneTrack([0, 15, 40]);
    const file = await open(glb(made.asset, made.data));
    const [track] = tracksOf(file);
    const place = { file: NAME, clip: 'Turn' };
    await expect(file.plan([{ ...track, id: 'Boom' }])).rejects.toMatchObject({
      code: 'plan.unknown-track',
      place: { ...place, track: 'Boom' },
    });
    await expect(file.plan([track, track])).rejects.toMatchObject({ code: 'plan.doubled-track', place });
    await expect(file.plan([{ ...track, interpolation: 'EULER' }])).rejects.toMatchObject({
      code: 'plan.cannot-write',
      place,
    });
    await expect(file.plan([{ ...track, values: new Float64Array(3) }])).rejects.toMatchObject({
      code: 'plan.cannot-write',
      place,
    });
  });
});
