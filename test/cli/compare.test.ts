import { writeFileSync } from 'node:fs';
import type { Comparison } from '@slewcurve/job';
import { describe, expect, test } from 'vitest';
import { generatedTake } from '../support/generated-take.js';
import { commandFolder } from '../support/run-command.js';

describe('slewcurve compare', () => {
  test('finds what a mend did, in degrees and deg/s, and fails beyond either limit', async () => {
    const { run, path } = await commandFolder();
    const pop = { joint: 1, frame: 30, degrees: 10 };
    writeFileSync(path('a.glb'), generatedTake({ joints: 3, frames: 60, rate: 30, pop }));
    await run('mend', 'a.glb', '--proposed', '-o', 'b.glb');
    const ran = await run('compare', 'a.glb', 'b.glb', '--format', 'json');
    expect(ran.code).toBe(0);
    const { tracks }: Comparison = JSON.parse(ran.stdout);
    expect(tracks.map((track) => track.angle > 0)).toEqual([false, true, false]);
    const [, { angle, angleAt, rate }] = tracks;
    // A key 10° off at 1 s is put between its neighbours: what it sways by in a frame is far less than 0.1°.
    expect(Math.abs(angle - 10)).toBeLessThan(0.1);
    expect(angleAt).toBe(1);
    // 10° in 1/30 s, less or more by what it turns at anyhow: at most some 60 deg/s.
    expect(Math.abs(rate - 300)).toBeLessThan(60);
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
    writeFileSync(path('a.glb'), generatedTake({ joints: 1, frames: 3, rate: 30 }));
    const ran = await run('compare', ...args);
    expect([ran.code, ran.stdout, ran.stderr.includes(code)]).toEqual([2, '', true]);
  });
});
