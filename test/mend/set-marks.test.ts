import { angleBetween, playAs } from '@slewcurve/core';
import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { codeOf } from '../support/edit-acceptance.js';
import { offThePath, repaced } from '../support/pace-acceptance.js';
import { played, sparse } from '../support/pace-tracks.js';

fc.configureGlobal({ ...fc.readConfigureGlobal(), seed: 5 });
const RUNS = { numRuns: 15, endOnFailure: true };
const DEGREES = 180 / Math.PI;

describe('set marks', () => {
  it('puts each mark within half a frame, here within 0.05°, and never runs back', () => {
    const share = fc.double({ min: 0.1, max: 0.9, noNaN: true });
    fc.assert(
      fc.property(played, share, share, (track, from, to) => {
        const { times } = track;
        const place = (u: number): number => times[0] + u * (times[times.length - 1] - times[0]);
        const old = playAs(track, 'as-written');
        fc.pre(old.length(times[0], place(from)) > 0.01 && old.length(place(from), old.end) > 0.01);
        const result = repaced(track, { verb: 'set marks', marks: [[place(from), place(to)]] });
        const now = playAs(result.track, 'as-written');
        const wanted = old.orientation([], place(from));
        // Half a frame at 30 frames a second, at the speed there.
        const [early, late] = [place(to) - 1 / 60, place(to) + 1 / 60];
        const most = now.length(early, late) * DEGREES + 0.05;
        expect(angleBetween(now.orientation([], place(to)), wanted) * DEGREES).toBeLessThan(most);
        expect(offThePath(track, result)).toBeLessThan(0.001);
        let before = -Infinity;
        for (const time of result.track.times) {
          const at = result.repaced.retiming.oldTime(time);
          expect(at).toBeGreaterThanOrEqual(before);
          before = at;
        }
      }),
      RUNS,
    );
    const [track] = fc.sample(sparse, { numRuns: 1, seed: 3 });
    expect(codeOf(() => repaced(track, { verb: 'set marks' }))).toBe('step.needs-marks');
    expect(codeOf(() => repaced(track, { verb: 'set marks', marks: [[99, 1]] }))).toBe('pace.bad-marks');
  });
});
