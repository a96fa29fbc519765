// Read back by Papa Parse, a reader of RFC 4180 that is not ours.
import * as fc from 'fast-check';
import Papa from 'papaparse';
import { SlewcurveError } from '@slewcurve/core';
import { buildReport, csvReport, unreadableFile, type Report } from '@slewcurve/job';
import { describe, expect, test } from 'vitest';
import { PLAIN_SETTINGS, demoReport, fileReportWith, findingWith } from '../../support/demo-report.js';

function rowsOf(report: Report): Record<string, string>[] {
  const { data, errors } = Papa.parse(csvReport(report), {
    header: true,
    delimiter: ',',
    newline: '\r\n',
    skipEmptyLines: 'greedy',
  });
  expect(errors).toEqual([]);
  return data;
}

describe('the CSV report', () => {
  test('of the demo scene has one row a finding with its numbers as they are', async () => {
    const file = await demoReport();
    const rows = rowsOf(buildReport([file], PLAIN_SETTINGS));
    expect(rows).toHaveLength(file.findings.length);
    for (const [i, finding] of file.findings.entries()) {
      expect(Number(rows[i].time_s)).toBe(finding.time);
      expect(Number(rows[i].value)).toBe(finding.value);
      expect([rows[i].rule, rows[i].track, rows[i].fingerprint, rows[i].file]).toEqual([
        finding.rule,
        finding.track,
        finding.fingerprint,
        'kestrel-point.glb',
      ]);
    }
  });

  test('tells a file that can’t be read', () => {
    const bad = unreadableFile('x.glb', new SlewcurveError('gltf.truncated', 'Cut, "short".'));
    expect(rowsOf(buildReport([bad], PLAIN_SETTINGS))[0]).toMatchObject({
      file: 'x.glb',
      level: 'error',
      rule: 'gltf.truncated',
      message: 'Cut, "short".',
    });
  });

  test('keeps every name, and none is a formula to a spreadsheet', () => {
    fc.assert(
      fc.property(fc.string({ unit: 'binary', minLength: 1 }), (track) => {
        const report = buildReport([fileReportWith([findingWith(['a'], { track })])], PLAIN_SETTINGS);
        const [row] = rowsOf(report);
        expect(row.track).toBe(/^[=+\-@\t\r]/.test(track) ? `'${track}` : track);
      }),
      { seed: 5 },
    );
    const formula = '=HYPERLINK("http://x")';
    const report = buildReport([fileReportWith([findingWith(['a'], { track: formula })])], PLAIN_SETTINGS);
    expect(rowsOf(report)[0].track).toBe(`'${formula}`);
  });
});
