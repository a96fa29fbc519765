import { describe, expect, test } from 'vitest';
import { COMPARISON_RULES, RULES, rulePage } from '@slewcurve/survey';

const ALL = [...RULES, ...COMPARISON_RULES];

describe('rule pages', () => {
  // The text lives in the rule; the file beside it is made from it: `npx vitest run test/survey/rule-page -u`.
  test.each(ALL.map((rule) => [rule.id, rule] as const))(
    'the page beside %s is what the rule says',
    async (id, rule) => {
      const [family, slug] = id.split('.');
      await expect(rulePage(rule)).toMatchFileSnapshot(
        `../../packages/survey/src/rules/${family}/${slug}.md`,
      );
    },
  );

  test.each(ALL.map((rule) => [rule.id, rule] as const))(
    '%s has an id of its family and words for its role',
    (id, rule) => {
      expect(id.startsWith(`${rule.family}.`)).toBe(true);
      expect(rule.alsoCalled.length).toBeGreaterThan(2);
      expect(rule.summary).toMatch(/^[A-Z].*\.$/);
      for (const text of Object.values(rule.page)) expect(text.trim()).not.toBe('');
    },
  );

  test.each(ALL.map((rule) => [rule.id, rule] as const))('the page of %s has every section', (_, rule) => {
    const page = rulePage(rule);
    const headings = [...page.matchAll(/^## (.*)$/gm)].map(([, heading]) => heading);
    expect(headings).toEqual([
      'What it is',
      'How it looks in the trace',
      'What the standard says',
      'What programs do',
      'What people see',
      'Test',
      'Examples',
      'Default thresholds',
      'Where the defaults come from',
      'What it spares',
      'Remedy',
      'How to silence it',
    ]);
    for (const section of page.split(/^## .*$/m).slice(1)) expect(section.trim().length).toBeGreaterThan(5);
    // Where numbers come from is said, or said to be unknown.
    expect(rule.page.source).toMatch(
      /no source|measured|glTF 2\.0|[Gg]eometry|[Aa]rithmetic|arithmetic|no threshold|by definition|house rules/,
    );
  });

  test('ids are all different', () => {
    expect(new Set(ALL.map((rule) => rule.id)).size).toBe(ALL.length);
  });
});
