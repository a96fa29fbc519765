import * as fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { parsePatchPlan, patchPlanJson, type StoredPatchPlan } from '@slewcurve/formats';

const HASH = 'ab'.repeat(32);
const stored = (ranges: StoredPatchPlan['plan']['ranges']): StoredPatchPlan => ({
  for: { file: 'walk.glb', sha256: HASH },
  resultSha256: 'cd'.repeat(32),
  plan: { ranges, size: 99 },
});
const sound: object = JSON.parse(
  patchPlanJson(stored([{ at: 1, length: 2, bytes: Uint8Array.of(1, 2), what: 'x' }])),
);

describe('a stored patch plan', () => {
  test('reads back as it was written, whatever its bytes', () => {
    fc.assert(
      fc.property(fc.array(fc.uint8Array({ maxLength: 7000 }), { maxLength: 3 }), (parts) => {
        const plan = stored(parts.map((bytes, at) => ({ at, length: 1, bytes, what: `part ${at}` })));
        expect(parsePatchPlan(patchPlanJson(plan))).toEqual(plan);
      }),
    );
  });

  test('spells bytes as Node spells base64', () => {
    const bytes = Uint8Array.from({ length: 256 }, (_, i) => i);
    const json: { ranges: { bytes: string }[] } = JSON.parse(
      patchPlanJson(stored([{ at: 0, length: 0, bytes, what: '' }])),
    );
    expect(json.ranges[0].bytes).toBe(Buffer.from(bytes).toString('base64'));
  });

  test.each<[string, string, string]>([
    ['text that is no JSON', '{', 'plan.not-json'],
    ['a list', '[]', 'plan.not-json'],
    ['another version', JSON.stringify({ ...sound, schemaVersion: 2 }), 'plan.version'],
    ['no hash', JSON.stringify({ ...sound, for: { file: 'a' } }), 'plan.bad-member'],
    ['no result', JSON.stringify({ ...sound, result: 5 }), 'plan.bad-member'],
    ['ranges that are no list', JSON.stringify({ ...sound, ranges: {} }), 'plan.bad-member'],
    [
      'a range before byte 0',
      JSON.stringify({ ...sound, ranges: [{ at: -1, length: 0, bytes: '' }] }),
      'plan.bad-member',
    ],
    ['a range of no length', JSON.stringify({ ...sound, ranges: [{ at: 1, bytes: '' }] }), 'plan.bad-member'],
    [
      'bytes that are no base64',
      JSON.stringify({ ...sound, ranges: [{ at: 1, length: 0, bytes: 'A' }] }),
      'plan.bad-member',
    ],
    [
      'bytes that are missing',
      JSON.stringify({ ...sound, ranges: [{ at: 1, length: 0 }] }),
      'plan.bad-member',
    ],
    [
      'ranges that descend',
      JSON.stringify({ ...sound, ranges: [5, 1].map((at) => ({ at, length: 0, bytes: '' })) }),
      'plan.bad-range',
    ],
  ])('is refused with %s', (_, text, code) => {
    expect(() => parsePatchPlan(text)).toThrow(expect.objectContaining({ code }));
  });
});
