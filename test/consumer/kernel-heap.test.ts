// What a call leaves on the heap, in a process of its own over the built package: in a shared one other tests' calls decide what the
// engine compiles.
import { spawnSync } from 'node:child_process';
import { resolve } from 'node:path';
import { pathToFileURL } from 'node:url';
import { expect, test } from 'vitest';

const CORE = pathToFileURL(resolve('packages/core/dist/index.js')).href;

/** Bytes a call, the least of twelve runs of 50,000 after a warm-up of a million. */
function bytesLeft(call: string): number {
  const script = `import * as core from '${CORE}';
const a = Float64Array.of(0.1, 0.2, 0.3, Math.sqrt(1 - 0.14));
const b = Float64Array.of(-0.5, 0.5, 0.5, 0.5);
const c = Float64Array.of(0.5, 0.5, -0.5, 0.5);
const out = new Float64Array(4);
const call = (t) => core.${call};
for (let i = 0; i < 1e6; i++) call(i / 1e6);
let least = Infinity;
for (let run = 0; run < 12; run++) {
  gc();
  const before = process.memoryUsage().heapUsed;
  for (let i = 0; i < 50000; i++) call(i / 50000);
  least = Math.min(least, (process.memoryUsage().heapUsed - before) / 50000);
}
console.log(least);`;
  const options = ['--expose-gc', '--max-semi-space-size=64', '--input-type=module', '--eval', script];
  const { stdout, stderr } = spawnSync(process.execPath, options, { encoding: 'utf8' });
  expect(stderr).toBe('');
  return Number(stdout);
}

test.each([
  'slerp(out, a, b, t)',
  'nlerp(out, a, b, t)',
  'squad(out, a, b, c, b, t)',
  'logMap(out, a)',
  'expMap(out, a)',
  'relative(out, a, b)',
  'normalise(out, a)',
  'rotateVector(out, a, b)',
  'angleBetween(a, b)',
])('%s allocates no object (B24)', (call) => {
  // 16 bytes for each number that the engine boxes (t, squad's 2t(1 − t), an answer); an array of four numbers would be 64 and more.
  expect(bytesLeft(call)).toBeLessThan(48);
});
