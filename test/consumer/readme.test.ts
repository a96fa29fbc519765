// What the README shows is what a reader gets: its library sample and its commands, run against the built packages.
import { spawnSync } from 'node:child_process';
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join, resolve } from 'node:path';
import { kestrelPoint } from '@slewcurve/job';
import { afterAll, describe, expect, test } from 'vitest';

const readme = readFileSync('README.md', 'utf8');
const folder = mkdtempSync(join(tmpdir(), 'slewcurve-readme-'));
afterAll(() => rmSync(folder, { recursive: true, force: true }));
const bin = resolve('packages/cli/bin/slewcurve.js');

function block(language: string, holding: string): string {
  const blocks = [...readme.matchAll(/^```(\w*)\n([\s\S]*?)^```$/gm)];
  const found = blocks.find(([, name, text]) => name === language && text.includes(holding));
  if (!found) throw new Error(`the README has no ${language} block with ${holding}`);
  return found[2];
}

describe('the README', () => {
  test('its library sample runs and prints what it says', () => {
    const sample = block('js', '@slewcurve/core');
    expect(sample.split('\n').filter((line) => line.trim() !== '').length).toBeLessThanOrEqual(10);
    // Beside the project's packages, so that their names resolve.
    const file = resolve('node_modules/.cache/readme-sample.mjs');
    writeFileSync(
      file,
      sample.replace(
        'console.log(half, negated, rate, measure(curve).peakRate)',
        'console.log(JSON.stringify([half, negated, rate, measure(curve).peakRate]))',
      ),
    );
    const { stdout, stderr } = spawnSync(process.execPath, [file], { encoding: 'utf8' });
    expect(stderr).toBe('');
    const [half, negated, rate, peak] = JSON.parse(stdout);
    // A quarter of half a turn about y: 45°.
    expect(half).toEqual([
      0,
      expect.closeTo(Math.sin(Math.PI / 8), 15),
      0,
      expect.closeTo(Math.cos(Math.PI / 8), 15),
    ]);
    expect(negated).toEqual([2]);
    // 45° in the second before 1.5 s: π/4 rad/s about y, and π rad/s (90° in 0.5 s) before. Four decimals are written, so 1e-4.
    expect(rate).toEqual([0, expect.closeTo(Math.PI / 4, 3), 0]);
    expect(peak).toBeCloseTo(Math.PI, 3);
  });

  test.each(['check', 'mend', 'explain'])('its %s command runs', (name) => {
    writeFileSync(join(folder, 'walk.glb'), kestrelPoint());
    const line =
      block('', 'npx slewcurve')
        .split('\n')
        .find((one) => one.startsWith(`npx slewcurve ${name}`)) ?? '';
    const words = line.replace(/#.*/, '').trim().split(/\s+/).slice(2);
    const { status, stdout, stderr } = spawnSync(process.execPath, [bin, ...words], {
      cwd: folder,
      encoding: 'utf8',
    });
    expect(status, stderr).toBe(name === 'explain' ? 0 : 1);
    expect(stdout).not.toBe('');
  });
});
