// The packages as a stranger meets them: packed, unpacked into another folder, imported by name.
import { afterAll, describe, expect, test } from 'vitest';
import { freshProject } from '../support/fresh-project.js';

const project = freshProject();
afterAll(() => project.remove());
const PRINT_45 = `console.log(slerp([0, 0, 0, 1], [0, 0, 0, 1], [0, 1, 0, 0], 0.25)[1].toFixed(12));`;
const SINE = `${Math.sin(Math.PI / 8).toFixed(12)}\n`;

describe('in a fresh project', () => {
  test('Node imports every package that needs no page', () => {
    project.write(
      'all.mjs',
      `for (const name of ['core', 'core/sampler', 'mend', 'survey', 'formats', 'job', 'cli']) console.log(name, Object.keys(await import('@slewcurve/' + name)).length > 0);`,
    );
    expect(
      project
        .node('all.mjs')
        .trimEnd()
        .split('\n')
        .every((line) => line.endsWith('true')),
    ).toBe(true);
  });

  test('an element’s class is imported where there is no page', () => {
    project.write(
      'chart.mjs',
      `import { SlewChart } from '@slewcurve/elements/chart'; console.log(typeof SlewChart, typeof window);`,
    );
    // Lit imports in Node; the elements measure themselves by ResizeObserver only once they stand on a page.
    expect(
      project.node('--import', 'data:text/javascript,globalThis.ResizeObserver=class{}', 'chart.mjs'),
    ).toBe('function undefined\n');
  });

  test('import', () => {
    project.write('esm.mjs', `import { slerp } from '@slewcurve/core'; ${PRINT_45}`);
    expect(project.node('esm.mjs')).toBe(SINE);
  });

  test('require', () => {
    project.write('cjs.cjs', `const { slerp } = require('@slewcurve/core'); ${PRINT_45}`);
    expect(project.node('--no-warnings', 'cjs.cjs')).toBe(SINE);
  });

  test.each(['node16', 'bundler'])('TypeScript resolves the types under %s', (resolution) => {
    const module = resolution === 'bundler' ? 'esnext' : 'node16';
    project.write(
      'typed.mts',
      `import { playAs, rotationTrack, slerp, type Curve } from '@slewcurve/core';
import { sampler } from '@slewcurve/core/sampler';
import { quat } from 'gl-matrix';
const out: quat = slerp(quat.create(), [0, 0, 0, 1], new Float32Array(4), 0.5);
const track = rotationTrack({ times: [0, 1], values: [0, 0, 0, 1, 0, 1, 0, 0] });
const curve: Curve = playAs(track, 'short-way');
const rate: Float64Array = curve.rate(new Float64Array(3), 0.5, 'own');
sampler(track).sample(0.5, out);
// @ts-expect-error a playback that is none
playAs(track, 'long');
// @ts-expect-error inputs are numbers
slerp(out, 'a', out, 0.5);
console.log(out, rate);
`,
    );
    const config = {
      compilerOptions: {
        module,
        moduleResolution: resolution,
        target: 'es2022',
        strict: true,
        noEmit: true,
        types: [],
        skipLibCheck: false,
        lib: ['es2022', 'dom'],
      },
      files: ['typed.mts'],
    };
    project.write('tsconfig.json', JSON.stringify(config));
    expect(project.node('node_modules/typescript/bin/tsc', '-p', '.')).toBe('');
  });

  test('the command starts', () => {
    expect(project.node('node_modules/@slewcurve/cli/bin/slewcurve.js', '--version')).toMatch(
      /^slewcurve \d+\.\d+\.\d+\n$/,
    );
  });

  test.each(['core', 'mend', 'survey', 'formats', 'job', 'cli', 'elements'])(
    '@slewcurve/%s brings its licence and its README',
    (name) => {
      project.write(
        'files.mjs',
        `import { readFileSync } from 'node:fs'; const at = (file) => readFileSync('node_modules/@slewcurve/${name}/' + file, 'utf8'); console.log(at('LICENSE').includes('MIT License'), at('README.md').startsWith('# @slewcurve/${name}'));`,
      );
      expect(project.node('files.mjs')).toBe('true true\n');
    },
  );
});
