import { describe, expect, test } from 'vitest';
import { bufferSource, openAnimation, type AnimationFile } from '@slewcurve/formats';
import { aboutZ, glb, gltf, oneTrack } from '../support/gltf-bytes.js';

const open = async (bytes: Uint8Array): Promise<AnimationFile> =>
  openAnimation(bufferSource(bytes), { name: 'mast.glb' });

describe('openAnimation', () => {
  test('reads a GLB into tracks, with where they came from', async () => {
    const made = oneTrack([0, 15, 40]);
    const file = await open(glb(made.asset, made.data));
    expect(file).toMatchObject({ format: 'glb', problems: [], nodes: [{ path: 'Mast', parent: -1 }] });
    expect(file.clips).toHaveLength(1);
    expect(file.clips[0]).toMatchObject({ name: 'Turn', index: 0, start: 0, frameRate: 24, loop: false });
    // The end is the float32 nearest to 2/24 s.
    expect(file.clips[0].end).toBe(Math.fround(2 / 24));
    const [track] = file.clips[0].tracks;
    expect(track).toMatchObject({
      id: 'Mast',
      clip: 'Turn',
      interpolation: 'LINEAR',
      storage: { component: 'float32', timeComponent: 'float32' },
      source: { clipIndex: 0, node: 0, sampler: 0, channel: 0, times: 0, values: 1, sharedWith: [] },
    });
    expect([...track.values]).toEqual([0, 15, 40].flatMap(aboutZ).map(Math.fround));
  });

  test('reads glTF JSON behind a byte order mark and white space', async () => {
    const text = new TextDecoder('utf-8', { ignoreBOM: true }).decode(gltf({ asset: { version: '2.0' } }));
    const file = await open(new TextEncoder().encode(`\uFEFF \r\n\t${text}`));
    expect(file).toMatchObject({ format: 'gltf', clips: [], nodes: [] });
  });

  test.each([
    ['nothing', new Uint8Array(0), 'file.empty'],
    ['a picture', Uint8Array.from([0x89, 0x50, 0x4e, 0x47, 13, 10, 26, 10]), 'file.unknown-format'],
    ['JSON that is cut', new TextEncoder().encode('{"asset":{'), 'gltf.not-json'],
    ['JSON that is not UTF-8', Uint8Array.from([0x7b, 0x22, 0xff, 0x22, 0x7d]), 'gltf.encoding'],
    ['glTF 1.0', gltf({ asset: { version: '1.0' }, animations: {} }), 'gltf.version'],
  ])('names %s with a code of its own', async (_, bytes, code) => {
    await expect(open(bytes)).rejects.toMatchObject({
      name: 'SlewcurveError',
      code,
      place: { file: 'mast.glb' },
    });
  });

  test('reads only the JSON and the rotation data of a file with much else', async () => {
    const made = oneTrack([0, 10]);
    const mesh = made.view(new Uint8Array(8_000_000));
    const asset = { ...made.asset, ...made.json, images: [{ bufferView: mesh, mimeType: 'image/png' }] };
    const bytes = glb(asset, made.data);
    let read = 0;
    const source = {
      size: bytes.byteLength,
      read: async (offset: number, length: number): Promise<Uint8Array> => {
        read += length;
        return bytes.subarray(offset, offset + length);
      },
    };
    const file = await openAnimation(source, { name: 'big.glb' });
    expect(file.clips[0].tracks).toHaveLength(1);
    expect(bytes.byteLength).toBeGreaterThan(8_000_000);
    expect(read).toBeLessThan(4000);
  });

  test('says that a file was changed while it was read', async () => {
    const bytes = glb({ asset: { version: '2.0' } });
    const source = { size: bytes.byteLength, read: async (): Promise<Uint8Array> => new Uint8Array(3) };
    await expect(openAnimation(source, { name: 'a.glb' })).rejects.toMatchObject({
      code: 'source.short-read',
    });
  });
});
