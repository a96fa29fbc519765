import { createHash } from 'node:crypto';
import { readFileSync, readdirSync, writeFileSync } from 'node:fs';
import { describe, expect, test } from 'vitest';
import { generatedTake } from '../support/generated-take.js';
import { commandFolder } from '../support/run-command.js';

const POPS = generatedTake({ joints: 2, frames: 60, rate: 30, pop: { joint: 1, frame: 30, degrees: 10 } });

function sha256(bytes: Uint8Array): string {
  return createHash('sha256').update(bytes).digest('hex');
}

describe('slewcurve docket', () => {
  test('prints a file’s record with its hash, and of a card what it would make, and mends nothing', async () => {
    const { run, path, folder } = await commandFolder();
    writeFileSync(path('walk.glb'), POPS);
    const plain = await run('docket', 'walk.glb');
    expect([plain.code, plain.stderr]).toEqual([0, '']);
    expect(plain.stdout).toContain(`${POPS.length.toLocaleString('en-GB')} bytes, SHA-256 ${sha256(POPS)}`);
    expect(plain.stdout).toMatch(/jump\.lone-key, as written \| open \|$/m);
    expect(plain.stdout).toContain('    npx slewcurve check walk.glb\n');
    await run('mend', 'walk.glb', '--proposed', '-o', 'mended.glb', '--card-out', 'card.json');
    const before = readdirSync(folder);
    const carded = await run('docket', 'walk.glb', '--card', 'card.json');
    expect(carded.stdout).toContain(`SHA-256 ${sha256(readFileSync(path('mended.glb')))}`);
    expect(carded.stdout).toMatch(/jump\.lone-key, as written \| mended by step 1 \|$/m);
    expect(carded.stdout).toContain('    npx slewcurve mend walk.glb --card card.json -o OUT\n');
    expect(readdirSync(folder)).toEqual(before);
  });

  test('writes a page that can be printed, with a drawing of each finding', async () => {
    const { run, path } = await commandFolder();
    writeFileSync(path('walk.glb'), POPS);
    expect((await run('docket', 'walk.glb', '--format', 'html', '-o', 'docket.html')).stdout).toBe('');
    const html = readFileSync(path('docket.html'), 'utf8');
    expect(html.match(/<svg /g)).toHaveLength(1);
    expect(html).toContain('Angular speed from 0.500 s to 1.500 s');
  });

  test('tells where playbacks disagree when there are two', async () => {
    const { run, path } = await commandFolder();
    writeFileSync(path('walk.glb'), POPS);
    expect((await run('docket', 'walk.glb')).stdout).not.toContain('playbacks disagree');
    const { stdout } = await run('docket', 'walk.glb', '--playback', 'short-way,finite-cubic');
    const row =
      /## Where playbacks disagree\n\n\|.*\n\|.*\n\| joint-0\/joint-1 in Take \| finite cubic \| ([\d.]+)° \| (\d\.\d{3}) s/.exec(
        stdout,
      );
    // Hermite from 0° with a slope of 10°/2h to 10° with slope 0, less the straight line: 20u² − 15u³ − 5u, at most 1.17° at u = 0.738.
    // The sway beneath adds a few hundredths.
    expect(Math.abs(Number(row?.[1]) - 1.17)).toBeLessThan(0.1);
    expect(Math.abs(Number(row?.[2]) - 1)).toBeLessThan(1 / 30);
    expect((await run('docket', 'walk.glb', '--playback', 'as-written,short-way')).stdout).toContain(
      'Nowhere: they play every track alike.',
    );
  });

  test.each([
    [['docket'], 'usage.one-file'],
    [['docket', 'none.glb'], 'file.not-found'],
    [['docket', 'walk.glb', '--format', 'pdf'], 'usage.bad-value'],
  ])('%j could not be done: %s', async (args, code) => {
    const { run, path } = await commandFolder();
    writeFileSync(path('walk.glb'), POPS);
    const ran = await run(...args);
    expect([ran.code, ran.stdout, ran.stderr.includes(code)]).toEqual([2, '', true]);
  });
});
