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

/** Bytes that 50,000 calls leave on the heap, the least of ten tries: other parts of the runner allocate now and then. */
function bytesLeft(call: (t: number) => unknown): number {
  for (let i = 0; i < 50_000; i++) call(i / 50_000);
  let least = Infinity;
  for (let attempt = 0; attempt < 10; attempt++) {
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
  // An object of four numbers a call would be 2.4 MB; a boxed number (16 bytes, when the engine boxes t or the answer) 0.8 MB.
  expect(bytesLeft(call)).toBeLessThan(1_700_000);
});
