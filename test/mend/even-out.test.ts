import { measure, playAs, segmentAngle } from '@slewcurve/core';
import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { codeOf } from '../support/edit-acceptance.js';
import { offThePath, repaced, travelled } from '../support/pace-acceptance.js';
import { dense, sparse } from '../support/pace-tracks.js';

fc.configureGlobal({ ...fc.readConfigureGlobal(), seed: 5 });
const RUNS = { numRuns: 15, endOnFailure: true };
const DEGREES = 180 / Math.PI;

describe('even out', () => {
  it('keeps every value of a sparse track to the bit and turns at one speed', () => {
    fc.assert(
      fc.property(sparse, (track) => {
        const result = repaced(track, { verb: 'even out' });
        expect(result.track.values).toEqual(track.values);
        expect(result.price.seconds).toBeCloseTo(0, 12);
        const { peakRate, medianRate } = measure(playAs(result.track, 'as-written'));
        expect(peakRate / medianRate).toBeLessThan(1.000001);
        expect(Math.abs(travelled(result.track) - travelled(track))).toBeLessThan(0.01);
      }),
      RUNS,
    );
  });

  it('reads a dense track at its frames: keys on the old path, one speed within 1 %', () => {
    fc.assert(
      fc.property(dense, (track) => {
        fc.pre(travelled(track) > 5);
        const result = repaced(track, { verb: 'even out' });
        expect(result.track.times).toEqual(track.times);
        expect(offThePath(track, result)).toBeLessThan(0.001);
        const mean = travelled(track) / (track.times[59] - track.times[0]);
        const curve = playAs(result.track, 'as-written');
        const off = Array.from(track.times.subarray(1), (time, i) =>
          Math.abs((curve.length(track.times[i], time) * DEGREES * 30) / mean - 1),
        );
        // Chords cut the path where it bends: the worst frame of a hairpin may lose more than the others.
        off.sort((a, b) => a - b);
        expect(off[Math.floor(off.length * 0.9)]).toBeLessThan(0.01);
        // Where frames resolve the bends at the new speed no angle is lost; where they do not, the price says so.
        const lost = Math.abs(travelled(result.track) - travelled(track));
        expect(result.price.degrees < 0.005 ? lost : 0).toBeLessThan(0.01);
      }),
      RUNS,
    );
  });

  it('rounds corners where asked, keys read off the rounded path and the rest at one speed', () => {
    const [track] = fc.sample(
      sparse.filter(
        (one) =>
          one.times.length > 4 &&
          [...one.times.keys()].slice(1).every((key) => segmentAngle(one, key - 1) > 0.3),
      ),
      { numRuns: 1, seed: 3 },
    );
    const result = repaced(track, { verb: 'even out', corners: 'round', within: 1, store: 'cubic' });
    expect(result.price.rounded).toBeLessThanOrEqual(1 + 1e-9);
    // The corners' own bends are warned of; rounded off there is none left.
    expect(repaced(track, { verb: 'even out' }).bends.length).toBeGreaterThan(0);
    expect(result.bends).toEqual([]);
    const { peakRate, medianRate } = measure(playAs(result.track, 'as-written'));
    expect(peakRate / medianRate).toBeLessThan(1.01);
    expect(codeOf(() => repaced(track, { verb: 'even out', corners: 'stop' }))).toBe('step.corners');
  });
});
