import MarkdownIt from 'markdown-it';
import { rotationTrack } from '@slewcurve/core';
import {
  docketHtml,
  docketMarkdown,
  docketOf,
  stampsFor,
  tracePicture,
  withStamps,
  type DocketParts,
  type StepReport,
} from '@slewcurve/job';
import { NO_HOUSE_RULES } from '@slewcurve/survey';
import { describe, expect, test } from 'vitest';
import { fileReportWith, findingWith } from '../support/demo-report.js';

const [A, B] = ['a', 'b'].map((letter) => letter.repeat(16));
const OPEN = findingWith([A], { track: 'hip', rule: 'jump.shelf' });
const LIFTED = findingWith([B], {
  track: 'knee',
  remedy: { verb: 'lift out', clip: 'walk', track: 'knee', keys: [1] },
});
const STAMPED = findingWith([A], { track: 'toe' });
const WORDS = { reason: 'the hit is meant', by: 'Ada', date: '2026-05-17' };
const PROOF: StepReport = {
  step: { verb: 'lift out', clip: 'walk', track: 'knee', keys: [1, 7], keep: [0] },
  changed: 2,
  largest: 9,
  outside: 0,
  added: 0,
};

function parts(change: Partial<DocketParts> = {}): DocketParts {
  const report = fileReportWith([OPEN, LIFTED, STAMPED]);
  const stamped = withStamps(report, stampsFor(fileReportWith([STAMPED]), A, WORDS));
  // The same fingerprint stands on hip and toe here: only the toe's is stamped.
  const findings = [OPEN, LIFTED, stamped.findings[2]];
  return {
    before: { size: 12_345, sha256: '0'.repeat(64), report: { ...report, findings } },
    after: { size: 12_349, findings: [OPEN, findings[2]], tracks: [] },
    playbacks: ['as-written', 'finite-cubic'],
    houseRules: { ...NO_HOUSE_RULES, roles: { '*/eye': 'eye' }, levels: { 'turn.half': 'off' } },
    lines: [{ step: PROOF.step }, { step: { ...PROOF.step, verb: 'bridge' }, skipped: true }],
    proofs: [PROOF],
    command: 'npx slewcurve mend walk.glb --card card.json -o OUT',
    ...change,
  };
}

function rowsOf(change?: Partial<DocketParts>): string[][] {
  const table = docketOf(parts(change)).find(({ kind }) => kind === 'table');
  return table?.kind === 'table' ? table.rows.map((row) => [...row]) : [];
}

describe('the docket', () => {
  test('says what became of every finding, open ones first', () => {
    expect(rowsOf().map((row) => [row[1], row.at(-1)])).toEqual([
      ['hip in walk', 'open'],
      ['knee in walk', 'mended by step 1'],
      ['toe in walk', 'stamped: the hit is meant (Ada, 2026-05-17)'],
    ]);
  });

  test('shows what only the mended file has', () => {
    const fresh = findingWith([B], { track: 'neck' });
    const rows = rowsOf({ after: { findings: [OPEN, STAMPED, fresh], tracks: [] } });
    expect(rows.find((row) => row[1] === 'neck in walk')?.at(-1)).toBe('new since the card');
  });

  test('tells the distance to the limit in per cent: 9° against 1° is 800 % beyond', () => {
    expect(rowsOf()[0].slice(4, 7)).toEqual(['9 deg', '1 deg', '-800 %']);
  });

  test('as Markdown is read back by markdown-it: headings, bytes, hash, proof, skipped steps, what was not checked', () => {
    const text = docketMarkdown(docketOf(parts()));
    const tokens = new MarkdownIt().parse(text, {});
    const headings = tokens.flatMap(({ type }, i) =>
      type === 'heading_open' ? [tokens[i + 1].content] : [],
    );
    expect(headings).toEqual(['walk.glb', 'Findings', 'Job card', 'Not checked', 'The same by command']);
    for (const words of [
      `12,345 bytes, SHA-256 ${'0'.repeat(64)}`,
      'Mended: 12,349 bytes.',
      'as played: as written',
      'finite cubic',
      '\\*/eye is eye',
      '~~Bridge',
      '2 keys changed, the largest by 9.00°',
      'Proof: outside the spans of these steps the motion changes by at most 0°; 1 kept key stayed',
      'Rules that the house rules turn off: turn.half.',
      'at reduced speed first',
    ])
      expect(text).toContain(words);
  });

  test('as HTML stands by itself: nothing is fetched or run, and no name is read as markup', () => {
    const evil = '<script>alert(1)</script><img src=x onerror=alert(1)>';
    const report = fileReportWith([findingWith([A], { track: evil, message: evil })], evil);
    const html = docketHtml(
      docketOf(parts({ before: { size: 1, report }, after: undefined, picture: () => '<svg></svg>' })),
    );
    expect(html).not.toMatch(/<script|<img|<link|src="|href="|url\(/);
    expect(html).toContain('&lt;script&gt;alert(1)');
    expect(html).toContain('<td><svg></svg></td>');
    expect(html).toContain("default-src 'none'");
    expect(html.match(/<tr>/g)).toHaveLength(2);
  });

  test('says so where nothing was edited and nothing found', () => {
    const text = docketMarkdown(
      docketOf(
        parts({ before: { size: 1, report: fileReportWith([]) }, after: undefined, lines: [], proofs: [] }),
      ),
    );
    expect(text).toContain('## Findings\n\nNone.');
    expect(text).toContain('Nothing was edited.');
  });
});

describe('the picture of a finding', () => {
  const values = [0, 0, 40, 0, 0].flatMap((degrees) => {
    const half = (degrees * Math.PI) / 360;
    return [Math.sin(half), 0, 0, Math.cos(half)];
  });
  const track = rotationTrack({ times: [0, 0.9, 1, 1.1, 2], values });

  test('has the speed of half a second on either side, and says its peak: 40° in 0.1 s is 400 deg/s', () => {
    const svg = tracePicture(track, 'short-way', 1);
    expect(svg).toContain('Angular speed from 0.500 s to 1.500 s, at most 400.0 degrees per second');
    // Posts of the three keys within.
    expect(svg?.match(/v4/g)).toHaveLength(3);
  });

  test('ends where the track ends; a track of one moment has none', () => {
    expect(tracePicture(track, 'short-way', 2)).toContain('from 1.500 s to 2.000 s, at most');
    expect(tracePicture(rotationTrack({ times: [0], values: [0, 0, 0, 1] }), 'short-way', 0)).toBeUndefined();
  });
});
