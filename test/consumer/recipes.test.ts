// Every recipe of the documentation, as it stands there, in a fresh project.
import { readFileSync, writeFileSync } from 'node:fs';
import { kestrelPoint } from '@slewcurve/job';
import { afterAll, describe, expect, test } from 'vitest';
import { freshProject } from '../support/fresh-project.js';

const text = readFileSync('packages/core/docs/recipes.md', 'utf8');
const recipes = [...text.matchAll(/^## (.+)\n\n```js\n([\s\S]*?)^```$/gm)].map(([, name, code]) => ({
  name,
  code,
}));
const project = freshProject();
afterAll(() => project.remove());

describe('recipe', () => {
  test('there are seven, and each says what it prints', () => {
    expect(recipes).toHaveLength(7);
    for (const { code } of recipes) expect(code.match(/\/\/ prints /g)).toHaveLength(1);
  });

  test.each(recipes)('$name', ({ code }) => {
    writeFileSync(`${project.folder}/walk.glb`, kestrelPoint());
    project.write('recipe.mjs', code);
    const prints = /\/\/ prints (.*)/.exec(code)?.[1];
    expect(project.node('recipe.mjs').trim()).toBe(prints);
  });
});
