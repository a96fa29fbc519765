import { angleBetween, keyOrientation, pace, playAs, roundedCorners, rotationTrack } from '@slewcurve/core';
import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { differenceFromSlopes } from '../../support/against-samples.js';
import { anyTrack, oneAxisTrack } from '../../support/any-track.js';

fc.configureGlobal({ ...fc.readConfigureGlobal(), seed: 5 });
const RUNS = { numRuns: 20, endOnFailure: true };
const DEGREES = 180 / Math.PI;

const tracks = anyTrack(1.5).filter(({ times }) => times.length > 2);
const withins = fc.constantFrom(0.02, 0.1, 2);

describe('roundedCorners', () => {
  it('never leaves the arcs by more than allowed, and is off a key by what it says', () => {
    fc.assert(
      fc.property(tracks, withins, (track, within) => {
        const [path, rounded] = [playAs(track, 'as-written'), roundedCorners(track, within / DEGREES)];
        expect([rounded.start, rounded.end]).toEqual([path.start, path.end]);
        for (const { key, off } of rounded.corners) {
          expect(off * DEGREES).toBeLessThanOrEqual(within * (1 + 1e-12));
          const pose = rounded.orientation([], track.times[key]);
          expect(angleBetween(pose, keyOrientation([], track, key))).toBeCloseTo(off, 9);
        }
        // Off the path itself, not off the pose at the same time: nearest over a dense walk about the corner.
        for (let i = 0; i <= 60; i++) {
          const t = path.start + (i / 60) * (path.end - path.start);
          expect(angleBetween(path.orientation([], t), rounded.orientation([], t)) * DEGREES).toBeLessThan(
            within * 1.001,
          );
        }
      }),
      RUNS,
    );
  });

  it('has no direction that jumps: at one speed its rate is continuous, and its slopes are its derivatives', () => {
    fc.assert(
      fc.property(tracks, withins, (track, within) => {
        const rounded = roundedCorners(track, within / DEGREES);
        const even = pace(rounded, { kind: 'constant' });
        for (const knot of even.knots.subarray(1, -1)) {
          const [before, after] = [-1, 1].map((side) => even.rate([0, 0, 0], knot + side * 1e-7, 'own'));
          const acceleration = Math.hypot(...even.acceleration([0, 0, 0], knot, 'own'));
          const jump = Math.hypot(...before.map((part, k) => part - after[k]));
          expect(jump).toBeLessThan(3e-7 * acceleration + 1e-5);
        }
        for (let i = 0; i < rounded.knots.length - 1; i++) {
          const gap = rounded.knots[i + 1] - rounded.knots[i];
          for (const u of [0.2, 0.5, 0.8])
            expect(differenceFromSlopes(rounded, rounded.knots[i] + u * gap, gap * 1e-3, 'own')).toBeLessThan(
              1e-6,
            );
        }
      }),
      RUNS,
    );
  });

  it('has lengths that are the sum of its speeds, from any time to any other', () => {
    const shares = fc.double({ min: 0, max: 1, noNaN: true });
    fc.assert(
      fc.property(tracks, withins, shares, shares, (track, within, a, b) => {
        const rounded = roundedCorners(track, within / DEGREES);
        const [from, to] = [Math.min(a, b), Math.max(a, b)].map((share) => {
          return rounded.start + share * (rounded.end - rounded.start);
        });
        // By midpoints between the knots: off by less than 1e-4 of the whole, and no closed form in it.
        const stops = [from, ...rounded.knots.filter((t) => t > from && t < to), to];
        let sum = 0;
        for (let i = 0; i + 1 < stops.length; i++) {
          const gap = (stops[i + 1] - stops[i]) / 50;
          for (let n = 0; n < 50; n++)
            sum += gap * Math.hypot(...rounded.rate([0, 0, 0], stops[i] + (n + 0.5) * gap, 'own'));
        }
        expect(Math.abs(rounded.length(from, to) - sum)).toBeLessThan(1e-4 * (1 + sum));
      }),
      RUNS,
    );
  });

  it('leaves what is straight, still, cut or not to be rounded as it is', () => {
    const straight = oneAxisTrack([0, 1, 2, 3], [0, 30, 60, 60]);
    expect(roundedCorners(straight, 0.01).corners).toEqual([]);
    // 90° about z, then 90° about x.
    const half = Math.SQRT1_2;
    const values = [0, 0, 0, 1, 0, 0, half, half, 0.5, 0.5, 0.5, 0.5];
    const bent = rotationTrack({ times: [0, 1, 2], values });
    expect(roundedCorners(bent, 0.01).corners.map(({ key }) => key)).toEqual([1]);
    expect(roundedCorners(bent, 0.01, () => false).corners).toEqual([]);
    const cut = rotationTrack({ times: [0, 1, 2], values, breaks: [0] });
    expect(roundedCorners(cut, 0.01).corners).toEqual([]);
    expect(roundedCorners(cut, 0.01).orientation([], 0.5)).toEqual([0, 0, 0, 1]);
    // |Δn| = √2, off = 5/32·√2·δ: 0.01 rad lets δ be 0.0452549.
    const [corner] = roundedCorners(bent, 0.01).corners;
    expect(corner?.off).toBeCloseTo(0.01, 12);
    expect(roundedCorners(bent, 0.01).knots[1]).toBeCloseTo(1 - 0.0452548 / (Math.PI / 2), 6);
    // However much is allowed, a corner takes half of an arc and leaves the rest to the next corner.
    expect([...roundedCorners(bent, 3).knots.subarray(1, -1)]).toEqual([0.5, 1, 1.5]);
  });
});
