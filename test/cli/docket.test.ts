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
