import { describe, expect, test } from 'vitest';
import { bufferSource, openAnimation, type AnimationFile, type Source } from '@slewcurve/formats';
import { gltf, oneTrack } from '../../support/gltf-bytes.js';

const made = oneTrack([0, 15, 40]);
const base64 = Buffer.from(made.data).toString('base64');

async function openWith(
  uri: string | undefined,
  sibling?: (path: string) => Promise<Source>,
): Promise<AnimationFile> {
  const buffer = { byteLength: made.data.byteLength, ...(uri !== undefined && { uri }) };
  return openAnimation(bufferSource(gltf({ ...made.asset, buffers: [buffer] })), {
    name: 'mast.gltf',
    ...(sibling && { sibling }),
  });
}

const keysOf = (file: AnimationFile): number | undefined => file.clips[0].tracks[0]?.times.length;

describe('a buffer beside the asset', () => {
  test('is asked for by its percent-decoded path', async () => {
    const asked: string[] = [];
    const file = await openWith('takes/a%20mast%C3%A9.bin', async (path) => {
      asked.push(path);
      return bufferSource(made.data);
    });
    expect(asked).toEqual(['takes/a masté.bin']);
    expect(keysOf(file)).toBe(3);
  });

  test.each([
    'https://example.org/a.bin',
    'file:///etc/passwd',
    'C:/a.bin',
    'C%3A/a.bin',
    '/etc/passwd',
    '%2Fetc/passwd',
    '../a.bin',
    'a/../../b.bin',
    'a/%2e%2e/%2E%2E/b.bin',
    '..%5Ca.bin',
    'a\\b.bin',
    'NUL',
    'takes/com1.bin',
    'aux .bin/x',
    'a%00.bin',
    'a.bin?x=1',
    '%E0%A4%A',
    '',
  ])('is refused under %j', async (uri) => {
    let asked = false;
    const opening = openWith(uri, async () => {
      asked = true;
      return bufferSource(made.data);
    });
    await expect(opening).rejects.toMatchObject({
      code: 'gltf.refused-uri',
      place: { pointer: '/buffers/0/uri' },
    });
    expect(asked).toBe(false);
  });

  test('that is not there, or not given, is named', async () => {
    await expect(openWith('mast.bin')).rejects.toMatchObject({
      code: 'gltf.no-sibling',
      message: expect.stringContaining('mast.bin'),
    });
    const failing = openWith('mast.bin', () => Promise.reject(new Error('no such file')));
    await expect(failing).rejects.toMatchObject({
      code: 'gltf.no-sibling',
      message: expect.stringContaining('no such file'),
    });
  });

  test('that is shorter than it should be is named with both numbers', async () => {
    const opening = openWith('mast.bin', async () => bufferSource(made.data.subarray(0, 20)));
    await expect(opening).rejects.toMatchObject({
      code: 'gltf.buffer-short',
      message: expect.stringMatching(/60 .*20/),
    });
  });
});

describe('a data URI', () => {
  test.each([
    ['padded', `data:application/octet-stream;base64,${base64}`],
    ['without padding', `data:;base64,${base64.replace(/=+$/, '')}`],
    [
      'in capitals, with percent escapes',
      `DATA:application/gltf-buffer;BASE64,${encodeURIComponent(base64)}`,
    ],
  ])('is read %s', async (_, uri) => {
    expect(keysOf(await openWith(uri))).toBe(3);
  });

  test.each(['data:;base64,AAA!', 'data:,abc', 'data:;base64,AAAAA'])('%s is refused', async (uri) => {
    await expect(openWith(uri)).rejects.toMatchObject({ code: 'gltf.bad-data-uri' });
  });
});

test('a buffer with neither URI nor BIN chunk hides the channels that read it, and says so', async () => {
  const file = await openWith(undefined);
  expect(file.clips[0].tracks).toEqual([]);
  expect(file.problems).toMatchObject([
    { code: 'gltf.no-data', place: { pointer: '/buffers/0', clip: 'Turn', node: 0 } },
  ]);
});
