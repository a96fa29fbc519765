import { axisChange, multiply, playAs, rotateVector, type RotationTrack } from '@slewcurve/core';
import { bufferSource } from '@slewcurve/formats';
import { kestrelPoint, mendFile, openFile, type MendedFile } from '@slewcurve/job';
import type { Step } from '@slewcurve/mend';
import { NO_HOUSE_RULES } from '@slewcurve/survey';
import { describe, expect, test } from 'vitest';

const SETTINGS = {
  playbacks: ['as-written'],
  failAt: 'error',
  allowWarnings: 0,
  houseRules: NO_HOUSE_RULES,
} as const;
const ALL = { clip: '*', track: '*' } as const;

function bvh(frameTime: string): string {
  const rows = Array.from(
    { length: 20 },
    (_, i) => `${i}.5 -2.25 0.0 ${3 * i}.10 -${i}.25 12.5 ${2 * i}.0 7.75 -${i}.5`,
  );
  return `HIERARCHY
ROOT Hips
{
  OFFSET 1.50 -2.0 0.0
  CHANNELS 6 Xposition Yposition Zposition Zrotation Xrotation Yrotation
  JOINT Arm
  {
    OFFSET 0.0 10.25 -3.0
    CHANNELS 3 Yrotation Xrotation Zrotation
    End Site
    {
      OFFSET 4 5 6
    }
  }
}
MOTION
Frames: 20
Frame Time: ${frameTime}
${rows.join('\n')}
`;
}

async function mended(name: string, bytes: Uint8Array, steps: readonly Step[]): Promise<MendedFile> {
  const opened = await openFile(bufferSource(bytes), { name });
  const before = { file: name, status: 'surveyed', clips: [], tracks: [], findings: [] } as const;
  return mendFile(opened, { schemaVersion: 1, steps }, before, SETTINGS, { name });
}

const bytesOf = (text: string): Uint8Array => new TextEncoder().encode(text);

async function textOf({ result }: MendedFile): Promise<string> {
  return new TextDecoder().decode(await result.read(0, result.size));
}

/** Where the arm's end is over its hips, and which way it looks, in the hips' parent's axes, frame by frame. */
function chain(
  tracks: readonly RotationTrack[],
  offsets: readonly (readonly number[])[],
  vector: readonly number[],
): number[] {
  const [hips, arm] = tracks.map((track) => playAs(track, 'as-written'));
  return Array.from(tracks[0].times).flatMap((t) => {
    const q = hips.orientation<number[]>([], t);
    const both = multiply<number[]>([], q, arm.orientation<number[]>([], t));
    const place = rotateVector<number[]>([], q, offsets[1]);
    const look = rotateVector<number[]>([], both, vector);
    return [0, 1, 2].map((i) => place[i] + look[i]);
  });
}

function addressOf({ clip, id }: RotationTrack): Pick<Step, 'clip' | 'track'> {
  return { clip, track: id };
}

describe('restate on a BVH file', () => {
  test.each(['x z -y', '-x y z', 'y z x', 'z -y x'])(
    'in axes %s: skeleton, positions and motion go over as one',
    async (axes) => {
      const result = await mended('a.bvh', bytesOf(bvh('0.0333333')), [{ verb: 'restate', ...ALL, axes }]);
      const m = axisChange(axes);
      const over = ([x, y, z]: readonly number[]): number[] =>
        [0, 1, 2].map((i) => m[i] * x + m[3 + i] * y + m[6 + i] * z);
      const again = (await openFile(bufferSource(bytesOf(await textOf(result))), { name: 'a.bvh' })).file;
      const { file } = result.opened;
      file.nodes.forEach(({ translation }, i) =>
        expect(again.nodes[i].translation.map((n) => n + 0)).toEqual(over(translation).map((n) => n + 0)),
      );
      const vector = [0.3, -0.5, 0.8];
      const was = chain(
        file.clips[0].tracks,
        file.nodes.map(({ translation }) => translation),
        vector,
      );
      const is = chain(
        again.clips[0].tracks,
        again.nodes.map(({ translation }) => translation),
        over(vector),
      );
      for (let at = 0; at < was.length; at += 3)
        over(was.slice(at, at + 3)).forEach((part, i) => expect(is[at + i]).toBeCloseTo(part, 9));
      // The way back gives the very bytes: digits are moved, never written anew.
      const back = { 'x z -y': 'x -z y', '-x y z': '-x y z', 'y z x': 'z x y', 'z -y x': 'z -y x' }[axes]!;
      const home = await mended('a.bvh', bytesOf(await textOf(result)), [
        { verb: 'restate', ...ALL, axes: back },
      ]);
      expect(await textOf(home)).toBe(bvh('0.0333333'));
    },
  );

  test('names the new axes of its channels and moves the signs of its positions', async () => {
    const text = await textOf(
      await mended('a.bvh', bytesOf(bvh('0.0333333')), [{ verb: 'restate', ...ALL, axes: 'x z -y' }]),
    );
    expect(text).toContain('OFFSET 1.50 0.0 2.0');
    expect(text).toContain('CHANNELS 6 Xposition Zposition Yposition Yrotation Xrotation Zrotation');
    expect(text.split('\n').at(-2)).toBe('19.5 2.25 0.0 57.10 -19.25 -12.5 -38.0 7.75 -19.5');
  });
});

describe('files whose other parts would stay in the old axes', () => {
  test('are refused: glTF, and a table with positions', async () => {
    await expect(
      mended('k.glb', kestrelPoint(), [{ verb: 'restate', ...ALL, axes: 'x z -y' }]),
    ).rejects.toThrow('one set of axes');
    const table = 't,tx,ty,tz,qx,qy,qz,qw\n0,1,2,3,0,0,0,1\n1,1,2,3,0,0,1,0\n';
    await expect(
      mended('t.csv', bytesOf(table), [{ verb: 'restate', ...ALL, axes: 'x z -y' }]),
    ).rejects.toThrow('positions in tx');
    const bare = 't,qx,qy,qz,qw\n0,0.5,0.5,0.5,0.5\n1,0,0,1,0\n';
    expect(
      await textOf(await mended('t.csv', bytesOf(bare), [{ verb: 'restate', ...ALL, axes: 'x z -y' }])),
    ).toBe('t,qx,qy,qz,qw\n0,0.5,0.5,-0.5,0.5\n1,0,1.0,0.0,0\n');
  });
});

describe('re-time to grid on a BVH file', () => {
  test('of all joints is another Frame Time and no other byte', async () => {
    const result = await mended('a.bvh', bytesOf(bvh('0.033')), [
      { verb: 're-time to grid', ...ALL, fps: 30 },
    ]);
    expect(await textOf(result)).toBe(bvh(String(1 / 30)));
    const [{ frameRate }] = result.report.clips;
    expect(frameRate).toBe(30);
  });

  test('of one joint is refused: all share the rows', async () => {
    const steps = [{ verb: 're-time to grid', clip: '*', track: 'Hips', fps: 30 }];
    await expect(mended('a.bvh', bytesOf(bvh('0.033')), steps)).rejects.toThrow('re-time all joints');
  });
});

describe('glTF', () => {
  test('takes other times, other counts and another interpolation, read back as they were made', async () => {
    const name = 'k.glb';
    const { file } = await openFile(bufferSource(kestrelPoint()), { name });
    const [first, second] = file.clips.flatMap(({ tracks }) => tracks);
    const { result } = await mended(name, kestrelPoint(), [
      { verb: 'convert', ...addressOf(first), interpolation: 'CUBICSPLINE' },
      { verb: 'set tangents', ...addressOf(first) },
      { verb: 're-grid', ...addressOf(second), fps: 24 },
    ]);
    const again = (await openFile(result, { name })).file.clips.flatMap(({ tracks }) => tracks);
    expect(again[0].interpolation).toBe('CUBICSPLINE');
    expect(again[0].times.length).toBeGreaterThanOrEqual(first.times.length);
    expect(again[1].times[1] - again[1].times[0]).toBeCloseTo(1 / 24, 6);
    expect(again[1].times.at(-1)).toBe(second.times.at(-1));
  });
});
