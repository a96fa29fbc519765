import { readFileSync } from 'node:fs';
import { Ajv2020 } from 'ajv/dist/2020.js';
import { rotationTrack, type RotationTrack } from '@slewcurve/core';
import {
  addStamps,
  buildReport,
  parseStamps,
  propose,
  stampsFor,
  stampsJson,
  textReport,
  withStamps,
  withoutStamps,
  type FileReport,
  type Stamp,
} from '@slewcurve/job';
import { surveyTrack } from '@slewcurve/survey';
import { describe, expect, test } from 'vitest';
import { PLAIN_SETTINGS, demoReport, fileReportWith, findingWith } from '../support/demo-report.js';

const WORDS = { reason: 'the hit is meant', by: 'Ada', date: '2026-05-17' };
const [A, B, C] = ['a', 'b', 'c'].map((letter) => letter.repeat(16));
const [D] = ['d'.repeat(16)];

describe('a stamp', () => {
  test('mutes a finding once all its places are stamped, and not before', () => {
    const report = fileReportWith([findingWith([A, B])]);
    const one = withStamps(report, stampsFor(report, A, WORDS));
    expect(buildReport([one], PLAIN_SETTINGS).verdict).toBe('fail');
    const both = withStamps(report, addStamps(stampsFor(report, A, WORDS), stampsFor(report, B, WORDS)));
    const { verdict, totals } = buildReport([both], PLAIN_SETTINGS);
    expect([verdict, totals]).toEqual(['pass', { error: 0, warning: 0, note: 0, stamped: 1 }]);
    expect(both.findings[0].muted).toBe('stamped');
    expect(both.findings[0].occurrences[0].stamp).toEqual(WORDS);
  });

  test('leaves a finding with the numbers of its worst open place, that place’s limit included', () => {
    const finding = findingWith([A, B], { level: 'error' });
    const [first, second] = finding.occurrences;
    const report = fileReportWith([
      {
        ...finding,
        occurrences: [
          { ...first, level: 'error' },
          { ...second, level: 'note', limit: 3 },
        ],
      },
    ]);
    const [left] = withStamps(report, stampsFor(report, A, WORDS)).findings;
    expect([left.level, left.time, left.value, left.limit, left.keys]).toEqual(['note', 1.5, 8, 3, [2]]);
    expect(left.occurrences.map(({ limit }) => limit)).toEqual([1, 3]);
    expect(left).not.toHaveProperty('stamp');
  });

  test('of a whole finding covers places beyond the listed ones, and fails when there are more of them', () => {
    const of = (count: number): FileReport => fileReportWith([findingWith([A, B], { count })]);
    const stamps = stampsFor(of(5), 'jump.lone-key', WORDS);
    expect(stamps.map(({ fingerprint, places }) => [fingerprint, places])).toEqual([
      [A, undefined],
      [B, undefined],
      ['f'.repeat(16), 5],
    ]);
    expect([4, 5, 6].map((count) => withStamps(of(count), stamps).findings[0].muted)).toEqual([
      'stamped',
      'stamped',
      undefined,
    ]);
  });

  test('that fits nothing any more is told', () => {
    const report = fileReportWith([findingWith([A])]);
    const stamps = stampsFor(fileReportWith([findingWith([A, C])]), 'jump.lone-key', WORDS);
    expect(withStamps(report, stamps).problems).toEqual([
      {
        code: 'stamps.unused',
        level: 'note',
        message: expect.stringContaining(`The stamp ${C} for jump.lone-key`),
      },
    ]);
  });

  test('keeps what it accepts out of what is proposed', async () => {
    const report = await demoReport();
    const before = propose(report, PLAIN_SETTINGS).card.steps;
    const accepted = report.findings.find(({ rule }) => rule === 'jump.shelf')!;
    const after = propose(withStamps(report, stampsFor(report, accepted.fingerprint, WORDS)), PLAIN_SETTINGS)
      .card.steps;
    const there = (steps: typeof before): number =>
      steps.filter(({ verb, clip }) => verb === accepted.remedy?.verb && clip === accepted.clip).length;
    expect([there(before), there(after)]).toEqual([1, 0]);
  });

  test('stays on its place when the file is exported anew two keys later', () => {
    const before = fileReportWith(surveyTrack(swayWithPops(0)));
    const stamps = stampsFor(before, 'jump.lone-key', WORDS);
    expect(stamps).toHaveLength(2);
    const after = withStamps(fileReportWith(surveyTrack(swayWithPops(2))), stamps);
    expect(after.problems).toBeUndefined();
    expect(after.findings.map(({ rule, muted }) => [rule, muted])).toEqual([['jump.lone-key', 'stamped']]);
    // The keys did move.
    expect(after.findings[0].keys).not.toEqual(before.findings[0].keys);
    expect(textReport(buildReport([after], PLAIN_SETTINGS))).toBe(
      'verdict: pass. 0 errors, 0 warnings, 0 notes in 1 file, 1 stamped\n',
    );
  });

  test('refuses a name that nothing goes by', () => {
    expect(() => stampsFor(fileReportWith([findingWith([A])]), D, WORDS)).toThrow(
      expect.objectContaining({ code: 'stamps.no-match' }),
    );
  });
});

describe('a file of stamps', () => {
  const stamps = stampsFor(fileReportWith([findingWith([B, A], { count: 9 })]), 'jump.lone-key', WORDS);
  const json: { schemaVersion: number; stamps: Record<string, unknown>[] } = JSON.parse(stampsJson(stamps));

  test('holds to its published schema, sorted, and reads back', () => {
    const valid = new Ajv2020({ strict: false }).compile(
      JSON.parse(readFileSync('packages/job/schema/stamps.json', 'utf8')),
    );
    expect(valid(json)).toBe(true);
    expect(parseStamps(json, 'walk.glb.stamps.json')).toEqual(
      stamps.toSorted((a: Stamp, b: Stamp) => (a.fingerprint < b.fingerprint ? -1 : 1)),
    );
  });

  test.each([
    [[], 'stamps.bad-shape', 'the top must be an object'],
    [{ schemaVersion: 2, stamps: [] }, 'stamps.bad-version', 'schemaVersion must be 1; it is 2'],
    [{ schemaVersion: 1 }, 'stamps.bad-shape', '/stamps must be a list; it is left out'],
    [{ schemaVersion: 1, stamps: [], more: 1 }, 'stamps.unknown-key', 'There are: schemaVersion, stamps'],
    [
      { ...json, stamps: [{ ...json.stamps[0], reason: ' ' }] },
      'stamps.bad-shape',
      '/stamps/0/reason must be text',
    ],
    [{ ...json, stamps: [{ ...json.stamps[0], date: 'May' }] }, 'stamps.bad-shape', 'it is May'],
    [{ ...json, stamps: [{ ...json.stamps[0], places: 0 }] }, 'stamps.bad-shape', '/stamps/0/places must be'],
    [
      { ...json, stamps: [{ ...json.stamps[0], why: 'x' }] },
      'stamps.unknown-key',
      '/stamps/0 has a key "why"',
    ],
  ])('%j is refused: %s', (bad, code, words) => {
    expect(() => parseStamps(bad, 'walk.glb.stamps.json')).toThrow(
      expect.objectContaining({ code, message: expect.stringContaining(words) }),
    );
    expect(() => parseStamps(bad, 'walk.glb.stamps.json')).toThrow(/^walk\.glb\.stamps\.json: /);
  });
});

describe('what is taken back', () => {
  const report = fileReportWith([findingWith([A, B], { count: 5 })]);
  const whole = stampsFor(report, 'jump.lone-key', WORDS);

  test('of a finding is all that was accepted of it', () => {
    expect(withoutStamps(whole, report.findings, 'f'.repeat(16))).toEqual([]);
  });

  test('of one place opens that place and leaves the other listed one accepted', () => {
    const left = withoutStamps(whole, report.findings, A);
    expect(left.map(({ fingerprint }) => fingerprint)).toEqual([B]);
    const [finding] = withStamps(report, left).findings;
    expect([finding.muted, finding.occurrences.map(({ stamp }) => stamp !== undefined)]).toEqual([
      undefined,
      [false, true],
    ]);
  });

  test('goes by no other name', () => {
    expect(withoutStamps(whole, report.findings, D)).toEqual(whole);
  });
});

/** 3 s of sway at 60 Hz about x with two keys off by 5° and 7°, all of it `shift` keys later behind a hold. */
function swayWithPops(shift: number): RotationTrack {
  const times = Array.from({ length: 180 + shift }, (_, k) => k / 60);
  const values = times.flatMap((_, k) => {
    const own = Math.max(0, k - shift);
    const pop = own === 60 ? 5 : own === 120 ? 7 : 0;
    const half = (10 * Math.sin(own / 20) + pop) * (Math.PI / 360);
    return [Math.sin(half), 0, 0, Math.cos(half)];
  });
  return rotationTrack({ times, values, id: 'hip', clip: 'walk' });
}
