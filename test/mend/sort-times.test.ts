import { type RotationTrack, storedTrack } from '@slewcurve/core';
import { verbNamed } from '@slewcurve/mend';
import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { applied, codeOf, numbersOf } from '../support/edit-acceptance.js';
import { grid, keyed, smoothTracks } from '../support/smooth-track.js';

fc.configureGlobal({ ...fc.readConfigureGlobal(), seed: 6 });

const WAVE = { spin: [20, 35, -10], swing: [25, 10, 15], hertz: 0.4, phase: 1 } as const;

/** The track's keys in another order; a key may come twice. */
function reordered(track: RotationTrack, order: readonly number[]): RotationTrack {
  return storedTrack({
    ...track,
    times: order.map((key) => track.times[key]),
    values: order.flatMap((key) => numbersOf(track, key)),
    breaks: [],
  });
}

describe('sort times', () => {
  it('puts shuffled and repeated keys back as they were, every number to the bit, every drop listed', () => {
    const shuffles = smoothTracks.chain((track) => {
      const keys = [...track.times.keys()];
      return fc
        .tuple(fc.shuffledSubarray(keys, { minLength: keys.length }), fc.subarray(keys))
        .map(([order, twice]) => ({ track, order: [...order, ...twice] }));
    });
    fc.assert(
      fc.property(shuffles, ({ track, order }) => {
        const result = applied(reordered(track, order), { verb: 'sort times' });
        expect(result.track.times).toEqual(track.times);
        expect(result.track.values).toEqual(track.values);
        const drops = order.flatMap((key, at) => (order.indexOf(key) < at ? [at] : []));
        expect(result.dropped ?? []).toEqual(drops);
      }),
      { numRuns: 40 },
    );
  });

  it('keeps two keys of one time that differ, in the order in which they stand: which is meant is not its to say', () => {
    const track = storedTrack({ times: [0, 1, 1], values: [0, 0, 0, 1, 0, 0, 1, 0, 1, 0, 0, 0] });
    expect(applied(track, { verb: 'sort times' }).track).toBe(track);
  });

  it('tells 0 from -0 and never drops a key that is kept', () => {
    const track = storedTrack({
      times: [1, 0, 0, 0],
      values: [0, 0, 0, 1, 0, 0, 0, 1, 0, 0, -0, 1, 0, 0, 0, 1],
    });
    const result = applied(track, { verb: 'sort times' });
    expect(result.dropped).toEqual([3]);
    expect(result.oldKeys).toEqual([1, 2, 0]);
    const kept = verbNamed('sort times').apply(track, { verb: 'sort times', clip: '', track: '', keep: [3] });
    expect(kept.oldKeys).toEqual([1, 2, 3, 0]);
  });

  it('takes cuts along and leaves a sorted track the very object', () => {
    const track = storedTrack({ ...keyed(WAVE, grid(6), 'LINEAR'), breaks: [3] });
    expect(applied(track, { verb: 'sort times' }).track).toBe(track);
    const doubled = storedTrack({
      ...track,
      times: [...track.times.subarray(0, 3), ...track.times.subarray(2)],
      values: [...track.values.subarray(0, 12), ...track.values.subarray(8)],
      breaks: [4],
    });
    const result = applied(doubled, { verb: 'sort times' });
    expect(result.dropped).toEqual([3]);
    expect(result.track.breaks).toEqual([3]);
  });

  it('refuses a key without a time, and a span', () => {
    const track = storedTrack({ times: [0, NaN], values: [0, 0, 0, 1, 0, 0, 0, 1] });
    expect(codeOf(() => applied(track, { verb: 'sort times' }))).toBe('step.bad-times');
    const sound = keyed(WAVE, grid(4), 'LINEAR');
    expect(codeOf(() => applied(sound, { verb: 'sort times', span: [0, 1] }))).toBe('step.whole-track');
  });
});
