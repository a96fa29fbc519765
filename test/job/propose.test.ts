import { propose, type FileReport, type JobSettings } from '@slewcurve/job';
import { NO_HOUSE_RULES, type Finding, type Occurrence } from '@slewcurve/survey';
import { expect, test } from 'vitest';

const SETTINGS: JobSettings = {
  playbacks: ['as-written'],
  failAt: 'warning',
  allowWarnings: 0,
  houseRules: NO_HOUSE_RULES,
};

/** A shelf with a place of each level, at keys 9 and 20. */
function reportWith(levels: readonly [Finding['level'], Finding['level']]): FileReport {
  const occurrences = [9, 20].map((key, i): Occurrence => ({
    keys: [key],
    time: key / 30,
    span: [(key - 1) / 30, key / 30],
    value: 7,
    level: levels[i],
    message: 'it steps',
    fingerprint: String(key),
    remedy: { verb: 'bridge', clip: 'chop', track: 'knee', keys: [key], steps: 4 },
  }));
  const { keys, time, span, value, message } = occurrences[1];
  const finding: Finding = {
    rule: 'jump.shelf',
    level: 'warning',
    clip: 'chop',
    track: 'knee',
    keys,
    time,
    span,
    value,
    message,
    unit: 'deg',
    limit: 2,
    playback: 'as-written',
    owner: 'knee',
    count: 2,
    occurrences,
    fingerprint: 'shelf',
  };
  return { file: 'f', status: 'surveyed', clips: [], tracks: [], findings: [finding] };
}

test('a place below the failing level is left alone, though its finding has a worse one', () => {
  expect(propose(reportWith(['note', 'warning']), SETTINGS).card.steps.map(({ keys }) => keys)).toEqual([
    [20],
  ]);
});

test('two places of one verb on one track become one step', () => {
  expect(propose(reportWith(['warning', 'warning']), SETTINGS).card.steps.map(({ keys }) => keys)).toEqual([
    [9, 20],
  ]);
});
