import { playAs, rotationTrack, roundedCorners } from '@slewcurve/core';
import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { codeOf, numbersOf } from '../support/edit-acceptance.js';
import { peakOf, repaced, travelled } from '../support/pace-acceptance.js';
import { sparse } from '../support/pace-tracks.js';
import { grid } from '../support/smooth-track.js';

fc.configureGlobal({ ...fc.readConfigureGlobal(), seed: 5 });
const RUNS = { numRuns: 15, endOnFailure: true };
const DEGREES = 180 / Math.PI;

describe('ease in/out', () => {
  it('starts and stops at rest, visits every key of a sparse track to the bit, and peaks as its law says', () => {
    fc.assert(
      fc.property(sparse, (track) => {
        const result = repaced(track, { verb: 'ease in/out' });
        const seconds = track.times[track.times.length - 1] - track.times[0];
        for (let key = 0; key < track.times.length; key++) {
          const at = result.track.times.indexOf(result.repaced.retiming.newTime(track.times[key]));
          expect(numbersOf(result.track, at)).toEqual(numbersOf(track, key));
        }
        const curve = playAs(result.track, 'as-written');
        const { start, end } = curve;
        expect((curve.length(start, start + 1 / 30) * DEGREES) / travelled(track)).toBeLessThan(0.02);
        expect((curve.length(end - 1 / 30, end) * DEGREES) / travelled(track)).toBeLessThan(0.02);
        expect(peakOf(result.track)).toBeLessThan(((1.875 * travelled(track)) / seconds) * 1.001);
        expect(Math.abs(travelled(result.track) - travelled(track))).toBeLessThan(0.01);
      }),
      RUNS,
    );
  });

  it('with shoulders at one end leaves the other end running', () => {
    const track = rotationTrack({
      times: grid(61),
      values: grid(61).flatMap((t) => [0, Math.sin(t / 2), 0, Math.cos(t / 2)]),
    });
    const out = repaced(track, { verb: 'ease in/out', shoulders: 0.5, which: 'out', ends: 'run' });
    expect(out.price.seconds).toBeCloseTo(0.5, 9);
    const rate = (t: number): number =>
      Math.hypot(...playAs(out.track, 'as-written').rate([0, 0, 0], t, 'own'));
    expect(rate(0.01)).toBeCloseTo(1, 6);
    expect(rate(2.49)).toBeLessThan(0.01);
  });

  it('refuses an ease that it does not know, and one that runs back', () => {
    const [track] = fc.sample(sparse, { numRuns: 1, seed: 1 });
    expect(codeOf(() => repaced(track, { verb: 'ease in/out', ease: 'bouncy' }))).toBe('step.unknown-ease');
    expect(codeOf(() => repaced(track, { verb: 'ease in/out', ease: 'cubic-bezier(0.5, -1, 0.5, 2)' }))).toBe(
      'pace.runs-back',
    );
  });

  it('comes to rest at every corner too where asked, each stretch eased in the time that it took', () => {
    fc.assert(
      fc.property(
        sparse.filter(({ times }) => times.length > 2),
        (track) => {
          const result = repaced(track, { verb: 'ease in/out', corners: 'stop' });
          expect(result.price.seconds).toBeCloseTo(0, 9);
          const curve = playAs(result.track, 'as-written');
          const stops = roundedCorners(track, 0.01).corners.map(({ key }) => key);
          for (const [i, key] of stops.entries()) {
            // At the old time, and at rest within a frame of it.
            const time = track.times[key];
            expect(result.track.times).toContain(time);
            const stretch = curve.length(track.times[stops[i - 1] ?? 0], time) * DEGREES;
            expect(curve.length(time - 1 / 60, time) * DEGREES).toBeLessThan(0.02 * stretch + 1e-9);
          }
          expect(codeOf(() => repaced(track, { verb: 'ease in/out', corners: 'stop', shoulders: 0.1 }))).toBe(
            'step.corners',
          );
        },
      ),
      RUNS,
    );
  });
});
