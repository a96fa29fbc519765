import { describe, expect, test } from 'vitest';
import { RULES, rulePage } from '@slewcurve/survey';

describe('rule pages', () => {
  // The text lives in the rule; the file beside it is made from it: `npx vitest run test/survey/rule-page -u`.
  test.each(RULES.map((rule) => [rule.id, rule] as const))(
    'the page beside %s is what the rule says',
    async (id, rule) => {
      const [family, slug] = id.split('.');
      await expect(rulePage(rule)).toMatchFileSnapshot(
        `../../packages/survey/src/rules/${family}/${slug}.md`,
      );
    },
  );

  test.each(RULES.map((rule) => [rule.id, rule] as const))(
    '%s has an id of its family and words for its role',
    (id, rule) => {
      expect(id.startsWith(`${rule.family}.`)).toBe(true);
      expect(rule.alsoCalled.length).toBeGreaterThan(2);
      expect(rule.summary).toMatch(/^[A-Z].*\.$/);
      for (const text of Object.values(rule.page)) expect(text.trim()).not.toBe('');
    },
  );

  test('ids are all different', () => {
    expect(new Set(RULES.map((rule) => rule.id)).size).toBe(RULES.length);
  });
});
