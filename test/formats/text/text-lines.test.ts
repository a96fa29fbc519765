import { describe, expect, test } from 'vitest';
import { bufferSource, openAnimation, patchedBytes } from '@slewcurve/formats';
import { replaceTrack } from '@slewcurve/core';
import { openText, rewritten, tracksOf } from '../../support/text-files.js';

/** A table whose lines lie across the ends of the slices in which a file is read. */
const long = (end: string): string =>
  `t,qx,qy,qz,qw${end}${Array.from({ length: 40_000 }, (_, key) => `${key},0.00,0.00,1.00,0.0${key % 10}${end}`).join('')}`;

describe('lines of a long file', () => {
  test.each([
    ['LF', '\n'],
    ['CRLF', '\r\n'],
    ['CR', '\r'],
  ])('are whole across slices: %s', async (_, end) => {
    const text = long(end);
    expect(text.length).toBeGreaterThan(3 * (1 << 18));
    const [track] = tracksOf(await openText(text, 'long.csv'));
    expect(track.times).toEqual(Float64Array.from({ length: 40_000 }, (__, key) => key));
    expect(track.values.every((value, i) => value === [0, 0, 1, (Math.floor(i / 4) % 10) / 100][i % 4])).toBe(
      true,
    );
    const values = track.values.slice();
    values[4 * 39_990 + 3] = 0.5;
    const made = await rewritten(text, 'long.csv', [replaceTrack(track, { values })]);
    expect(made).toBe(text.replace('39990,0.00,0.00,1.00,0.00', '39990,0.00,0.00,1.00,0.50'));
  });

  test('keep bytes that are no UTF-8, in columns that mean nothing', async () => {
    const head = new TextEncoder().encode('t,qx,qy,qz,qw,who\n0,0,0,0,1.0,');
    const bytes = Uint8Array.of(...head, 0xe9, 0xff, 0x0a, ...new TextEncoder().encode('1,0,0,0,1.0,é\n'));
    const file = await openAnimation(bufferSource(bytes), { name: 'a.csv' });
    const [track] = tracksOf(file);
    const changed = replaceTrack(track, { values: track.values.map((x) => x / 2) });
    const made = patchedBytes(bytes, await file.plan([changed]));
    expect(Buffer.from(made).toString('latin1')).toBe(
      Buffer.from(bytes).toString('latin1').replaceAll('1.0', '0.5'),
    );
  });

  test('are counted from 1, comments and empty ones too', async () => {
    const text = '# one\r\n\r\nt,qx,qy,qz,qw\r\n0,0,0,0,1\r\n\r\n1,0,x,0,1\r\n';
    await expect(openText(text, 'a.csv')).rejects.toMatchObject({
      place: { line: 6, byte: text.indexOf('1,0,x') },
    });
  });
});
