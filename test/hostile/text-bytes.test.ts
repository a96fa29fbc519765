import * as fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { replaceTrack, SlewcurveError } from '@slewcurve/core';
import { bufferSource, openAnimation, patchedBytes, type OpenOptions } from '@slewcurve/formats';
import { BOOM } from '../support/bvh-text.js';

/** `npm run long`. */
const LONG = fc.readConfigureGlobal()?.numRuns !== undefined;

const bytesOf = (text: string): Uint8Array => new TextEncoder().encode(text);
const SOUND: readonly (readonly [string, Uint8Array, OpenOptions])[] = [
  ['BVH', bytesOf(BOOM), { name: 'x.bvh' }],
  [
    'quaternions',
    bytesOf(
      '# timestamp_ns tx ty tz qx qy qz qw\n1403636579763555584 1 2 3 0 0 0 1\n1403636579813555456 nan nan nan nan nan nan nan\n1403636579863555328 1 2 3 0 0 1 0\n',
    ),
    { name: 'x.txt' },
  ],
  [
    'angles',
    bytesOf('time_s,rx_deg,ry_deg,rz_deg,note\n0.000,1,359.50,-1e-2,"a, b"\n0.010,0.25,361.00,.125,\n'),
    { name: 'x.csv', table: { euler: 'YXZ' } },
  ],
  [
    'matrices',
    bytesOf('t;m00;m01;m02;m10;m11;m12;m20;m21;m22\n0;1;0;0;0;1;0;0;0;1\n1;0;-1;0;1;0;0;0;0;1\n'),
    { name: 'x.csv' },
  ],
  [
    'axis and angle',
    bytesOf('t\tax\tay\taz\tangle_rad\n0\t0\t0\t1\t0.5\n1\t0\t0\t1\t1.5\n'),
    { name: 'x.tsv' },
  ],
];

/** Opens, changes and writes; nothing but a coded error that names the file may come out. */
async function survives(bytes: Uint8Array, options: OpenOptions): Promise<'opened' | 'refused'> {
  try {
    const file = await openAnimation(bufferSource(bytes), options);
    const tracks = file.clips.flatMap((clip) => clip.tracks);
    const same = await file.plan(tracks);
    expect(same.ranges).toEqual([]);
    const changed = tracks.map((track) => replaceTrack(track, { values: track.values.map((x) => -x) }));
    const made = patchedBytes(bytes, await file.plan(changed));
    const again = await openAnimation(bufferSource(made), options);
    expect(again.clips.flatMap((clip) => clip.tracks)).toHaveLength(tracks.length);
    return 'opened';
  } catch (error) {
    if (!(error instanceof SlewcurveError)) throw error;
    if (!/^[a-z]+(\.[a-z0-9-]+)+$/.test(error.code)) throw error;
    return 'refused';
  }
}

describe('text files that lie', () => {
  test.each(SOUND)('%s cut at every byte end in tracks or in a coded error', async (_, bytes, options) => {
    expect(await survives(bytes, options)).toBe('opened');
    let refused = 0;
    for (let length = 0; length < bytes.byteLength; length++)
      if ((await survives(bytes.slice(0, length), options)) === 'refused') refused++;
    expect(refused).toBeGreaterThan(0);
  });

  test('a billion claimed frames cost what the file has', async () => {
    const text = BOOM.replace('Frames: 3', 'Frames: 1000000000');
    const file = await openAnimation(bufferSource(bytesOf(text)), { name: 'x.bvh' });
    expect(file.problems).toMatchObject([{ code: 'bvh.frame-count' }]);
    expect(file.clips[0].tracks[0].values.buffer.byteLength).toBe(3 * 3 * 8);
  });

  test('joints 50,000 deep are read without a stack of their own', async () => {
    const deep = 50_000;
    const text = `HIERARCHY\nROOT a\n{\n${'JOINT a\n{\n'.repeat(deep)}CHANNELS 1 Xrotation\n${'}\n'.repeat(deep + 1)}MOTION\nFrames: 1\nFrame Time: 1\n5\n`;
    const file = await openAnimation(bufferSource(bytesOf(text)), { name: 'x.bvh' });
    expect(file.nodes).toHaveLength(deep + 1);
    expect(file.nodes.every(({ path }) => path.length <= 4096)).toBe(true);
  });

  test('names that are properties of every object are names', async () => {
    const text = BOOM.replace('ROOT Mast', 'ROOT __proto__').replace('JOINT Winch', 'JOINT constructor');
    const { nodes } = await openAnimation(bufferSource(bytesOf(text)), { name: 'x.bvh' });
    expect(nodes.map(({ name }) => name)).toContain('__proto__');
    const table = '__proto___qx,__proto___qy,__proto___qz,__proto___qw,t\n0,0,0,1,0\n0,0,1,0,1\n';
    const file = await openAnimation(bufferSource(bytesOf(table)), { name: 'x.csv' });
    expect(file.clips[0].tracks.map(({ id }) => id)).toEqual(['__proto__']);
  });

  test('huge numbers are kept or refused, never a hang', async () => {
    const rows = `t,qx,qy,qz,qw\n0,0,0,0,1\n1e300,1e-300,0,0,${'9'.repeat(400)}\n`;
    expect(await survives(bytesOf(rows), { name: 'x.csv' })).toBe('refused');
    const stamp = `t,qx,qy,qz,qw\n1e99999999,0,0,0,1\n`;
    await expect(openAnimation(bufferSource(bytesOf(stamp)), { name: 'x.csv' })).rejects.toMatchObject({
      code: 'delimited.bad-time',
    });
  });

  test('a line without an end is refused once it is longer than any row', async () => {
    const bytes = new Uint8Array(20 << 20).fill(0x31);
    bytes.set(bytesOf('t,qx,qy,qz,qw\n0,0,0,0,1\n'));
    await expect(openAnimation(bufferSource(bytes), { name: 'x.csv' })).rejects.toMatchObject({
      code: 'text.long-line',
    });
  });

  const rows = LONG ? 2_500_000 : 50_000;
  test(`a file of ${rows} rows is read in slices of a quarter of a megabyte`, async () => {
    const head = bytesOf(
      `HIERARCHY\nROOT a\n{\nCHANNELS 3 Xposition Yposition Zrotation\n}\nMOTION\nFrames: ${rows}\nFrame Time: 0.01\n`,
    );
    const row = bytesOf('1.25 -3.5 90.12\n');
    let largest = 0;
    const source = {
      size: head.byteLength + row.byteLength * rows,
      read: async (offset: number, length: number): Promise<Uint8Array> => {
        largest = Math.max(largest, length);
        return Uint8Array.from({ length }, (_, i) => {
          const at = offset + i - head.byteLength;
          return at < 0 ? head[offset + i] : row[at % row.byteLength];
        });
      },
    };
    const file = await openAnimation(source, { name: 'x.bvh' });
    expect(file.clips[0].tracks[0].times).toHaveLength(rows);
    expect(largest).toBeLessThanOrEqual(1 << 18);
  });
});
