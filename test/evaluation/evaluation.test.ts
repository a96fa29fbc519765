import { describe, expect, test } from 'vitest';
import { type FalseAlarms, type Found, RATES, falseAlarms, planted } from './evaluate.js';

const LIVELY = [/^slow pan/, /^gait/, /sway/, /^whip, 180/];
const alarms = falseAlarms();
// One and a half times a joint's limit; fifteen floors of float32 are 1e-4° and never more.
const loneKeys = planted('lone key', 1.5, [30, 60], LIVELY);
const shelves = planted('shelf', 6, [30, 60], LIVELY);

function cell({ loneKeys: lone, shelves: stepped, others }: FalseAlarms): string {
  return `${lone} / ${stepped} / ${others}`;
}

function alarmTable(): string {
  const kinds = [...new Set(alarms.map(({ kind }) => kind))];
  return table([
    ['motion', ...RATES.map((rate) => `${rate} a second`)],
    ...kinds.map((kind) => [kind.name, ...alarms.filter((one) => one.kind === kind).map(cell)]),
  ]);
}

function foundTable(found: readonly Found[]): string {
  return table([
    ['fault', 'motion', 'keys a second', 'found of 100'],
    ...found.map((one) => [`${one.fault}, ${one.degrees}°`, one.kind.name, `${one.rate}`, `${one.found}`]),
  ]);
}

/** A Markdown table with its columns padded to one width. */
function table(rows: readonly (readonly string[])[]): string {
  const widths = rows[0].map((_, column) => Math.max(...rows.map((row) => row[column].length)));
  const line = (cells: readonly string[]): string =>
    `| ${cells.map((text, column) => text.padEnd(widths[column])).join(' | ')} |`;
  const [head, ...body] = rows;
  return [line(head), line(widths.map((width) => '-'.repeat(width))), ...body.map(line)].join('\n');
}

/** What was found at 60 keys a second. */
function at60(all: readonly Found[]): number[] {
  return all.filter(({ rate }) => rate === 60).map(({ found }) => found);
}

const page = `# Evaluation of the jump rules

Made by \`npm run evaluate\` (\`test/evaluation\`): seeded motions by formula, role joint, default thresholds, float32. Every change of a test or a threshold shows here as a difference.

## Clean motions: how many of 40 tracks are called a jump

Each cell: tracks with a lone key / with a shelf / with another jump finding. The first ten kinds must be clean. A hinge that reaches full stretch may give a shelf in at most 30 % and no lone key; the kinds after it are printed and not judged (an eye’s jump is a shelf to the role joint; the role eye is spared).

${alarmTable()}

## Planted faults: how many of 100 are named at their very key

${foundTable([...loneKeys, ...shelves])}
`;

describe('evaluation of the jump rules', () => {
  test('the committed table is what is measured', async () => {
    await expect(page).toMatchFileSnapshot('../../packages/survey/docs/evaluation.md');
  });

  test('none of 40 tracks of each of the first ten kinds is called a jump, at any of four rates', () => {
    const called = alarms
      .filter(({ kind }) => kind.mustBeClean)
      .filter((one) => one.loneKeys + one.shelves + one.others > 0)
      .map(({ kind, rate }) => `${kind.name} at ${rate}`);
    expect(called).toEqual([]);
  });

  test('hinge stops give no lone key, and a shelf in at most 30 % of tracks', () => {
    for (const one of alarms.filter(({ kind }) => kind.name === 'hinge stop')) {
      expect(one.loneKeys).toBe(0);
      expect(one.shelves / 40).toBeLessThanOrEqual(0.3);
    }
  });

  test('at 60 keys a second 99 of 100 lone keys of 1.5° are named in pan, gait, sway and whip, and every shelf of 6°', () => {
    expect(Math.min(...at60(loneKeys))).toBeGreaterThanOrEqual(99);
    expect(at60(shelves)).toEqual([100, 100, 100, 100]);
  });
});
