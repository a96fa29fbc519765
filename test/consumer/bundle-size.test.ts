import { gzipSync } from 'node:zlib';
import { build } from 'vite';
import { describe, expect, test } from 'vitest';

/**
 * Bundles one import statement as a user's app would, from the built packages, and gives its code. Not as a library: Vite keeps
 * the white space of those.
 */
async function bundle(source: string): Promise<string> {
  const entry = 'virtual:entry.js';
  const result = await build({
    logLevel: 'silent',
    configFile: false,
    plugins: [
      {
        name: 'entry',
        resolveId: (id) => (id.endsWith(entry) ? entry : null),
        load: (id) => (id === entry ? source : null),
      },
    ],
    build: { write: false, rolldownOptions: { input: entry, preserveEntrySignatures: 'strict' } },
  });
  if (!('output' in result)) throw new Error('expected one output');
  return result.output[0].code;
}

const CORE = '@slewcurve/core';
const SAMPLER = '@slewcurve/core/sampler';

// Bytes after gzip. gl-matrix 3.4.4's slerp alone is 1145 (PERFORMANCE: esbuild 0.28), which ours stays below.
describe('in a bundle, gzipped,', () => {
  test.each([
    [`export { SlewcurveError } from '${CORE}';`, 300],
    [`export { slerp } from '${CORE}';`, 800],
    [`export { sampler } from '${SAMPLER}';`, 4000],
    [`export { sampler, poseSampler } from '${SAMPLER}';`, 4000],
  ])('%s takes at most %i bytes', async (source, most) => {
    const code = await bundle(source);
    expect(code).toContain('export');
    expect(gzipSync(code).byteLength, `${gzipSync(code).byteLength} bytes`).toBeLessThanOrEqual(most);
  });

  test('the sampling path has no dependency', async () => {
    const code = await bundle(`export * from '${SAMPLER}';`);
    // gl-matrix is known by the numbers and names that it brings.
    expect(code).not.toMatch(/\bimport\b|glMatrix|ARRAY_TYPE|hypot=/);
  });
});
