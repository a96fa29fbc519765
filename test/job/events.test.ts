import { readFileSync } from 'node:fs';
import { Ajv2020 } from 'ajv/dist/2020.js';
import { describe, expect, test } from 'vitest';
import { bufferSource, openAnimation } from '@slewcurve/formats';
import { buildReport, surveyFile, textReport, type JobSettings } from '@slewcurve/job';
import { NO_HOUSE_RULES } from '@slewcurve/survey';
import { generatedTake } from '../support/generated-take.js';

const SETTINGS: JobSettings = {
  playbacks: ['as-written'],
  failAt: 'warning',
  allowWarnings: 0,
  houseRules: NO_HOUSE_RULES,
};
const isReport = new Ajv2020({ strict: false }).compile(
  JSON.parse(readFileSync('packages/job/schema/report.json', 'utf8')),
);

async function surveyed(pop?: { readonly joint: 'every'; readonly frame: number; readonly degrees: number }) {
  const bytes = generatedTake({ joints: 20, frames: 120, rate: 30, ...(pop && { pop }) });
  const file = await openAnimation(bufferSource(bytes), { name: 'take.glb' });
  return surveyFile('take.glb', file, SETTINGS);
}

describe('events in a report', () => {
  test('twenty joints in a chain that pop in one frame are one event, told in one line, and the root is their owner', async () => {
    const report = await surveyed({ joint: 'every', frame: 60, degrees: 20 });
    const pops = report.findings.filter(({ rule }) => rule === 'jump.lone-key');
    expect(pops).toHaveLength(20);
    expect(new Set(pops.map(({ owner }) => owner))).toEqual(new Set(['joint-0']));
    expect(report.events).toMatchObject([
      { clip: 'Take', family: 'jump', time: 2, owner: 'joint-0', tracks: 20, level: 'warning' },
    ]);
    const whole = buildReport([report], SETTINGS);
    expect(textReport(whole)).toContain(
      'take.glb: Take, 2.000 s: 20 tracks jump within one frame: one event; look at joint-0 first.',
    );
    expect(isReport(JSON.parse(JSON.stringify(whole))), JSON.stringify(isReport.errors)).toBe(true);
  });

  test('a clean take has no events and guesses no loop', async () => {
    const report = await surveyed();
    expect(report.events).toBeUndefined();
    expect(report.clips[0].loopGuess).toBeUndefined();
  });
});
