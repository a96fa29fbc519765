import { readFile, writeFile } from 'node:fs/promises';
import { describe, expect, test } from 'vitest';
import { commandFolder, reportOf } from '../support/run-command.js';

const KEYS = 60;
const BAD = 30;

/** A vane that sweeps past a whole turn at 30 frames a second, with one key 9 degrees off. */
const angle = (key: number): number => 330 + 2 * key + 12 * Math.sin(key / 9) + (key === BAD ? 9 : 0);
const keys = Array.from({ length: KEYS }, (_, key) => key);
const BVH = `HIERARCHY\r\nROOT Vane\r\n{\r\n\tOFFSET 0 0 0\r\n\tCHANNELS 4 Yposition Zrotation Xrotation Yrotation\r\n}\r\nMOTION\r\nFrames: ${KEYS}\r\nFrame Time: 0.0333333\r\n${keys.map((key) => `1.0 ${angle(key).toFixed(4)} 0.0 5.5000\r\n`).join('')}`;
const CSV = `time_s,rx_deg,ry_deg,rz_deg\n${keys.map((key) => `${(key / 30).toFixed(6)},0.0000,${angle(key).toFixed(4)},0.0000\n`).join('')}`;

async function folderWith(name: string, text: string) {
  const made = await commandFolder();
  await writeFile(made.path(name), text);
  return made;
}

describe('the command on BVH', () => {
  test('finds a lone key, mends it, and takes it back', async () => {
    const { run, path } = await folderWith('vane.bvh', BVH);
    const checked = await run('check', 'vane.bvh', '--format', 'json');
    expect(checked.code).toBe(1);
    const [file] = reportOf(checked).files;
    expect(file.tracks).toMatchObject([
      { clip: 'MOTION', track: 'Vane', interpolation: 'EULER', keys: KEYS },
    ]);
    expect(file.findings).toMatchObject([
      { rule: 'jump.lone-key', keys: [BAD], remedy: { verb: 'lift out', keys: [BAD] } },
    ]);
    const mended = await run('mend', 'vane.bvh', '--proposed', '-o', 'out.bvh', '--undo-out', 'undo.json');
    expect(mended).toMatchObject({ code: 0 });
    const before = BVH.split('\r\n');
    const after = (await readFile(path('out.bvh'), 'latin1')).split('\r\n');
    const changed = before.flatMap((line, i) => (line === after[i] ? [] : [i]));
    expect(changed).toEqual([9 + BAD]);
    expect(after[9 + BAD]).toMatch(/^1\.0 \d{3}\.\d{4} -?0\.0(?:000)? 5\.5000$/);
    // The key comes back to where its neighbours have it: a cubic through six of them.
    expect(Number(after[9 + BAD].split(' ')[1])).toBeCloseTo(angle(BAD) - 9, 1);
    expect((await run('mend', 'out.bvh', '--undo', 'undo.json', '-o', 'back.bvh')).code).toBe(0);
    expect(await readFile(path('back.bvh'), 'latin1')).toBe(BVH);
  });

  test('passes what is clean, and tells a frame count that lies beside it', async () => {
    const { run } = await folderWith(
      'vane.bvh',
      BVH.replace(angle(BAD).toFixed(4), (angle(BAD) - 9).toFixed(4)).replace(
        `Frames: ${KEYS}`,
        'Frames: 900',
      ),
    );
    const { code, stdout } = await run('check', 'vane.bvh');
    expect(code).toBe(0);
    expect(stdout).toContain(`Frames says "900" and ${KEYS} rows follow`);
  });
});

describe('the command on delimited text', () => {
  test('can not read angles without a sequence, and says what is missing', async () => {
    const { run } = await folderWith('vane.csv', CSV);
    const { code, stdout } = await run('check', 'vane.csv');
    expect(code).toBe(2);
    expect(stdout).toContain('leave out the sequence of the angles');
    expect(stdout).toContain('--euler YXZ');
  });

  test('reads, checks and mends them with --euler', async () => {
    const { run, path } = await folderWith('vane.csv', CSV);
    const checked = await run('check', 'vane.csv', '--euler', 'YXZ', '--format', 'json');
    expect(checked.code).toBe(1);
    expect(reportOf(checked).files[0].findings).toMatchObject([
      { rule: 'jump.lone-key', track: 'rotation', keys: [BAD] },
    ]);
    expect((await run('mend', 'vane.csv', '--euler', 'YXZ', '--proposed', '-o', 'out.csv')).code).toBe(0);
    const after = (await readFile(path('out.csv'), 'latin1')).split('\n');
    expect(CSV.split('\n').flatMap((line, i) => (line === after[i] ? [] : [i]))).toEqual([1 + BAD]);
  });

  test('reads a file without a header with --columns, and refuses it without (exit 2)', async () => {
    const bare = keys
      .map((key) => `${key / 30} 0 0 0 ${Math.sin(key / 60)} 0 0 ${Math.cos(key / 60)}\n`)
      .join('');
    const { run } = await folderWith('path.txt', bare);
    const refused = await run('check', 'path.txt');
    expect(refused.code).toBe(2);
    expect(refused.stdout).toContain('--columns timestamp,tx,ty,tz,qx,qy,qz,qw');
    const named = await run(
      'check',
      'path.txt',
      '--columns',
      'timestamp,tx,ty,tz,qx,qy,qz,qw',
      '--format',
      'json',
    );
    expect(named.code).toBe(0);
    // A radian a second about x, in steps of a thirtieth: whole digits of the text.
    expect(reportOf(named).files[0].tracks[0].peakRate).toBeCloseTo(180 / Math.PI, 3);
  });

  test('leaves out a remedy that the file can not hold, and says why', async () => {
    const half = 't,qx,qy,qz,qw\n0,0,0,0,1\n0.5,0,0,1,0\n1.0,0,0,0.9,0.5\n';
    const { run, path } = await folderWith('half.csv', half);
    const { code, stderr } = await run(
      'mend',
      'half.csv',
      '--proposed',
      '--allow',
      'choose side',
      '--fail-at',
      'error',
      '-o',
      'out.csv',
    );
    expect(code).toBe(1);
    expect(stderr).toContain("left out: choose side on rotation in table: the file's columns share rows");
    expect(await readFile(path('out.csv'), 'latin1')).toBe(half);
  });

  test('names a flag whose value means nothing', async () => {
    const { run } = await folderWith('vane.csv', CSV);
    expect(await run('check', 'vane.csv', '--euler', 'YXY2')).toMatchObject({ code: 2 });
    expect((await run('check', 'vane.csv', '--euler', 'XYY')).stderr).toContain('usage.bad-value');
    expect((await run('check', 'vane.csv', '--unit', 'grad')).stderr).toContain('--unit takes deg, rad');
  });
});
