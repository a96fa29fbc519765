import {
  alignSigns,
  angleBetween,
  canonical,
  keyOrientation,
  rotationTrack,
  signChanges,
  storedTrack,
  type RotationTrack,
} from '@slewcurve/core';
import * as fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { interpolations, keyed, keyTimes, motions } from '../../support/smooth-track.js';

/** Smooth tracks whose keys are negated at random, tangents along. */
const flippedTracks = fc
  .tuple(motions, keyTimes(), interpolations, fc.array(fc.boolean(), { minLength: 40, maxLength: 40 }))
  .map(([motion, times, interpolation, flips]) => {
    const track = keyed(motion, times, interpolation);
    const size = track.values.length / times.length;
    const values = track.values.map((part, i) => (flips[Math.floor(i / size)] ? -part : part));
    return { track, flipped: rotationTrack({ ...track, values }), flips: flips.slice(0, times.length) };
  });

function same(a: RotationTrack, b: RotationTrack): boolean {
  return a.values.every((part, i) => Object.is(part, b.values[i]));
}

/** Whole turns about y in twelve steps. */
function spin(turns: number): RotationTrack {
  const times = Array.from({ length: 13 }, (_, i) => i);
  const half = (i: number): number => (Math.PI * turns * i) / 12;
  return rotationTrack({ times, values: times.flatMap((i) => [0, Math.sin(half(i)), 0, Math.cos(half(i))]) });
}

describe('alignSigns', () => {
  test('puts every key on the side of the one before and says which it negated, cubic tangents too (B27)', () => {
    fc.assert(
      fc.property(flippedTracks, ({ track, flipped, flips }) => {
        const { track: aligned, negated } = alignSigns(flipped);
        expect(signChanges(aligned)).toEqual([]);
        const due = flips.flatMap((flip, key) => (flip === flips[0] ? [] : [key]));
        expect(negated).toEqual(due);
        const original = flips[0] ? { ...track, values: track.values.map((part) => -part) } : track;
        expect(same(aligned, original)).toBe(true);
      }),
    );
  });

  test('leaves every orientation as it was, writes into no input and shares times (B20)', () => {
    fc.assert(
      fc.property(flippedTracks, ({ flipped }) => {
        const before = Float64Array.from(flipped.values);
        const { track } = alignSigns(flipped);
        expect(flipped.values).toEqual(before);
        expect(track.times).toBe(flipped.times);
        for (let key = 0; key < track.times.length; key++)
          expect(angleBetween(keyOrientation([], track, key), keyOrientation([], flipped, key))).toBe(0);
      }),
    );
  });

  test('gives the track itself back where nothing changes; done twice it changes nothing more', () => {
    fc.assert(
      fc.property(flippedTracks, ({ flipped }) => {
        const { track } = alignSigns(flipped);
        expect(alignSigns(track)).toEqual({ track, negated: [], seamOpposed: false });
      }),
    );
  });

  test('a loop of one full turn ends on the opposite side, and says so; two turns end on the same', () => {
    expect(alignSigns(spin(1), { loop: true })).toMatchObject({ negated: [], seamOpposed: true });
    expect(alignSigns(spin(2), { loop: true })).toMatchObject({ negated: [], seamOpposed: false });
    expect(alignSigns(spin(1))).toMatchObject({ seamOpposed: false });
  });

  test('passes over keys that hold no orientation', () => {
    const values = [0, 0, 0, 1, NaN, 0, 0, 1, 0, 0, 0, 0, 0, 0, 0, -1];
    const { track, negated } = alignSigns(storedTrack({ times: [0, 1, 2, 3], values }));
    expect(negated).toEqual([3]);
    expect([...track.values.subarray(12)]).toEqual([-0, -0, -0, 1]);
    expect(signChanges(storedTrack({ times: [0, 1, 2, 3], values }))).toEqual([3]);
  });

  test('tracks of no, one and two keys, and of angles, come back as they are (B21)', () => {
    for (const values of [[], [0, 0, 0, -1], [0, 0, 0, -1, 0, 0, 1, 0]]) {
      const track = rotationTrack({ times: values.slice(0, values.length / 4).map((_, i) => i), values });
      expect(alignSigns(track, { loop: true }).track).toBe(track);
    }
    const angles = storedTrack({ times: [0, 1], values: [0, 0, 0, 7, 0, 0], interpolation: 'EULER' });
    expect(alignSigns(angles, { loop: true })).toEqual({ track: angles, negated: [], seamOpposed: false });
  });
});

function canonicalValues(track: RotationTrack): Float64Array {
  const values = track.values.slice();
  for (let key = 0; key < track.times.length; key++)
    canonical(values.subarray(4 * key, 4 * key + 4), track.values.subarray(4 * key, 4 * key + 4));
  return values;
}

// NEEDS A23: continuity is of tracks, the canonical side of single poses; the one destroys the other, and gives it back.
describe('canonical poses of a track', () => {
  test('tear a spin through 180° where it passes there; brought to one side it is whole again', () => {
    const torn = rotationTrack({ ...spin(3), values: canonicalValues(spin(3)) });
    // Half turns at 0.5, 1.5 and 2.5 turns; keys stand every quarter turn.
    expect(signChanges(torn)).toHaveLength(3);
    const { track } = alignSigns(torn);
    expect(signChanges(track)).toEqual([]);
    expect([...track.values]).toEqual([...spin(3).values].map((part) => expect.closeTo(part, 15)));
  });

  test('brought to one side are the track that they came from, up to one sign for all', () => {
    const linear = fc.tuple(motions, keyTimes()).map(([motion, times]) => keyed(motion, times, 'LINEAR'));
    fc.assert(
      fc.property(linear, (track) => {
        const { track: whole } = alignSigns(rotationTrack({ ...track, values: canonicalValues(track) }));
        const { track: aligned } = alignSigns(track);
        const sign = Math.sign(whole.values[3] * aligned.values[3]) || 1;
        expect(whole.values.every((part, i) => part === sign * aligned.values[i] || part === 0)).toBe(true);
      }),
    );
  });
});
