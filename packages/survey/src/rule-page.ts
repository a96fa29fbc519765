import type { ComparisonRule } from './comparison-rule.js';
import { ROLES } from './roles.js';
import { RULE_EXAMPLES } from './rule-examples.js';
import type { Rule } from './rule.js';

/** A rule's page as Markdown: what `explain` prints and what the file beside the rule holds. */
export function rulePage(rule: Rule | ComparisonRule): string {
  const { page } = rule;
  const sections: readonly (readonly [string, string])[] = [
    ['What it is', page.what],
    ['How it looks in the trace', page.trace],
    ['What the standard says', page.standard],
    ['What programs do', page.programs],
    ['What people see', page.people],
    ['Test', page.test],
    ...examples(rule),
    ['Default thresholds', 'limits' in rule ? thresholds(rule) : BY_FLAGS],
    ['Where the defaults come from', page.source],
    ['What it spares', page.spares],
    ['Remedy', `${page.remedy}\n\nThe remedy leaves alone: ${rule.untouched}.`],
    ['How to silence it', 'limits' in rule ? silencing(rule) : UNASKED],
  ];
  return [
    `# ${rule.id}`,
    `${rule.summary} Usual level: ${rule.level}.`,
    `Also called: ${rule.alsoCalled.join(', ')}.`,
    ...sections.map(([heading, text]) => `## ${heading}\n\n${text}`),
  ]
    .join('\n\n')
    .concat('\n');
}

const BY_FLAGS =
  'None: `slewcurve compare` takes them as `--angle` (degrees) and `--rate` (degrees per second).';
const UNASKED = 'Leave out `--angle` and `--rate`: differences are then listed and nothing fails.';

function examples({ id }: ComparisonRule): readonly (readonly [string, string])[] {
  const both = RULE_EXAMPLES[id];
  return both === undefined ? [] : [['Examples', `Named: ${both[0]}\n\nNot named: ${both[1]}`]];
}

function thresholds(rule: Rule): string {
  const names = [
    ...new Set(Object.values(rule.limits).flatMap((limits) => (limits === 'off' ? [] : Object.keys(limits)))),
  ];
  const rows = ROLES.map((role) => {
    const limits = rule.limits[role];
    return [role, ...names.map((name) => (limits === 'off' ? 'off' : sayLimit(limits[name])))];
  });
  return `${table([['role', ...names], ...rows])}\n\nThe value of a finding is in ${UNITS[rule.unit]}.`;
}

function sayLimit(limit: number | undefined): string {
  if (limit === Infinity) return 'none';
  return limit === undefined ? '' : String(limit);
}

const UNITS: Readonly<Record<Rule['unit'], string>> = {
  deg: 'degrees',
  'deg/s': 'degrees per second',
  'deg/s²': 'degrees per second squared',
  'deg/s³': 'degrees per second cubed',
  s: 'seconds',
  Hz: 'hertz',
  '%': 'per cent',
  times: 'times, a ratio',
  numbers: 'numbers',
  length: 'lengths of a unit quaternion',
};

function silencing(rule: Rule): string {
  return `In the house rules: \`{ "levels": { "${rule.id}": "off" } }\` for all files, the same within \`exceptions\` for some, or other thresholds under \`limits\`.`;
}

/** A Markdown table with its columns padded to one width. */
function table(rows: readonly (readonly string[])[]): string {
  const widths = (rows[0] ?? []).map((_, column) =>
    Math.max(3, ...rows.map((row) => row[column]?.length ?? 0)),
  );
  const line = (cells: readonly string[]): string =>
    `| ${cells.map((cell, column) => cell.padEnd(widths[column] ?? 0)).join(' | ')} |`;
  const [head = [], ...body] = rows;
  return [line(head), line(widths.map((width) => '-'.repeat(width))), ...body.map(line)].join('\n');
}
