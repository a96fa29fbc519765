import * as fc from 'fast-check';
import { buildReport, jsonReport, mergeReports, type FileReport, type NamedReport } from '@slewcurve/job';
import { describe, expect, test } from 'vitest';
import { PLAIN_SETTINGS, demoReport, fileReportWith } from '../support/demo-report.js';

const named = (files: number): FileReport[] =>
  Array.from({ length: files }, (_, i) => fileReportWith([], `${String(i).padStart(3, '0')}.glb`));

/** One report for each part of a dealt list, as text and back. */
function parts(files: readonly FileReport[], of: number): NamedReport[] {
  return Array.from({ length: of }, (_, i) => {
    const own = files.filter((_file, at) => at % of === i);
    const report = buildReport(own, PLAIN_SETTINGS, { shard: { number: i + 1, of } });
    return { name: `part-${i + 1}.json`, json: JSON.parse(jsonReport(report)) };
  });
}

function reportOn(file: string): NamedReport {
  return { name: file, json: buildReport([fileReportWith([], file)], PLAIN_SETTINGS) };
}

describe('merged reports', () => {
  test('of parts are to the byte what one run prints, however many parts and in whatever order', async () => {
    const files = [...named(5), await demoReport('z.glb')];
    const whole = jsonReport(buildReport(files, PLAIN_SETTINGS));
    fc.assert(
      fc.property(
        fc.integer({ min: 1, max: 9 }),
        fc.infiniteStream(fc.double({ noNaN: true })),
        (of, order) => {
          const shuffled = parts(files, of)
            .map((part) => ({ part, at: order.next().value }))
            .toSorted((a, b) => a.at - b.at)
            .map(({ part }) => part);
          const merged = jsonReport(buildReport(mergeReports(shuffled).files, PLAIN_SETTINGS));
          expect(merged).toBe(whole);
        },
      ),
      { seed: 7, numRuns: 20 },
    );
  });

  test('without parts follow each other', () => {
    expect(mergeReports([reportOn('b'), reportOn('a')]).files.map(({ file }) => file)).toEqual(['b', 'a']);
    expect(() => mergeReports([reportOn('a'), reportOn('a')])).toThrow(
      expect.objectContaining({ code: 'merge.same-file' }),
    );
  });

  test('never pass for a part whose machine was lost', () => {
    expect(() => mergeReports(parts(named(5), 3).slice(0, 2))).toThrow(
      expect.objectContaining({
        code: 'merge.missing-shard',
        message: expect.stringContaining('no report of part 3 of 3'),
      }),
    );
  });

  test.each([
    ['merge.same-shard', () => [...parts(named(5), 2), parts(named(5), 2)[0]]],
    ['merge.other-settings', () => [...parts(named(5), 2), parts(named(5), 3)[2]]],
    [
      'merge.other-settings',
      () => [
        parts(named(2), 1)[0],
        { name: 'x', json: buildReport([], { ...PLAIN_SETTINGS, failAt: 'note' }) },
      ],
    ],
    ['merge.not-a-report', () => [{ name: 'x', json: { schemaVersion: 1 } }]],
    ['merge.not-a-report', () => [{ name: 'x', json: [] }]],
    ['merge.not-a-report', () => []],
  ])('are refused: %s', (code, reports) => {
    expect(() => mergeReports(reports())).toThrow(expect.objectContaining({ code }));
  });

  test('no JSON whatever crashes them', () => {
    fc.assert(
      fc.property(fc.jsonValue(), (json) => {
        expect(() => mergeReports([{ name: 'x', json }])).toThrow(
          expect.objectContaining({ code: 'merge.not-a-report' }),
        );
      }),
      { seed: 8 },
    );
  });
});
