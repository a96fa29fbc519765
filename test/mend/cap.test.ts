import { angleBetween, pace, playAs, rotationTrack, roundedCorners } from '@slewcurve/core';
import { parseSentence, sayStep } from '@slewcurve/mend';
import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { codeOf, numbersOf } from '../support/edit-acceptance.js';
import { offThePath, peakOf, repaced } from '../support/pace-acceptance.js';
import { played, sparse } from '../support/pace-tracks.js';
import { grid } from '../support/smooth-track.js';

fc.configureGlobal({ ...fc.readConfigureGlobal(), seed: 5 });
const RUNS = { numRuns: 12, endOnFailure: true };
const DEGREES = 180 / Math.PI;

/** Sparse tracks with a corner at every inner key, turning fast enough to be slowed. */
const cornered = sparse.filter((track) => {
  const path = playAs(track, 'as-written');
  const corners = roundedCorners(track, 0.01).corners.length;
  const arcs = Array.from(track.times.subarray(1), (time, i) => path.length(track.times[i], time));
  return track.times.length > 2 && corners === track.times.length - 2 && Math.min(...arcs) > 0.1;
});

describe('cap', () => {
  it('brings the speed of any track down to the limit, and adds time', () => {
    fc.assert(
      fc.property(played, fc.double({ min: 0.3, max: 0.95, noNaN: true }), (track, share) => {
        fc.pre(peakOf(track) > 1);
        const rate = peakOf(track) * share;
        const result = repaced(track, { verb: 'cap', rate });
        expect(peakOf(result.track)).toBeLessThanOrEqual(rate * 1.005);
        expect(result.price.seconds).toBeGreaterThan(0);
        expect(offThePath(track, result)).toBeLessThan(0.001);
      }),
      RUNS,
    );
  });

  it('leaves a track that is legal as it is', () => {
    fc.assert(
      fc.property(sparse, (track) => {
        const result = repaced(track, { verb: 'cap', rate: 2 * peakOf(track) + 1 });
        expect(result.changed).toEqual([]);
        expect(result.track).toBe(track);
      }),
      RUNS,
    );
  });

  it('keeps a limit of acceleration on a path with corners: rounded within 0.1°, which the price tells', () => {
    fc.assert(
      fc.property(cornered, fc.constantFrom(undefined, 0.5), (track, within) => {
        const [rate, acceleration] = [25, 60];
        const result = repaced(track, {
          verb: 'cap',
          rate,
          acceleration,
          store: 'cubic',
          ...(within !== undefined && { within }),
        });
        const off = result.price.rounded ?? NaN;
        expect(off).toBeGreaterThan(0);
        expect(off).toBeLessThanOrEqual((within ?? 0.1) * (1 + 1e-9));
        const curve = playAs(result.track, 'as-written');
        const old = playAs(track, 'as-written');
        // Every key is visited within the rounding, and what the cubics are off.
        for (const time of track.times)
          expect(
            angleBetween(
              curve.orientation([], result.repaced.retiming.newTime(time)),
              old.orientation([], time),
            ) * DEGREES,
          ).toBeLessThan(off + 0.001);
        expect(peakOf(result.track)).toBeLessThanOrEqual(rate * 1.005);
      }),
      RUNS,
    );
  });

  it('keeps both limits at every place of the rounded path to 0.5 %', () => {
    fc.assert(
      fc.property(cornered, (track) => {
        const [rate, acceleration] = [25 / DEGREES, 60 / DEGREES];
        const path = roundedCorners(track, 0.1 / DEGREES);
        const paced = pace(path, { kind: 'cap', rate, acceleration });
        for (let i = 0; i + 1 < paced.knots.length; i++)
          for (const u of [0.01, 0.3, 0.7, 0.99]) {
            const t = paced.knots[i] + u * (paced.knots[i + 1] - paced.knots[i]);
            expect(Math.hypot(...paced.rate([0, 0, 0], t, 'own'))).toBeLessThan(rate * 1.005);
            expect(Math.hypot(...paced.acceleration([0, 0, 0], t, 'own'))).toBeLessThan(acceleration * 1.005);
          }
      }),
      RUNS,
    );
  });

  it('stops at each corner where asked: the keys are visited to the bit, and it takes longer', () => {
    fc.assert(
      fc.property(cornered, (track) => {
        const step = { verb: 'cap', rate: 25, acceleration: 60 };
        const stopped = repaced(track, { ...step, corners: 'stop' });
        expect(stopped.price.rounded).toBeUndefined();
        expect(stopped.price.seconds).toBeGreaterThan(repaced(track, step).price.seconds);
        for (let key = 0; key < track.times.length; key++) {
          const at = stopped.track.times.indexOf(stopped.repaced.retiming.newTime(track.times[key]));
          expect(numbersOf(stopped.track, at)).toEqual(numbersOf(track, key));
        }
      }),
      RUNS,
    );
  });

  it('refuses what it cannot take: no rate, a kept corner, noise that no smooth path runs through', () => {
    const [track] = fc.sample(cornered, { numRuns: 1, seed: 1 });
    const step = { verb: 'cap', rate: 5, acceleration: 5 };
    expect(codeOf(() => repaced(track, { verb: 'cap' }))).toBe('step.needs-rate');
    expect(codeOf(() => repaced(track, { ...step, keep: [1] }))).toBe('step.kept-in-the-way');
    expect(codeOf(() => repaced(track, { ...step, keep: [1], corners: 'stop' }))).toBeUndefined();
    const times = grid(30);
    const values = times.flatMap((_, key) => {
      const half = (key % 2 === 0 ? 1 : -1) / DEGREES;
      return key % 3 === 0 ? [Math.sin(half), 0, 0, Math.cos(half)] : [0, Math.sin(half), 0, Math.cos(half)];
    });
    expect(codeOf(() => repaced(rotationTrack({ times, values }), step))).toBe('step.corners');
  });

  it('says what becomes of corners, and reads it back', () => {
    const step = {
      verb: 'cap',
      clip: 'A',
      track: 'B',
      rate: 20,
      acceleration: 40,
      corners: 'round' as const,
      within: 0.2,
    };
    expect(sayStep(step)).toBe(
      'Cap the speed of all keys of B in A, to at most 20 deg/s, to at most 40 deg/s², rounding corners, within 0.2 degrees.',
    );
    expect(parseSentence(sayStep(step))).toEqual(step);
  });
});
