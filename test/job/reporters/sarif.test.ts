// Held to the JSON schema of SARIF 2.1.0 that npm's @microsoft/jest-sarif 1.0.0-beta.0 carries (OASIS; the package is MIT).
import { readFileSync } from 'node:fs';
import { Ajv } from 'ajv';
import * as fc from 'fast-check';
import { SlewcurveError } from '@slewcurve/core';
import {
  baselineOf,
  buildReport,
  sarifReport,
  stampsFor,
  unreadableFile,
  withBaseline,
  withStamps,
  type Report,
} from '@slewcurve/job';
import { RULES } from '@slewcurve/survey';
import { describe, expect, test } from 'vitest';
import { PLAIN_SETTINGS, demoReport, fileReportWith, findingWith } from '../../support/demo-report.js';

interface Sarif {
  readonly runs: readonly {
    readonly tool: {
      readonly driver: { readonly rules: readonly { id: string; help: { markdown: string } }[] };
    };
    readonly invocations: readonly {
      readonly executionSuccessful: boolean;
      readonly toolExecutionNotifications: readonly { readonly descriptor: { readonly id: string } }[];
    }[];
    readonly results: readonly {
      readonly ruleId: string;
      readonly ruleIndex: number;
      readonly level: string;
      readonly baselineState?: string;
      readonly message: { readonly text: string };
      readonly suppressions?: readonly { readonly justification: string }[];
      readonly partialFingerprints: Readonly<Record<string, string>>;
      readonly properties: { readonly time: number; readonly value: number };
      readonly locations: readonly {
        readonly physicalLocation: { readonly artifactLocation: { readonly uri: string } };
        readonly logicalLocations: readonly { readonly fullyQualifiedName: string; readonly name: string }[];
      }[];
    }[];
  }[];
}

/** ajv 8 has no draft 4. This schema differs from draft 7 in the spelling of its own name alone; one of its patterns is none under Unicode's rules. */
const {
  $schema: _,
  id: __,
  ...schema
} = JSON.parse(readFileSync('test/data/sarif-2.1.0-rtm.5.json', 'utf8'));
const ajv = new Ajv({ strict: false, allErrors: true, unicodeRegExp: false });
ajv.addFormat('uri', { validate: (text: string) => URL.canParse(text) });
ajv.addFormat('uri-reference', {
  validate: (text: string) => URL.canParse(text, 'file:///') && !/[\s\\<>"{}|^`]/.test(text),
});
ajv.addFormat('date-time', { validate: (text: string) => !Number.isNaN(Date.parse(text)) });
const validate = ajv.compile(schema);

function sarifOf(report: Report, folder?: string): Sarif {
  const log: Sarif = JSON.parse(sarifReport(report, folder));
  validate(log);
  expect(validate.errors ?? []).toEqual([]);
  return log;
}

function uriOf(file: string, folder?: string): string {
  const { runs } = sarifOf(buildReport([fileReportWith([findingWith(['a'])], file)], PLAIN_SETTINGS), folder);
  return runs[0].results[0].locations[0].physicalLocation.artifactLocation.uri;
}

describe('the SARIF report', () => {
  test('of the demo scene is valid, one result a finding, with its rule’s page, track, time and fingerprint', async () => {
    const file = await demoReport('clips/kestrel point.glb');
    const [run] = sarifOf(buildReport([file], PLAIN_SETTINGS)).runs;
    expect(run.results).toHaveLength(file.findings.length);
    for (const [i, finding] of file.findings.entries()) {
      const result = run.results[i];
      expect([result.ruleId, result.level]).toEqual([finding.rule, finding.level]);
      expect(run.tool.driver.rules[result.ruleIndex].id).toBe(finding.rule);
      expect(result.partialFingerprints).toEqual({ 'slewcurve/v1': finding.fingerprint });
      expect(result.properties).toMatchObject({ time: finding.time, value: finding.value });
      expect(result.locations[0].physicalLocation.artifactLocation.uri).toBe('clips/kestrel%20point.glb');
      expect(result.locations[0].logicalLocations[0].fullyQualifiedName).toBe(
        `${finding.clip}/${finding.track}`,
      );
      expect(result).not.toHaveProperty('suppressions');
    }
    for (const { help } of run.tool.driver.rules) expect(help.markdown).toContain('## What people see');
  });

  test('has rules for what was found alone, and knows every rule there is', () => {
    const findings = RULES.map(({ id }) => findingWith(['a'], { rule: id }));
    const [run] = sarifOf(buildReport([fileReportWith(findings)], PLAIN_SETTINGS)).runs;
    expect(run.tool.driver.rules.map(({ id }) => id)).toEqual(RULES.map(({ id }) => id));
    const [none] = sarifOf(buildReport([fileReportWith([])], PLAIN_SETTINGS)).runs;
    expect(none.tool.driver.rules).toEqual([]);
  });

  test('suppresses a finding only when all its places are stamped, with the reason', () => {
    const report = fileReportWith([findingWith(['a'.repeat(16), 'b'.repeat(16)])]);
    const words = { reason: 'the hit is meant', by: 'Ada', date: '2026-05-17' };
    const suppressed = (named: string): unknown =>
      sarifOf(buildReport([withStamps(report, stampsFor(report, named, words))], PLAIN_SETTINGS)).runs[0]
        .results[0].suppressions;
    expect(suppressed('a'.repeat(16))).toBeUndefined();
    expect(suppressed('jump.lone-key')).toEqual([
      {
        kind: 'external',
        status: 'accepted',
        justification: 'the hit is meant',
        properties: { by: 'Ada', date: '2026-05-17' },
      },
    ]);
  });

  test('tells old from new where there is a baseline', () => {
    const old = findingWith(['a'.repeat(16)]);
    const fresh = findingWith(['b'.repeat(16)], { track: 'knee', fingerprint: 'e'.repeat(16) });
    const { files, gone } = withBaseline(
      [fileReportWith([old, fresh])],
      baselineOf([fileReportWith([old])]),
      true,
    );
    const [run] = sarifOf(buildReport(files, PLAIN_SETTINGS, { baseline: { gone, exact: false } })).runs;
    expect(run.results.map(({ baselineState }) => baselineState)).toEqual(['unchanged', 'new']);
  });

  test('notes a file that can’t be read', () => {
    const bad = unreadableFile('x.glb', new SlewcurveError('gltf.truncated', 'Cut.'));
    const [run] = sarifOf(buildReport([bad], PLAIN_SETTINGS)).runs;
    expect(run.invocations[0].executionSuccessful).toBe(false);
    expect(run.invocations[0].toolExecutionNotifications[0].descriptor.id).toBe('gltf.truncated');
  });

  test('names files by relative URIs where it can', () => {
    expect(uriOf('clips/a.glb')).toBe('clips/a.glb');
    expect(uriOf('./clips/a.glb')).toBe('clips/a.glb');
    expect(uriOf('../a.glb')).toBe('../a.glb');
    expect(uriOf('/project/clips/a.glb', '/project')).toBe('clips/a.glb');
    expect(uriOf('C:/project/clips/a.glb', 'C:/project')).toBe('clips/a.glb');
    expect(uriOf('/elsewhere/a.glb', '/project')).toBe('file:///elsewhere/a.glb');
    expect(uriOf('D:/elsewhere/a b.glb', 'C:/project')).toBe('file:///D:/elsewhere/a%20b.glb');
    expect(uriOf('100%#?.glb')).toBe('100%25%23%3F.glb');
    expect(uriOf('a:b.glb')).toBe('a%3Ab.glb');
  });

  test('is valid whatever a file calls its tracks', () => {
    fc.assert(
      fc.property(fc.string({ unit: 'binary' }), fc.string({ unit: 'binary' }), (file, track) => {
        sarifOf(buildReport([fileReportWith([findingWith(['a'], { track })], file)], PLAIN_SETTINGS));
      }),
      { seed: 3, numRuns: 50 },
    );
    expect(uriOf('\uD800.glb')).toBe('%EF%BF%BD.glb');
  });
});
