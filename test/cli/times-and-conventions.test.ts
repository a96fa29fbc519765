import { writeFileSync } from 'node:fs';
import { fromAxisAngle } from '@slewcurve/core';
import { describe, expect, test } from 'vitest';
import { commandFolder, reportOf, type Ran } from '../support/run-command.js';

const DEGREES = 180 / Math.PI;
const FRAMES = 61;

/** A pan at 60 deg/s, 30 keys a second, one key 9° off at 1 s. */
function pan(): string {
  const rows = Array.from({ length: FRAMES }, (_, frame) => {
    const q = fromAxisAngle<number[]>([], [0, 1, 0], (2 * frame + (frame === 30 ? 9 : 0)) / DEGREES);
    return `${frame / 30},${q.join(',')}`;
  });
  return `t_s,qx,qy,qz,qw\n${rows.join('\n')}\n`;
}

async function withPan(): Promise<(...argv: string[]) => Promise<Ran>> {
  const { run, path } = await commandFolder();
  writeFileSync(path('pan.csv'), pan());
  return run;
}

describe('times as people count them', () => {
  test.each([
    [['--time', 'seconds'], 'rotation in table, 1.000 s: key 30'],
    [['--time', 'frames'], 'rotation in table, frame 30: key 30'],
    [['--time', 'timecode'], 'rotation in table, 00:00:01:00: key 30'],
    [['--time', 'timecode', '--fps', '29.97'], 'rotation in table, 00:00:00;29.97: key 30'],
    [['--time', 'frames', '--fps', '24'], 'rotation in table, frame 24: key 30'],
  ])('check %j says where', async (flags, words) => {
    const { stdout } = await (await withPan())('check', 'pan.csv', ...flags);
    expect(stdout).toContain(words);
  });

  test('the roster counts alike; JSON stays in seconds, and names the frame of the grid that is said', async () => {
    const run = await withPan();
    const { stdout } = await run('survey', 'pan.csv', '--time', 'timecode');
    expect(stdout).toMatch(/keys +from +to +turned/);
    expect(stdout).toMatch(/61 +00:00:00:00 +00:00:02:00 /);
    const report = reportOf(
      await run('check', 'pan.csv', '--format', 'json', '--time', 'frames', '--fps', '24'),
    );
    expect(report.files[0].clips[0].frameRate).toBe(24);
    expect(report.files[0].findings[0]).toMatchObject({ time: 1, frame: 24 });
  });

  test('refuses a form, a rate and a count that are none', async () => {
    const run = await withPan();
    expect((await run('check', 'pan.csv', '--time', 'frame')).stderr).toContain('Did you mean frames?');
    expect((await run('check', 'pan.csv', '--fps', '0')).code).toBe(2);
    expect((await run('survey', 'pan.csv', '--matrix', '--ticks', '30,fast')).stderr).toContain('--ticks');
    expect((await run('survey', 'pan.csv', '--ticks', '30')).stderr).toContain('--ticks needs --matrix');
  });
});

describe('survey --matrix', () => {
  test('tells worst speed and departure by playback and tick rate, and where they are', async () => {
    const run = await withPan();
    const { stdout } = await run('survey', 'pan.csv', '--matrix', '--ticks', '15,30', '--time', 'frames');
    expect(stdout).toMatch(/^ +every moment +15 a second +30 a second$/m);
    // The lone key is at frame 30, which every second frame meets: 9° in 1/30 s on top of the pan's 60 deg/s, in 1/15 s half of that.
    expect(stdout).toMatch(/^as-written +330, 0° +195, [0-9.e-]+° +330, /m);
    expect(stdout).toMatch(/^fastest: .* deg\/s, rotation in table, frame \d+/m);
    expect(stdout).toMatch(/^farthest: /m);
  });

  test('in JSON has a cell for each, and packing shows in the departure', async () => {
    const run = await withPan();
    const matrixOf = async (...flags: string[]) =>
      reportOf(await run('survey', 'pan.csv', '--format', 'json', '--matrix', '--ticks', '60', ...flags))
        .files[0].matrix![0];
    const { clip, track, cells } = await matrixOf();
    expect([clip, track]).toEqual(['table', 'rotation']);
    const cell = (playback: string, ticks?: number) =>
      cells.find((one) => one.playback === playback && one.ticks === ticks);
    expect(cell('as-written')).toMatchObject({ worstRate: 330, departure: 0 });
    expect(cell('as-written', 60)!.worstRate).toBeCloseTo(330, 2);
    expect(cell('step')!.departure).toBeCloseTo(11, 4);
    expect(cell('euler-linear')).toBeUndefined();
    const packed = (await matrixOf('--storage', 'smallest-three-8')).cells[0];
    expect(packed.departure).toBeGreaterThan(0.1);
    expect(packed.departure).toBeLessThanOrEqual(1.1008);
    const nearest = (await matrixOf('--reading', 'nearest')).cells.find(({ ticks }) => ticks === 60)!;
    // Each key stands for two ticks: twice the speed, then none.
    expect(nearest.worstRate).toBeCloseTo(660, 2);
  });
});

describe('conventions', () => {
  test('are shown by survey and told in JSON with who says so', async () => {
    const run = await withPan();
    const { stdout } = await run('survey', 'pan.csv', '--up', '+z');
    expect(stdout).toContain(
      'read by: components as the columns are named (as the file says); up axis +z (as you say); handedness right, space parent (assumed)',
    );
    const [file] = reportOf(await run('check', 'pan.csv', '--format', 'json', '--space', 'world')).files;
    expect(file.conventions).toContainEqual({ what: 'space', is: 'world', toldBy: 'you' });
    expect(file.conventions).toContainEqual({ what: 'up axis', is: 'not told', toldBy: 'nobody' });
    expect((await run('check', 'pan.csv', '--up', 'z')).stderr).toContain('--up takes +y, +z');
  });
});
