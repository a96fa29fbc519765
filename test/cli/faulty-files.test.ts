// NEEDS A15 and REPORT: a file that can be read but whose tracks are faulty fails the check (exit 1) with a code of its own for each fault.
import { writeFileSync } from 'node:fs';
import { describe, expect, test } from 'vitest';
import { aboutZ, glb, oneTrack, Packer } from '../support/gltf-bytes.js';
import { commandFolder, reportOf } from '../support/run-command.js';

const smooth = Array.from({ length: 30 }, (_, key) => key);
const even = smooth.map((key) => key / 30);

function timed(change: Readonly<Record<number, number>>): Uint8Array {
  const made = oneTrack(smooth, { times: even.map((time, key) => change[key] ?? time) });
  return glb(made.asset, made.data);
}

/** A track whose accessors `spoil` changes. */
function spoilt(spoil: (packer: Packer) => void): Uint8Array {
  const made = oneTrack(smooth, { times: even });
  spoil(made);
  return glb({ ...made.asset, ...made.json }, made.data);
}

const FAULTS: readonly (readonly [string, Uint8Array, string])[] = [
  ['times out of order', timed({ 9: 0.5 }), 'file.time-order'],
  ['two keys at one time', timed({ 9: even[8] }), 'file.time-order'],
  ['two keys a millionth of a second apart', timed({ 9: even[8] + 1e-6 }), 'file.time-order'],
  ['a time that is none', timed({ 9: Number.NaN }), 'file.not-finite'],
  ['a negative time', timed({ 0: -0.5 }), 'gltf.negative-time'],
  [
    'more times than values',
    spoilt(({ accessors }) => Object.assign(accessors[1], { count: 29 })),
    'gltf.count-mismatch',
  ],
  [
    'bounds that are not those of its times',
    spoilt(({ accessors }) => Object.assign(accessors[0], { max: [2] })),
    'gltf.wrong-bounds',
  ],
  [
    'a view beyond its buffer',
    spoilt(({ bufferViews }) => Object.assign(bufferViews[1], { byteLength: 1e6 })),
    'gltf.view-out-of-range',
  ],
  [
    'integers that are not normalised',
    spoilt(({ accessors }) => Object.assign(accessors[1], { componentType: 5122 })),
    'gltf.value-type',
  ],
];

describe('a file with', () => {
  test.each(FAULTS)('%s fails the check, and says why', async (_, bytes, code) => {
    const { path, run } = await commandFolder();
    writeFileSync(path('mast.glb'), bytes);
    const text = await run('check', 'mast.glb');
    expect([text.code, text.stderr]).toEqual([1, '']);
    expect(text.stdout).toContain(code);
    const { files, totals, verdict } = reportOf(await run('check', 'mast.glb', '--format', 'json'));
    const said = [...(files[0].problems ?? []), ...files[0].findings].map(({ level }) => level);
    expect(verdict).toBe('fail');
    expect(totals.error + totals.warning + totals.note).toBe(said.length);
  });

  test('none of them passes', async () => {
    const { path, run } = await commandFolder();
    writeFileSync(path('mast.glb'), timed({}));
    expect(await run('check', 'mast.glb')).toMatchObject({ code: 0, stderr: '' });
  });

  test('a required extension that hides its rotations can not be read: the extension is named', async () => {
    const { path, run } = await commandFolder();
    for (const [where, spoil] of [
      ['view', (p: Packer, extensions: object) => Object.assign(p.bufferViews[1], { extensions })],
      ['accessor', (p: Packer, extensions: object) => Object.assign(p.accessors[1], { extensions })],
    ] as const) {
      const made = oneTrack(smooth, { times: even });
      spoil(made, { ACME_squeezed: { of: where } });
      const asset = { ...made.asset, ...made.json, extensionsRequired: ['ACME_squeezed'] };
      writeFileSync(path('mast.glb'), glb(asset, made.data));
      const ran = await run('check', 'mast.glb');
      expect([ran.code, ran.stdout]).toEqual([2, expect.stringContaining('gltf.needs-extension')]);
      expect(ran.stdout).toContain('ACME_squeezed');
    }
  });

  test('a compressed view whose plain bytes are not there can not be read: the compression is named', async () => {
    const { path, run } = await commandFolder();
    const made = oneTrack(smooth, { times: even });
    const compression = { EXT_meshopt_compression: { buffer: 0, byteLength: 9, byteStride: 16, count: 30 } };
    Object.assign(made.bufferViews[1], { buffer: 1, byteOffset: 0, extensions: compression });
    const buffers = [{ byteLength: made.data.byteLength }, { byteLength: 480 }];
    writeFileSync(path('mast.glb'), glb({ ...made.asset, ...made.json, buffers }, made.data));
    const ran = await run('check', 'mast.glb');
    expect([ran.code, ran.stdout]).toEqual([2, expect.stringContaining('EXT_meshopt_compression')]);
  });

  test('a turn beside its broken one is read all the same', async () => {
    const { path, run } = await commandFolder();
    const packer = new Packer();
    const input = packer.add('SCALAR', even);
    const output = packer.add('VEC4', smooth.flatMap(aboutZ));
    const target = { node: 0, path: 'rotation' };
    const animations = [
      { name: 'Broken', channels: [{ sampler: 0, target }], samplers: [{ input, output: 9 }] },
      { name: 'Sound', channels: [{ sampler: 0, target }], samplers: [{ input, output }] },
    ];
    writeFileSync(
      path('mast.glb'),
      glb({ ...packer.json, nodes: [{ name: 'Mast' }], animations }, packer.data),
    );
    const ran = await run('check', 'mast.glb', '--format', 'json');
    const [file] = reportOf(ran).files;
    expect(ran.code).toBe(1);
    expect(file.clips.map(({ clip, tracks }) => [clip, tracks])).toEqual([
      ['Broken', 0],
      ['Sound', 1],
    ]);
    expect(file.problems).toMatchObject([{ code: 'gltf.no-accessor', level: 'error' }]);
  });
});
