import { SlewcurveError } from '@slewcurve/core';
import type { PatchPlan, PatchRange } from './patch-plan.js';
import { readRange } from './read-range.js';
import type { Source } from './source.js';

/** Untouched stretches are copied in pieces of this size, so that a large file never stands in memory whole. */
const PIECE = 1 << 20;

/**
 * The new file, piece by piece: the plan's bytes where it has ranges, the old file's everywhere else.
 *
 * @throws SlewcurveError `plan.bad-range` where the plan does not fit the source, `source.short-read`
 */
export async function* applyPatchPlan(source: Source, plan: PatchPlan): AsyncGenerator<Uint8Array, void> {
  checkPatchPlan(plan, source.size);
  let at = 0;
  for (const range of plan.ranges) {
    yield* copied(source, at, range.at);
    if (range.bytes.byteLength > 0) yield range.bytes;
    at = range.at + range.length;
  }
  yield* copied(source, at, source.size);
}

async function* copied(source: Source, from: number, to: number): AsyncGenerator<Uint8Array, void> {
  for (let at = from; at < to; at += PIECE)
    yield await readRange(source, at, Math.min(PIECE, to - at), 'the original');
}

/** The new file whole, from the old one whole. Throws as `applyPatchPlan`. */
export function patchedBytes(original: Uint8Array, plan: PatchPlan): Uint8Array {
  checkPatchPlan(plan, original.byteLength);
  const patched = new Uint8Array(plan.size);
  let from = 0;
  let to = 0;
  const put = (bytes: Uint8Array): void => {
    patched.set(bytes, to);
    to += bytes.byteLength;
  };
  for (const range of plan.ranges) {
    put(original.subarray(from, range.at));
    put(range.bytes);
    from = range.at + range.length;
  }
  put(original.subarray(from));
  return patched;
}

/** The plan that makes the old file from the new one. Throws as `applyPatchPlan`. */
export async function invertPatchPlan(source: Source, plan: PatchPlan): Promise<PatchPlan> {
  checkPatchPlan(plan, source.size);
  const ranges: PatchRange[] = [];
  let shift = 0;
  for (const { at, length, bytes, what } of plan.ranges) {
    const old = await readRange(source, at, length, 'the original');
    ranges.push({ at: at + shift, length: bytes.byteLength, bytes: old.slice(), what });
    shift += bytes.byteLength - length;
  }
  return Object.freeze({ ranges: Object.freeze(ranges), size: source.size });
}

/**
 * Checks that a plan's ranges are ascending, apart and inside a file of `size` bytes, and make a file of the plan's size.
 *
 * @throws SlewcurveError `plan.bad-range`
 */
export function checkPatchPlan(plan: PatchPlan, size: number): void {
  let end = 0;
  let made = size;
  for (const [index, { at, length, bytes }] of plan.ranges.entries()) {
    if (
      !Number.isSafeInteger(at) ||
      !Number.isSafeInteger(length) ||
      length < 0 ||
      at < end ||
      at + length > size
    )
      throw new SlewcurveError(
        'plan.bad-range',
        `Range ${index} of the plan replaces ${length} bytes at ${at}; it must lie between byte ${end} and ${size}. The plan belongs to another file.`,
        { byte: at },
      );
    end = at + length;
    made += bytes.byteLength - length;
  }
  if (made !== plan.size)
    throw new SlewcurveError(
      'plan.bad-range',
      `The plan makes a file of ${made} bytes out of one of ${size}, and says ${plan.size}. It belongs to another file.`,
    );
}
