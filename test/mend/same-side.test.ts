import { alignSigns, angleBetween, playAs, rotationTrack, signChanges } from '@slewcurve/core';
import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { applied, codeOf, numbersOf } from '../support/edit-acceptance.js';
import { grid, keyed, smoothTracks } from '../support/smooth-track.js';

fc.configureGlobal({ ...fc.readConfigureGlobal(), seed: 2 });

const DEGREES = 180 / Math.PI;
const WAVE = { spin: [20, 35, -10], swing: [25, 10, 15], hertz: 0.4, phase: 1 } as const;

/** The track with whole keys negated. */
function negated(track: ReturnType<typeof keyed>, flip: (key: number) => boolean): ReturnType<typeof keyed> {
  const size = track.values.length / track.times.length;
  const values = track.values.map((number, i) => (flip(Math.floor(i / size)) ? -number : number));
  return rotationTrack({ ...track, values });
}

/** A fixed scatter: about half of the keys, in no order that repeats soon. */
const scattered = (key: number): boolean => key > 0 && Math.sin(key * key * 1.37) > 0;

const isFourth = (key: number): boolean => key === 4;

describe('same side', () => {
  it.each(['LINEAR', 'CUBICSPLINE'] as const)(
    'NEEDS A1: gives back a 1,000-key %s track from random sign changes, to 1e-6° and 1e-6 of peak speed',
    (interpolation) => {
      const original = keyed(WAVE, grid(1000), interpolation);
      const flipped = negated(original, scattered);
      expect(signChanges(flipped).length).toBeGreaterThan(300);
      const { track } = applied(flipped, { verb: 'same side' });
      for (const playback of ['as-written', 'raw-chord', 'finite-cubic'] as const) {
        const [was, is] = [playAs(original, playback), playAs(track, playback)];
        const [p, q] = [new Float64Array(4), new Float64Array(4)];
        let worst = 0;
        for (let time = 0; time < was.end; time += 1 / 481)
          worst = Math.max(worst, angleBetween(was.orientation(p, time), is.orientation(q, time)) * DEGREES);
        expect(worst).toBeLessThanOrEqual(1e-6);
        const peak = was.peak(was.start, was.end).rate;
        expect(Math.abs(is.peak(is.start, is.end).rate / peak - 1)).toBeLessThanOrEqual(1e-6);
      }
    },
  );

  it('NEEDS A1: a CUBICSPLINE turn of 10° with a sign change plays 350° at up to 7,873 deg/s, after it 10° at 15 deg/s', () => {
    const half = (5 * Math.PI) / 180;
    const zero = [0, 0, 0, 0];
    const values = [...zero, 0, 0, 0, 1, ...zero, ...zero, 0, 0, -Math.sin(half), -Math.cos(half), ...zero];
    const track = rotationTrack({ times: [0, 1], values, interpolation: 'CUBICSPLINE' });
    const before = playAs(track, 'as-written');
    // Figures of NEEDS section F2, measured there with the formula of glTF 2.0's text.
    expect(before.length(0, 1) * DEGREES).toBeCloseTo(350, 2);
    expect(before.peak(0, 1).rate * DEGREES).toBeCloseTo(7873, -0.5);
    const after = playAs(applied(track, { verb: 'same side' }).track, 'as-written');
    expect(after.length(0, 1) * DEGREES).toBeCloseTo(10, 6);
    expect(after.peak(0, 1).rate * DEGREES).toBeCloseTo(15, 1);
  });

  it('NEEDS A1: a clean track comes back as the very object', () => {
    fc.assert(
      fc.property(smoothTracks, (track) => {
        const result = applied(track, { verb: 'same side' });
        expect(result.track).toBe(track);
        expect(result).toMatchObject({ changed: [], inserted: [], largest: 0, added: 0 });
      }),
    );
  });

  it('leaves every orientation as it is to the bit, and no dot below zero, on whole keys with both tangents', () => {
    fc.assert(
      fc.property(smoothTracks, fc.array(fc.boolean(), { minLength: 40, maxLength: 40 }), (smooth, flips) => {
        const track = negated(smooth, (key) => flips[key]);
        const { track: after, changed, largest } = applied(track, { verb: 'same side' });
        expect(signChanges(after)).toEqual([]);
        expect(changed).toEqual(alignSigns(track).negated);
        expect(largest).toBe(0);
        for (const key of changed)
          expect(numbersOf(after, key)).toEqual(numbersOf(track, key).map((number) => -number));
      }),
    );
  });

  it('says that only a CUBICSPLINE plays otherwise afterwards', () => {
    const linear = applied(negated(keyed(WAVE, grid(9), 'LINEAR'), isFourth), { verb: 'same side' });
    expect(linear.span).toBeUndefined();
    const cubic = applied(negated(keyed(WAVE, grid(9), 'CUBICSPLINE'), isFourth), { verb: 'same side' });
    expect(cubic.span).toEqual([3 / 30, 5 / 30]);
  });

  it('negates listed keys alone, and never kept ones or those outside the span', () => {
    const track = negated(keyed(WAVE, grid(12), 'LINEAR'), (key) => key === 3 || key === 7);
    expect(applied(track, { verb: 'same side', keys: [3] }).changed).toEqual([3]);
    expect(applied(track, { verb: 'same side', keep: [3] }).changed).not.toContain(3);
    expect(applied(track, { verb: 'same side', span: [0.2, 0.3] }).changed).toEqual([7]);
    expect(codeOf(() => applied(track, { verb: 'same side', keys: [3], keep: [3] }))).toBe(
      'step.nothing-left',
    );
    expect(codeOf(() => applied(track, { verb: 'same side', keys: [12] }))).toBe('step.bad-key');
  });

  it('passes over keys that hold no orientation, and takes tracks of no and one key', () => {
    const track = negated(keyed(WAVE, grid(6), 'LINEAR'), (key) => key >= 3);
    const holed = { ...track, values: track.values.map((number, i) => (i >> 2 === 3 ? NaN : number)) };
    const { changed } = applied(holed, { verb: 'same side' });
    expect(changed).toEqual([4, 5]);
    for (const count of [0, 1]) {
      const short = rotationTrack({ times: grid(count), values: count === 0 ? [] : [0, 0, 0, -1] });
      expect(applied(short, { verb: 'same side' }).track).toBe(short);
    }
  });
});
