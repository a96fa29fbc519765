import { describe, expect, test } from 'vitest';
import { bufferSource, openAnimation, type AnimationFile } from '@slewcurve/formats';
import { glb, oneTrack } from '../../support/gltf-bytes.js';

const made = oneTrack([0, 15, 40]);
const sound = glb(made.asset, made.data);
const open = async (bytes: Uint8Array): Promise<AnimationFile> =>
  openAnimation(bufferSource(bytes), { name: 'mast.glb' });

function withWord(at: number, word: number): Uint8Array {
  const bytes = sound.slice();
  new DataView(bytes.buffer).setUint32(at, word, true);
  return bytes;
}

const jsonLength = new DataView(sound.buffer).getUint32(12, true);

describe('a GLB that lies about itself', () => {
  test.each([
    [
      'a length beyond the file',
      withWord(8, sound.byteLength + 1),
      'gltf.truncated',
      `${sound.byteLength + 1} bytes`,
    ],
    ['a length below its own header', withWord(8, 12), 'gltf.bad-length', 'says 12 bytes'],
    ['version 1', withWord(4, 1), 'gltf.version', 'version 1'],
    ['a JSON chunk beyond the file', withWord(12, 0xffff_fffc), 'gltf.bad-chunk', '4294967292'],
    ['a first chunk that is no JSON', withWord(16, 0x004e4942), 'gltf.bad-chunk', '0x4e4942'],
    ['a BIN chunk beyond the file', withWord(20 + jsonLength, 0x7fff_fffc), 'gltf.bad-chunk', '2147483644'],
    ['a JSON chunk cut inside', withWord(12, 8), 'gltf.bad-chunk', ''],
  ])('is refused for %s, with the number', async (_, bytes, code, number) => {
    await expect(open(bytes)).rejects.toMatchObject({ code, message: expect.stringContaining(number) });
  });

  test('cut after any byte gives a coded error that names the file', async () => {
    for (let length = 0; length < sound.byteLength; length++) {
      await expect(open(sound.subarray(0, length)), `cut to ${length} bytes`).rejects.toMatchObject({
        name: 'SlewcurveError',
        place: { file: 'mast.glb' },
      });
    }
  });

  test('with bytes behind its end is read, and says so', async () => {
    const file = await open(Uint8Array.from([...sound, 1, 2, 3]));
    expect(file.problems.map(({ code }) => code)).toEqual(['gltf.trailing-bytes']);
    expect(file.clips[0].tracks).toHaveLength(1);
  });

  test('whose buffer is longer than its BIN chunk is refused with both numbers', async () => {
    const asset = { ...made.asset, buffers: [{ byteLength: 4096 }] };
    await expect(open(glb(asset, made.data))).rejects.toMatchObject({
      code: 'gltf.buffer-short',
      message: expect.stringMatching(/4096 .*60/),
      place: { pointer: '/buffers/0' },
    });
  });
});
