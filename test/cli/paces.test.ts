import { readFileSync, writeFileSync } from 'node:fs';
import { kestrelPoint, kestrelPointRules } from '@slewcurve/job';
import { describe, expect, test } from 'vitest';
import { CAMERA, flight, pointingError } from '../support/camera-flight.js';
import { commandFolder, reportOf } from '../support/run-command.js';

/** A folder with one file, house rules and a card of steps. */
async function withCard(bytes: Uint8Array, rules: object, ...steps: object[]) {
  const at = await commandFolder();
  writeFileSync(at.path('in.glb'), bytes);
  writeFileSync(at.path('rules.json'), JSON.stringify(rules));
  writeFileSync(at.path('card.json'), JSON.stringify({ schemaVersion: 1, steps }));
  return at;
}

const QUAY = { clip: 'quay-flight', track: '*' };
const CUT = {
  ...kestrelPointRules,
  declared: { ...kestrelPointRules.declared, cuts: [{ ...QUAY, time: 14 + 1 / 30 }] },
};

describe('paces by command', () => {
  test('quay-flight, its cut declared, eased through and capped at a picture width in 7 s: nothing left, seconds told', async () => {
    const { run } = await withCard(
      kestrelPoint(),
      CUT,
      { ...QUAY, verb: 'ease through' },
      { ...QUAY, verb: 'cap', rate: 12.05 },
      { ...QUAY, verb: 'ease in/out', shoulders: 0.5, ends: 'run' },
    );
    const { stdout, code } = await run(
      'mend',
      'in.glb',
      '--card',
      'card.json',
      '--rules',
      'rules.json',
      '--dry-run',
    );
    // What is left on other tracks fails.
    expect(code).toBe(1);
    expect(stdout).toMatch(
      /Cap the speed of all keys of \* in quay-flight, to at most 12\.05 deg\/s\. .*; 1\.73 s added; as stored up to 0\.0\d+° off; \d+ bytes more\./,
    );
    expect(stdout).toMatch(/letting time run, with shoulders of 0\.5 s\. .*; 1\.00 s added/);
    // Its roll is left, which no pace can straighten; other clips keep what they have.
    expect(stdout).toContain('in scope-pass');
    expect(stdout).not.toMatch(/in quay-flight.*: .*(error|warning|note) (pace|limit|jump)\./);
  });

  test('a camera whose place and aim are both keyed keeps its target through even out', async () => {
    const bytes = flight();
    const { run, path } = await withCard(bytes, {}, { ...CAMERA, verb: 'even out' });
    await run('mend', 'in.glb', '--card', 'card.json', '-o', 'out.glb');
    const after = await pointingError(new Uint8Array(readFileSync(path('out.glb'))));
    expect(after - (await pointingError(bytes))).toBeLessThanOrEqual(0.05);
  });

  test('cautions stand in text and JSON where a machine or a headset is in play, and nowhere else', async () => {
    const rules = { roles: { boat: 'machine', camera: 'camera-headset' } };
    const { run } = await withCard(flight(), rules, { ...CAMERA, verb: 'cap', rate: 20 });
    const flags = ['--rules', 'rules.json'];
    const machine =
      "caution, 1 track of role machine: Check limits and stops against the maker's data and local rules, by a licensed or responsible operator, at reduced speed first. No figure here calls a motion safe.";
    const headset =
      'caution, 1 track of role camera-headset: Comfort numbers are guidance, not a standard: speeds above them are marked, and none is called safe.';
    for (const command of [
      ['check', 'in.glb'],
      ['survey', 'in.glb'],
      ['mend', 'in.glb', '--card', 'card.json', '--dry-run'],
    ]) {
      const { stdout } = await run(...command, ...flags);
      expect(stdout).toContain(machine);
      expect(stdout).toContain(headset);
      expect((await run(...command)).stdout).not.toContain('caution');
    }
    const { cautions, files } = reportOf(await run('check', 'in.glb', '--format', 'json', ...flags));
    expect(cautions?.map(({ role, tracks }) => [role, tracks])).toEqual([
      ['machine', 1],
      ['camera-headset', 1],
    ]);
    expect(files[0].cautions).toEqual(cautions);
    const worn = await run('check', 'in.glb', '--role', 'camera=camera-headset');
    expect(worn.stdout).toContain(headset);
  });
});
