import { playAs, rotationTrack, segmentAngle } from '@slewcurve/core';
import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { applied, codeOf } from '../support/edit-acceptance.js';
import { travelled } from '../support/pace-acceptance.js';
import { sparse } from '../support/pace-tracks.js';

fc.configureGlobal({ ...fc.readConfigureGlobal(), seed: 5 });
const RUNS = { numRuns: 15, endOnFailure: true };
const DEGREES = 180 / Math.PI;

describe('whole turns', () => {
  it('turns by θ + 360·N with keys at most 120° apart; old keys stay to the bit', () => {
    fc.assert(
      fc.property(sparse, fc.integer({ min: -4, max: 5 }), (track, turns) => {
        const short = segmentAngle(track, 0) * DEGREES;
        fc.pre(short > 1);
        const { track: after, inserted } = applied(track, { verb: 'whole turns', keys: [1], turns });
        const curve = playAs(after, 'as-written');
        const angle = curve.length(track.times[0], track.times[1]) * DEGREES;
        expect(angle).toBeCloseTo(Math.abs(short + 360 * turns), 2);
        for (const key of inserted) expect(segmentAngle(after, key) * DEGREES).toBeLessThan(120.001);
      }),
      RUNS,
    );
  });

  it('needs an axis where both keys are alike, and turns about it', () => {
    const track = rotationTrack({ times: [0, 3], values: [0, 0, 0, 1, 0, 0, 0, 1] });
    expect(codeOf(() => applied(track, { verb: 'whole turns', keys: [1], turns: 3 }))).toBe(
      'step.needs-axis',
    );
    const { track: after } = applied(track, { verb: 'whole turns', keys: [1], turns: 3, axis: [0, 2, 0] });
    expect(travelled(after)).toBeCloseTo(1080, 6);
    const rate = playAs(after, 'as-written').rate([0, 0, 0], 1, 'own');
    expect(rate[1] * DEGREES).toBeCloseTo(360, 6);
    expect(codeOf(() => applied(track, { verb: 'whole turns', keys: [0], turns: 3, axis: [0, 1, 0] }))).toBe(
      'step.nothing-between',
    );
  });
});
