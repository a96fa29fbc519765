import { writeFileSync } from 'node:fs';
import { kestrelPoint, type Comparison } from '@slewcurve/job';
import { describe, expect, test } from 'vitest';
import { commandFolder } from '../support/run-command.js';

describe('slewcurve compare', () => {
  test('finds what a mend did, in degrees and deg/s, and fails beyond either limit', async () => {
    const { run, path } = await commandFolder();
    writeFileSync(path('a.glb'), kestrelPoint());
    await run('mend', 'a.glb', '--proposed', '-o', 'b.glb');
    const ran = await run('compare', 'a.glb', 'b.glb', '--format', 'json');
    expect(ran.code).toBe(0);
    const { tracks }: Comparison = JSON.parse(ran.stdout);
    const crane = tracks.find(({ clip }) => clip === 'crane-head')!;
    const others = tracks.filter(({ angle }) => angle > 0).map(({ clip }) => clip);
    expect(others).toContain('crane-head');
    expect(others.length).toBeLessThan(tracks.length);
    const [angle, rate] = [
      Math.max(...tracks.map((track) => track.angle)),
      Math.max(...tracks.map((track) => track.rate)),
    ];
    // The lone key of the demo manifest is 6° off its neighbours.
    expect(crane.angle).toBeCloseTo(5.84, 1);
    const code = async (...flags: string[]): Promise<number> =>
      (await run('compare', 'a.glb', 'b.glb', ...flags)).code;
    expect(await code('--angle', String(angle), '--rate', String(rate))).toBe(0);
    expect(await code('--angle', String(angle * 0.99))).toBe(1);
    expect(await code('--rate', String(rate * 0.99))).toBe(1);
    const text = (await run('compare', 'a.glb', 'b.glb', '--angle', '1')).stdout.trimEnd().split('\n');
    expect(text[0]).toMatch(
      / in .+: at most [\d.]+° apart, at \d+\.\d{3} s; speed off by at most [\d.]+ deg\/s, over /,
    );
    expect(text.at(-1)).toBe('verdict: fail. limit 1°');
  });

  test.each([
    [['a.glb'], 'usage.two-files'],
    [['a.glb', 'none.glb'], 'file.not-found'],
    [['a.glb', 'a.glb', '--angle', '-1'], 'usage.bad-value'],
    [['a.glb', 'a.glb', '--playback', 'chord,step'], 'usage.bad-value'],
  ])('%j could not be done: %s', async (args, code) => {
    const { run, path } = await commandFolder();
    writeFileSync(path('a.glb'), kestrelPoint());
    const ran = await run('compare', ...args);
    expect([ran.code, ran.stdout, ran.stderr.includes(code)]).toEqual([2, '', true]);
  });
});
