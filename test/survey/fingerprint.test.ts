import { describe, expect, test } from 'vitest';
import { rotationTrack } from '@slewcurve/core';
import { fnv1a64, surveyTrack } from '@slewcurve/survey';
import { grid, keyed, turned } from '../support/smooth-track.js';

describe('fingerprints', () => {
  // Test vectors of FNV-1a, 64 bit: draft-eastlake-fnv, appendix C.
  test.each([
    ['', 'cbf29ce484222325'],
    ['a', 'af63dc4c8601ec8c'],
    ['foobar', '85944171f73967e8'],
  ])('the hash of %j is %s', (text, hash) => {
    expect(fnv1a64(text)).toBe(hash);
  });

  const smooth = keyed({ spin: [0, 20, 0], swing: [0, 0, 0], hertz: 0.4, phase: 1 }, grid(90), 'LINEAR');
  const popped = turned(smooth, [30, 60], [0, 0, 12]);
  const printsOf = (track: typeof popped) =>
    surveyTrack(track).flatMap(({ fingerprint, occurrences }) => [
      fingerprint,
      ...occurrences.map((place) => place.fingerprint),
    ]);

  test('they are what they were: files beside assets name them', () => {
    expect(printsOf(popped)).toMatchInlineSnapshot(`
      [
        "cc976673bbd2ba3c",
        "bf5bf69743104365",
        "bf5bf69743104365-2",
      ]
    `);
  });

  test('equal places on one track are numbered in the order of keys', () => {
    const { occurrences } = surveyTrack(popped)[0];
    const first = occurrences.find(({ keys }) => keys[0] === 30)!.fingerprint;
    expect(occurrences.find(({ keys }) => keys[0] === 60)!.fingerprint).toBe(`${first}-2`);
  });

  test('a shift of all times, other storage and trimmed keys leave them alone', () => {
    const later = rotationTrack({ ...popped, times: popped.times.map((time) => time + 100) });
    const single = rotationTrack({ ...popped, values: popped.values.map(Math.fround) });
    const trimmed = rotationTrack({
      ...popped,
      times: popped.times.subarray(10),
      values: popped.values.subarray(40),
    });
    for (const track of [later, single, trimmed]) expect(printsOf(track)).toEqual(printsOf(popped));
  });

  test('a re-export that starts two keys earlier keeps every print, its keys and times shifted', () => {
    const early = keyed(
      { spin: [0, 20, 0], swing: [0, 0, 0], hertz: 0.4, phase: 1 - (2 * Math.PI * 0.4 * 2) / 30 },
      grid(92),
      'LINEAR',
    );
    const shifted = turned(early, [32, 62], [0, 0, 12]);
    const keysOf = (track: typeof popped): number[] =>
      surveyTrack(track)[0].occurrences.map(({ keys }) => keys[0]);
    expect(printsOf(shifted)).toEqual(printsOf(popped));
    expect(keysOf(shifted)).toEqual(keysOf(popped).map((key) => key + 2));
  });

  test('another size, clip or track makes others', () => {
    const others = [
      turned(smooth, [30, 60], [0, 0, 14]),
      rotationTrack({ ...popped, id: 'Leg' }),
      rotationTrack({ ...popped, clip: 'Run' }),
    ];
    const all = [popped, ...others].map((track) => surveyTrack(track)[0].occurrences[0].fingerprint);
    expect(new Set(all).size).toBe(4);
  });
});
