// Read back by markdown-it, a CommonMark reader that is not ours.
import * as fc from 'fast-check';
import MarkdownIt from 'markdown-it';
import { SlewcurveError } from '@slewcurve/core';
import { buildReport, markdownReport, unreadableFile, type Report } from '@slewcurve/job';
import { describe, expect, test } from 'vitest';
import { PLAIN_SETTINGS, demoReport, fileReportWith, findingWith } from '../../support/demo-report.js';

const reader = new MarkdownIt({ html: true });

interface Read {
  readonly headings: readonly string[];
  /** Each table as rows of cells, the head first. */
  readonly tables: readonly (readonly (readonly string[])[])[];
  /** Anything that is more than headings, paragraphs, plain text and tables. */
  readonly strangers: readonly string[];
}

const PLAIN = /^(?:heading|paragraph|table|thead|tbody|tr|th|td)_(?:open|close)$|^inline$/;

function read(markdown: string): Read {
  const tokens = reader.parse(markdown, {});
  const inside = tokens.flatMap(({ children }) => children ?? []);
  const strangers = [
    ...tokens.filter(({ type }) => !PLAIN.test(type)),
    ...inside.filter(({ type }) => type !== 'text' && type !== 'text_special'),
  ].map(({ type }) => type);
  const headings: string[] = [];
  const tables: string[][][] = [];
  for (const [i, { type, children }] of tokens.entries()) {
    const opened = tokens[i - 1]?.type;
    const text = (children ?? []).map(({ content }) => content).join('');
    if (type === 'table_open') tables.push([]);
    if (type === 'tr_open') tables.at(-1)?.push([]);
    if (opened === 'heading_open') headings.push(text);
    if (opened === 'th_open' || opened === 'td_open') tables.at(-1)?.at(-1)?.push(text);
  }
  return { headings, tables, strangers };
}

describe('the Markdown report', () => {
  test('of the demo scene has one row a finding, under the file’s name', async () => {
    const file = await demoReport('clips/kestrel_point.glb');
    const report: Report = buildReport([file], PLAIN_SETTINGS);
    const { headings, tables, strangers } = read(markdownReport(report));
    expect(strangers).toEqual([]);
    expect(headings).toEqual(['Slewcurve report', 'clips/kestrel_point.glb']);
    const [files, findings] = tables;
    const { error, warning, note } = report.totals;
    expect(files[1]).toEqual(['clips/kestrel_point.glb', String(error), String(warning), String(note), '0']);
    expect(findings.slice(1).map((row) => [row[0], row[1], row[2], row[5]])).toEqual(
      file.findings.map(({ level, track, clip, rule }) => [level, track, clip, rule]),
    );
  });

  test('counts files without anything to say instead of listing them', () => {
    const quiet = Array.from({ length: 299 }, (_, i) => fileReportWith([], `${i}.glb`));
    const text = markdownReport(
      buildReport([...quiet, fileReportWith([findingWith(['a'])], 'z.glb')], PLAIN_SETTINGS),
    );
    expect(text).toContain('Nothing was found in 299 more.');
    expect(read(text).tables[0]).toHaveLength(2);
  });

  test('tells a file that can’t be read', () => {
    const bad = unreadableFile('x.glb', new SlewcurveError('gltf.truncated', 'Cut.'));
    const text = markdownReport(buildReport([bad], PLAIN_SETTINGS));
    expect(read(text).headings).toEqual(['Slewcurve report', 'x.glb']);
    expect(text).toContain('Cut. gltf.truncated');
  });

  test('keeps every name, and none is read as Markdown or HTML', () => {
    const name = fc.oneof(
      fc.string({ unit: 'grapheme', minLength: 1 }),
      fc.string({ unit: fc.constantFrom(...'|\\`*_[]()<>&#~!-+.:1 \na'.split('')), minLength: 1 }),
    );
    fc.assert(
      fc.property(name, (track) => {
        const file = fileReportWith([findingWith(['a'], { track })], track);
        const { tables, strangers } = read(markdownReport(buildReport([file], PLAIN_SETTINGS)));
        expect(strangers).toEqual([]);
        // A cell's ends lose their white space, and runs of line breaks become a space.
        const cell = track.replace(/[\r\n\t\f\v\u2028\u2029]+/g, ' ').trim();
        expect(tables[1][1][1].trim()).toBe(cell);
      }),
      { seed: 11 },
    );
  });
});
