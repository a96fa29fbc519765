import { describe, expect, test } from 'vitest';
import { replaceTrack, type RotationTrack } from '@slewcurve/core';
import { aboutZ, glb, gltf, jsonOf, oneTrack, Packer, type Component } from '../../support/gltf-bytes.js';
import { NAME, negated, open, tracksOf, turned, withoutLast, write } from '../../support/written-gltf.js';

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
      const other = [0, 16, 41].flatMap(aboutZ);
      const { plan, file } = await write(
        glb(made.asset, made.data),
        ([track]) => [replaceTrack(track, { values: Float64Array.from(other) })],
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
