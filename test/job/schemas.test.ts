import { readFileSync } from 'node:fs';
import { expect, test } from 'vitest';

function definition(schema: string, name: string): unknown {
  const { $defs }: { $defs: Record<string, unknown> } = JSON.parse(
    readFileSync(new URL(`../../packages/job/schema/${schema}.json`, import.meta.url), 'utf8'),
  );
  return $defs[name];
}

test('a step in a report is described as one on a job card is, word for word', () => {
  expect(definition('job-card', 'step')).toBeTypeOf('object');
  expect(definition('report', 'step')).toEqual(definition('job-card', 'step'));
});
