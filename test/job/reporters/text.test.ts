import { bufferSource } from '@slewcurve/formats';
import {
  LEVELS,
  buildReport,
  isAtLeast,
  kestrelPoint,
  kestrelPointRules,
  openFile,
  surveyFile,
  textReport,
  type FileReport,
  type JobSettings,
} from '@slewcurve/job';
import { beforeAll, describe, expect, test } from 'vitest';

const settings = (failAt: JobSettings['failAt']): JobSettings => ({
  playbacks: ['as-written'],
  failAt,
  allowWarnings: 0,
  houseRules: kestrelPointRules,
});
let demo: FileReport;
beforeAll(async () => {
  const { name, file } = await openFile(bufferSource(kestrelPoint()), { name: 'demo.glb' });
  demo = await surveyFile(name, file, settings('note'));
});
const linesOf = (failAt: JobSettings['failAt'], results: readonly string[] = []): string[] =>
  textReport(buildReport([demo], settings(failAt)), undefined, 'seconds', results).split('\n');

describe('the report as text', () => {
  test.each(LEVELS)(
    'has a line for every finding that fails at %s, and one a rule for what is milder',
    (failAt) => {
      const lines = linesOf(failAt);
      const ending = (kind: string): string[] =>
        lines.filter((line) => line.endsWith(` ${kind}`) || line.includes(` ${kind}; try: `));
      const kinds = new Map<string, number>();
      for (const { level, rule } of demo.findings)
        kinds.set(`${level} ${rule}`, (kinds.get(`${level} ${rule}`) ?? 0) + 1);
      expect(kinds.size).toBeGreaterThan(3);
      for (const [kind, count] of kinds) {
        const level = LEVELS.find((known) => kind.startsWith(known)) ?? 'note';
        const gathered = count > 1 && !isAtLeast(level, failAt);
        const head = gathered ? `${count} ${level}s( at \\d+ places)?: ` : '';
        expect(ending(kind), kind).toHaveLength(gathered ? 1 : count);
        expect(ending(kind)[0]).toMatch(new RegExp(`^demo\\.glb: ${head}`));
      }
    },
  );

  test('says how to see each of what it gathered, where it did', () => {
    expect(linesOf('error').some((line) => line.includes('--fail-at note lists every one'))).toBe(true);
    expect(linesOf('note').some((line) => line.includes('gathered'))).toBe(false);
  });

  test('ends with what was done and the verdict, so that neither is looked for', () => {
    const lines = linesOf('note', ['written: out.glb']);
    const found = lines.findLastIndex((line) => line.startsWith('demo.glb: '));
    expect(lines.indexOf('written: out.glb')).toBe(found + 1);
    expect(lines.at(-2)).toMatch(/^verdict: fail/);
  });
});
