import type { NumberStore, ReadonlyNumberStore } from '@slewcurve/core';

/** A kernel bound to everything but its output and the stores that it reads. */
export type Kernel = (out: NumberStore, ...inputs: ReadonlyNumberStore[]) => unknown;

/** How far a kernel's answers differ, as the largest difference of one number, over the ways of handing it its stores. */
export interface StoreDifferences {
  /** Answer in a Float64Array against a plain array: 0 is due. */
  float64: number;
  /** Answer from Float32Array inputs into one, against the same rounded inputs in plain arrays: half a float32 ulp of 1 is due. */
  float32: number;
  /** Answer with `out` being an input that is long enough, each in turn, against a separate output: 0 is due. */
  aliased: number;
  /** Largest change of an input that was not the output: 0 is due. Plain inputs are frozen besides, so a write throws. */
  written: number;
}

/**
 * Runs a kernel over plain (frozen) arrays, Float64Array, Float32Array and with its output lying on each input, and reports how
 * far the answers lie apart.
 */
export function storeDifferences(
  kernel: Kernel,
  outLength: number,
  ...inputs: readonly (readonly number[])[]
): StoreDifferences {
  const frozen = inputs.map((input) => Object.freeze([...input]));
  const separate = answer(kernel, outLength, [], frozen);

  const doubles = inputs.map((input) => Float64Array.from(input));
  const inDoubles = answer(kernel, outLength, new Float64Array(outLength), doubles);

  const singles = inputs.map((input) => Float32Array.from(input));
  const fromSingles = answer(
    kernel,
    outLength,
    [],
    singles.map((input) => Array.from(input)),
  );
  const inSingles = answer(kernel, outLength, new Float32Array(outLength), singles);

  let aliased = 0;
  for (let at = 0; at < inputs.length; at++) {
    if (inputs[at].length < outLength) continue;
    const copies = inputs.map((input) => [...input]);
    aliased = Math.max(aliased, largestDifference(answer(kernel, outLength, copies[at], copies), separate));
  }
  return {
    float64: largestDifference(inDoubles, separate),
    float32: largestDifference(inSingles, fromSingles),
    aliased,
    written: Math.max(0, ...doubles.map((input, n) => largestDifference(input, inputs[n]))),
  };
}

function answer(
  kernel: Kernel,
  length: number,
  out: NumberStore,
  inputs: readonly ReadonlyNumberStore[],
): number[] {
  kernel(out, ...inputs);
  return Array.from({ length }, (_, n) => out[n]);
}

function largestDifference(a: ReadonlyNumberStore, b: ReadonlyNumberStore): number {
  let worst = 0;
  for (let n = 0; n < Math.min(a.length, b.length); n++) {
    const difference = Object.is(a[n], b[n]) ? 0 : Math.abs(a[n] - b[n]);
    worst = Number.isNaN(difference) ? Infinity : Math.max(worst, difference);
  }
  return worst;
}
