import { mkdirSync, readFileSync, writeFileSync } from 'node:fs';
import { expect, test } from 'vitest';
import { generatedTake } from '../support/generated-take.js';
import { commandFolder } from '../support/run-command.js';

test('every command that the README of the command shows runs', async () => {
  const { run, path } = await commandFolder();
  mkdirSync(path('clips'));
  const take = generatedTake({ joints: 2, frames: 60, rate: 30, pop: { joint: 1, frame: 30, degrees: 10 } });
  for (const name of ['walk.glb', 'clips/walk.glb']) writeFileSync(path(name), take);
  const [, block = ''] = /^```\n([\s\S]*?)^```$/m.exec(readFileSync('packages/cli/README.md', 'utf8')) ?? [];
  const lines = block.trim().split('\n');
  expect(lines.length).toBeGreaterThan(6);
  for (const line of lines) {
    const [name, ...words] = line.replace(/#.*/, '').trim().split(/\s+/);
    expect(name).toBe('slewcurve');
    const ran = await run(...words);
    expect(ran.stderr, line).not.toMatch(/usage\.|fault of its own/);
    // A pop is found; once mended there is none, and the mended file is 10° away.
    expect(ran.code, line).toBe(['mend', 'docket', 'explain'].includes(words[0]) ? 0 : 1);
  }
});
