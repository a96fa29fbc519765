import { SlewcurveError } from '@slewcurve/core';
import type { PatchPlan, PatchRange } from './patch-plan.js';
import { readRange } from './read-range.js';
import type { Source } from './source.js';

/** A stretch of the new file: bytes of the plan, or bytes of the old file from `from`. */
interface Stretch {
  readonly at: number;
  readonly length: number;
  readonly bytes?: Uint8Array;
  readonly from: number;
}

/**
 * The new file as a source: the plan's bytes where it has ranges, the old file's everywhere else. Nothing is copied before it
 * is read, so a large file never stands in memory whole.
 *
 * @throws SlewcurveError `plan.bad-range` where the plan does not fit the source; `source.short-read` when read
 */
export function patchedSource(source: Source, plan: PatchPlan): Source {
  checkPatchPlan(plan, source.size);
  const stretches = stretchesOf(plan, source.size);
  return {
    size: plan.size,
    read: async (offset, length) => {
      const out = new Uint8Array(length);
      const end = offset + length;
      for (let i = stretchAt(stretches, offset); i < stretches.length; i++) {
        const stretch = stretches[i];
        if (!stretch || stretch.at >= end) break;
        const from = Math.max(offset, stretch.at);
        const to = Math.min(end, stretch.at + stretch.length);
        const skip = from - stretch.at;
        const bytes =
          stretch.bytes?.subarray(skip, skip + to - from) ??
          (await readRange(source, stretch.from + skip, to - from, 'the original'));
        out.set(bytes, from - offset);
      }
      return out;
    },
  };
}

function stretchesOf(plan: PatchPlan, size: number): Stretch[] {
  const stretches: Stretch[] = [];
  let from = 0;
  let at = 0;
  const put = (length: number, bytes?: Uint8Array): void => {
    if (length > 0) stretches.push({ at, length, from, ...(bytes && { bytes }) });
    at += length;
  };
  for (const range of plan.ranges) {
    put(range.at - from);
    put(range.bytes.byteLength, range.bytes);
    from = range.at + range.length;
  }
  put(size - from);
  return stretches;
}

/** The last stretch that starts at or before `offset`. */
function stretchAt(stretches: readonly Stretch[], offset: number): number {
  let low = 0;
  let high = stretches.length - 1;
  while (low < high) {
    const middle = (low + high + 1) >> 1;
    if ((stretches[middle]?.at ?? Infinity) <= offset) low = middle;
    else high = middle - 1;
  }
  return low;
}

/** The new file whole, from the old one whole. Throws as `patchedSource`. */
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

/** The plan that makes the old file from the new one. Throws as `patchedSource`. */
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
