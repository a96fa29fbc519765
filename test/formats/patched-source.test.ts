import * as fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import {
  bufferSource,
  checkPatchPlan,
  invertPatchPlan,
  patchedBytes,
  patchedSource,
  type PatchPlan,
  type PatchRange,
} from '@slewcurve/formats';

/** A file and a plan that fits it. */
const patched = fc
  .tuple(
    fc.uint8Array({ maxLength: 60 }),
    fc.array(fc.tuple(fc.nat(9), fc.nat(9), fc.uint8Array({ maxLength: 9 })), { maxLength: 6 }),
  )
  .map(([bytes, steps]): { bytes: Uint8Array; plan: PatchPlan } => {
    const ranges: PatchRange[] = [];
    let end = 0;
    let size = bytes.length;
    for (const [gap, length, added] of steps) {
      if (end + gap + length > bytes.length) break;
      ranges.push({ at: end + gap, length, bytes: added, what: '' });
      end += gap + length;
      size += added.length - length;
    }
    return { bytes, plan: { ranges, size } };
  });

describe('a patch plan', () => {
  test('makes the same file whole and by pieces', async () => {
    await fc.assert(
      fc.asyncProperty(patched, fc.nat(70), fc.nat(20), async ({ bytes, plan }, at, length) => {
        const whole = patchedBytes(bytes, plan);
        // The plain way: from the last range to the first, so that none moves another.
        const expected = plan.ranges.reduceRight(
          (made, range) => [
            ...made.slice(0, range.at),
            ...range.bytes,
            ...made.slice(range.at + range.length),
          ],
          [...bytes],
        );
        expect([...whole]).toEqual(expected);
        const source = patchedSource(bufferSource(bytes), plan);
        expect(source.size).toBe(whole.length);
        const from = Math.min(at, whole.length);
        const count = Math.min(length, whole.length - from);
        expect([...(await source.read(from, count))]).toEqual(expected.slice(from, from + count));
      }),
    );
  });

  test('turned round gives the old file back', async () => {
    await fc.assert(
      fc.asyncProperty(patched, async ({ bytes, plan }) => {
        const back = await invertPatchPlan(bufferSource(bytes), plan);
        expect([...patchedBytes(patchedBytes(bytes, plan), back)]).toEqual([...bytes]);
      }),
    );
  });

  test.each<[string, PatchRange[], number]>([
    ['reaches beyond the file', [{ at: 3, length: 2, bytes: new Uint8Array(2), what: '' }], 4],
    ['overlaps itself', [0, 1].map((at) => ({ at, length: 2, bytes: new Uint8Array(2), what: '' })), 4],
    ['descends', [2, 0].map((at) => ({ at, length: 1, bytes: new Uint8Array(1), what: '' })), 4],
    ['starts before the file', [{ at: -1, length: 1, bytes: new Uint8Array(1), what: '' }], 4],
    ['starts between bytes', [{ at: 0.5, length: 1, bytes: new Uint8Array(1), what: '' }], 4],
    ['says another size than it makes', [{ at: 0, length: 1, bytes: new Uint8Array(3), what: '' }], 4],
  ])('that %s is refused', (_, ranges, size) => {
    expect(() => checkPatchPlan({ ranges, size }, 4)).toThrow(
      expect.objectContaining({ code: 'plan.bad-range' }),
    );
  });
});
