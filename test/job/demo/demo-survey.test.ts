import { readFileSync } from 'node:fs';
import { bufferSource, openAnimation } from '@slewcurve/formats';
import { kestrelPoint, kestrelPointRules, surveyFile } from '@slewcurve/job';
import { RULES } from '@slewcurve/survey';
import { expect, test } from 'vitest';

interface Entry {
  readonly clip: string;
  readonly track: string;
  readonly rule: string;
  readonly level: string;
  readonly keys: readonly number[];
  readonly value: number;
  readonly unit: string;
  readonly tolerance: number;
}

// Worked out from the rules' text by code that imports nothing of the packages: see test/reference/demo-manifest.
const manifest: { workedOut: string[]; findings: Entry[] } = JSON.parse(
  readFileSync(new URL('../../data/demo-manifest.json', import.meta.url), 'utf8'),
);
const name = 'kestrel-point.glb';
const { findings } = await surveyFile(name, await openAnimation(bufferSource(kestrelPoint()), { name }), {
  playbacks: ['as-written'],
  failAt: 'warning',
  allowWarnings: 0,
  houseRules: kestrelPointRules,
});
const built = new Set(RULES.map(({ id }) => id));
const expected = manifest.findings.filter(({ rule }) => built.has(rule));

function place({ clip, track, rule, level }: Omit<Entry, 'keys' | 'value' | 'unit' | 'tolerance'>): string {
  return [clip, track, rule, level].join(' ');
}

test('the manifest has worked out every rule that is built', () => {
  expect([...built].filter((rule) => !manifest.workedOut.includes(rule))).toEqual([]);
});

test('the survey of the demo scene finds what the manifest lists, and nothing else', () => {
  expect(new Set(findings.map(place))).toEqual(new Set(expected.map(place)));
});

test.each(expected)('on $clip, $rule is found at the listed keys with the listed value', (entry) => {
  const finding = findings.find((one) => place(one) === place(entry));
  const keys = finding?.occurrences.flatMap((occurrence) => occurrence.keys) ?? [];
  expect(new Set(keys)).toEqual(new Set(entry.keys));
  expect(finding?.unit).toBe(entry.unit);
  // Reports round to six significant digits.
  expect(Math.abs((finding?.value ?? NaN) - entry.value)).toBeLessThanOrEqual(entry.tolerance);
});
