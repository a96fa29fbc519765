import { readFileSync } from 'node:fs';
import { Ajv2020 } from 'ajv/dist/2020.js';
import {
  baselineJson,
  baselineOf,
  buildReport,
  parseBaseline,
  stampsFor,
  textReport,
  withBaseline,
  withStamps,
  type Report,
} from '@slewcurve/job';
import { describe, expect, test } from 'vitest';
import { PLAIN_SETTINGS, demoReport, fileReportWith, findingWith } from '../support/demo-report.js';

const [A, B] = ['a', 'b'].map((letter) => letter.repeat(16));

/** A report over one file whose finding has these places, against a baseline of a file with those. */
function against(then: readonly string[], now: readonly string[], exact = false): Report {
  const baseline = baselineOf([fileReportWith(then.length > 0 ? [findingWith(then)] : [])]);
  const files = [fileReportWith(now.length > 0 ? [findingWith(now)] : [], './walk.glb')];
  const { files: marked, gone } = withBaseline(files, baseline, true);
  return buildReport(marked, PLAIN_SETTINGS, { baseline: { gone, exact } });
}

describe('a baseline', () => {
  test('mutes what was there, whichever way the file is named', () => {
    const { verdict, totals } = against([A, B], [A, B]);
    expect([verdict, totals]).toEqual(['pass', { error: 0, warning: 0, note: 0, stamped: 0, known: 1 }]);
  });

  test('lets through what is new, and shows that place as the finding’s own', () => {
    const report = against([A], [A, B]);
    expect(report.verdict).toBe('fail');
    expect(report.files[0].findings[0]).toMatchObject({ time: 1.5, value: 8, message: 'key 2 stands off' });
    expect(textReport(report)).toContain(
      '1 warning, 0 notes in 1 file, 0 stamped; 0 known from the baseline',
    );
  });

  test('tells what is gone, and fails for it only when it is to be exact', () => {
    expect(against([A, B], [A]).gone).toEqual([
      { file: 'walk.glb', fingerprint: B, rule: 'jump.lone-key', clip: 'walk', track: 'hip' },
    ]);
    expect(against([A, B], [A]).verdict).toBe('pass');
    expect(against([A, B], [A], true).verdict).toBe('fail');
    expect(against([A], [], true).verdict).toBe('fail');
    expect(against([A], [A], true).verdict).toBe('pass');
  });

  test('calls a file that is missing gone only where it should have been looked at', () => {
    const baseline = baselineOf([fileReportWith([findingWith([A])])]);
    expect(withBaseline([], baseline, true).gone).toHaveLength(1);
    expect(withBaseline([], baseline, false).gone).toHaveLength(0);
  });

  test('leaves out what is stamped already', () => {
    const report = fileReportWith([findingWith([A, B])]);
    const stamp = stampsFor(report, A, { reason: 'meant', by: 'Ada', date: '2026-05-17' });
    expect(
      baselineOf([withStamps(report, stamp)]).files[0].places.map(({ fingerprint }) => fingerprint),
    ).toEqual([B]);
  });

  test('of the demo scene holds to its published schema, and mutes all of it', async () => {
    const files = [await demoReport()];
    const json: unknown = JSON.parse(baselineJson(baselineOf(files)));
    const valid = new Ajv2020({ strict: false }).compile(
      JSON.parse(readFileSync('packages/job/schema/baseline.json', 'utf8')),
    );
    expect(valid(json)).toBe(true);
    const { files: marked, gone } = withBaseline(files, parseBaseline(json, 'baseline.json'), true);
    const report = buildReport(
      marked,
      { ...PLAIN_SETTINGS, failAt: 'note' },
      { baseline: { gone, exact: true } },
    );
    expect([report.verdict, report.totals.known]).toEqual(['pass', files[0].findings.length]);
  });

  test('that is none is refused with its name', () => {
    expect(() => parseBaseline({ schemaVersion: 1, files: [{ file: 'x' }] }, 'old.json')).toThrow(
      expect.objectContaining({
        code: 'baseline.bad-shape',
        message: 'old.json: /files/0/places must be a list; it is left out.',
      }),
    );
  });
});
