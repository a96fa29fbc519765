import {
  angleBetween,
  expMap,
  logMap,
  nlerp,
  normalise,
  relative,
  rotateVector,
  slerp,
  squad,
} from '@slewcurve/core';
import { expect, test } from 'vitest';

const a = Float64Array.of(0.1, 0.2, 0.3, Math.sqrt(1 - 0.14));
const b = Float64Array.of(-0.5, 0.5, 0.5, 0.5);
const out = new Float64Array(4);

/**
 * Bytes that 50,000 calls leave on the heap, the least of twenty tries: other parts of the runner allocate now and then, and code that
 * the engine has not compiled yet boxes every number.
 */
function bytesLeft(call: (t: number) => unknown): number {
  for (let i = 0; i < 500_000; i++) call(i / 500_000);
  let least = Infinity;
  for (let attempt = 0; attempt < 20; attempt++) {
    const before = process.memoryUsage().heapUsed;
    for (let i = 0; i < 50_000; i++) call(i / 50_000);
    const grown = process.memoryUsage().heapUsed - before;
    if (grown >= 0) least = Math.min(least, grown);
  }
  return least;
}

test.each([
  ['slerp', (t: number) => slerp(out, a, b, t)],
  ['nlerp', (t: number) => nlerp(out, a, b, t)],
  ['squad', (t: number) => squad(out, a, b, a, b, t)],
  ['logMap', () => logMap(out, a)],
  ['expMap', () => expMap(out, a)],
  ['relative', () => relative(out, a, b)],
  ['normalise', () => normalise(out, a)],
  ['rotateVector', () => rotateVector(out, a, b)],
  ['angleBetween', () => angleBetween(a, b)],
])('%s allocates no object (B24)', (_, call) => {
  // 16 bytes for each number that the engine boxes (t, squad's 2t(1 − t), the answer): 32 were measured at most. An array or an
  // object of four numbers would be 64 and more.
  expect(bytesLeft(call)).toBeLessThan(50_000 * 48);
});
