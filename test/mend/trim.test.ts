import { angleBetween, playAs, replaceTrack } from '@slewcurve/core';
import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { applied, codeOf, numbersOf } from '../support/edit-acceptance.js';
import { smoothTracks } from '../support/smooth-track.js';
import { turningTrack } from '../support/turning-track.js';

fc.configureGlobal({ ...fc.readConfigureGlobal(), seed: 19 });

const track = replaceTrack(
  turningTrack((k) => 3 * k, 20),
  { breaks: [0, 7, 18] },
);

/** The code of what trimming some keys throws. */
const code = (keys?: number[]): string | undefined =>
  codeOf(() => applied(track, { verb: 'trim', ...(keys && { keys }) }));

describe('trim', () => {
  it('drops keys at both ends; all others keep times, numbers and cuts', () => {
    const { track: after, dropped, oldKeys, added } = applied(track, { verb: 'trim', keys: [19, 0, 1] });
    expect(dropped).toEqual([0, 1, 19]);
    expect(oldKeys?.slice(0, 3)).toEqual([2, 3, 4]);
    expect([...after.times]).toEqual([...track.times.subarray(2, 19)]);
    for (let k = 0; k < 17; k++) expect(numbersOf(after, k)).toEqual(numbersOf(track, k + 2));
    expect(after.breaks).toEqual([5]);
    expect(added).toBeCloseTo(-3 / 30, 12);
  });

  it('holds the new first pose where the old one was, and plays the rest as before', () => {
    fc.assert(
      fc.property(smoothTracks, fc.integer({ min: 1, max: 4 }), (any, count) => {
        const keys = Array.from({ length: count }, (_, k) => k);
        const { track: after } = applied(any, { verb: 'trim', keys });
        const [was, is] = [any, after].map((one) => playAs(one, 'as-written'));
        const last = any.times.length - 1;
        for (const share of [0, 0.3, 0.7, 1]) {
          const t = any.times[count] + share * (any.times[last] - any.times[count]);
          expect(angleBetween(was.orientation([0, 0, 0, 1], t), is.orientation([0, 0, 0, 1], t))).toBe(0);
        }
        const first = is.orientation([0, 0, 0, 1], any.times[count]);
        expect(angleBetween(is.orientation([0, 0, 0, 1], any.times[0]), first)).toBe(0);
      }),
    );
  });

  it('keeps kept keys and what lies outside the span', () => {
    expect(applied(track, { verb: 'trim', keys: [0, 1, 2], span: [0, 0.05] }).dropped).toEqual([0, 1]);
    expect(codeOf(() => applied(track, { verb: 'trim', keys: [0, 1, 2], keep: [0] }))).toBe(
      'step.not-at-end',
    );
  });

  it('says what to do where it cannot be applied', () => {
    expect(code()).toBe('step.needs-keys');
    expect(code([5])).toBe('step.not-at-end');
    expect(code([20])).toBe('step.bad-key');
    expect(code(Array.from({ length: 20 }, (_, k) => k))).toBe('step.nothing-left');
  });
});
