import { playAs, rotationTrack } from '@slewcurve/core';
import { parseSentence, sayStep } from '@slewcurve/mend';
import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { codeOf } from '../support/edit-acceptance.js';
import { offThePath, repaced } from '../support/pace-acceptance.js';
import { played } from '../support/pace-tracks.js';
import { grid } from '../support/smooth-track.js';

fc.configureGlobal({ ...fc.readConfigureGlobal(), seed: 5 });
const RUNS = { numRuns: 12, endOnFailure: true };
const DEGREES = 180 / Math.PI;

/** A turn about z by an angle over time, at 30 Hz. */
function turning(angle: (t: number) => number, breaks: readonly number[] = []) {
  const times = grid(91);
  const values = times.flatMap((t) => [0, 0, Math.sin(angle(t) / 2), Math.cos(angle(t) / 2)]);
  return rotationTrack({ times, values, breaks: [...breaks] });
}

describe('match', () => {
  it('brings both sides of a key to one speed within 2 %, keys on the path, both ends where they were', () => {
    fc.assert(
      fc.property(played, fc.double({ min: 0.2, max: 0.8, noNaN: true }), (track, share) => {
        const { times } = track;
        fc.pre(times.length > 2);
        const at = times[Math.max(1, Math.min(times.length - 2, Math.round(share * (times.length - 1))))];
        const step = { verb: 'match', at, shoulders: 0.4 };
        const code = codeOf(() => repaced(track, step));
        expect([undefined, 'pace.too-little-to-borrow']).toContain(code);
        fc.pre(code === undefined);
        const result = repaced(track, step);
        expect(result.price.seconds).toBeCloseTo(0, 9);
        expect(offThePath(track, result)).toBeLessThan(0.001);
        const { before = NaN, after = NaN } = result.meeting ?? {};
        // Frames hold a bend of the path only so well: where they lose 0.01° the price says so, and the speeds with it.
        const gap = Math.abs(before - after) / Math.max(before, after);
        expect(result.price.degrees < 0.01 ? gap : 0).toBeLessThan(0.02);
      }),
      RUNS,
    );
  });

  it('meets across a cut, and says how far apart the axes are, which no pace can change', () => {
    // 30 deg/s about z up to the cut into 1.5 s, 90 deg/s about x after it.
    const times = grid(91);
    const values = times.flatMap((t) => {
      const half = t < 1.49 ? t * (15 / DEGREES) : (t - 1.5) * (45 / DEGREES);
      return t < 1.49 ? [0, 0, Math.sin(half), Math.cos(half)] : [Math.sin(half), 0, 0, Math.cos(half)];
    });
    const track = rotationTrack({ times, values, breaks: [44] });
    const result = repaced(track, { verb: 'match', at: 1.5 });
    expect(result.meeting?.before).toBeCloseTo(60, 0);
    expect(result.meeting?.after).toBeCloseTo(60, 0);
    expect(result.meeting?.axis).toBeCloseTo(90, 6);
    expect(result.track.breaks).toEqual([44]);
    const met = repaced(track, { verb: 'match', at: 1.5, meet: 45 });
    expect(met.meeting?.before).toBeCloseTo(45, 0);
  });

  it('meets at the seam of a loop, from both its ends', () => {
    const track = turning((t) => t + (t * t) / 6);
    const result = repaced(track, { verb: 'match', at: 3 });
    // 57.3 deg/s at the start and twice that at the end: the mean at both. Frames see the mean over a thirtieth.
    expect(result.meeting?.before).toBeCloseTo(85.9, 0);
    expect(result.meeting?.after).toBeCloseTo(85.9, 0);
    expect(playAs(result.track, 'as-written').length(0, 3)).toBeCloseTo(4.5, 9);
  });

  it("takes the speed of another track's facing end, and lets time run where asked", () => {
    const slow = turning((t) => t / 2);
    const fast = { ...turning((t) => t), id: 'Fast', clip: 'Next' };
    const scene = { nodes: [], tracks: [slow, fast], named: [slow] };
    const from = { fromTrack: 'Fast', fromClip: 'Next' };
    const out = repaced(slow, { verb: 'match', ...from }, scene);
    expect(out.meeting?.before).toBeCloseTo(57.3, 0);
    expect(out.meeting?.after).toBeCloseTo(57.3, 0);
    expect(out.price.seconds).toBe(0);
    const run = repaced(slow, { verb: 'match', ...from, which: 'in', ends: 'run' }, scene);
    expect(run.meeting?.after).toBeCloseTo(57.3, 0);
    expect(run.price.seconds).toBeLessThan(-0.05);
    const curve = playAs(run.track, 'as-written');
    expect(Math.hypot(...curve.rate([0, 0, 0], curve.end - 0.1, 'own')) * DEGREES).toBeCloseTo(28.6, 0);
  });

  it('says so, reads it back, and refuses what cannot be', () => {
    const step = { verb: 'match', clip: 'A', track: 'B', at: 14, meet: 20, shoulders: 0.5 };
    expect(sayStep(step)).toBe(
      'Match the speeds of all keys of B in A, at 14 s, meeting at 20 deg/s, with shoulders of 0.5 s.',
    );
    expect(parseSentence(sayStep(step))).toEqual(step);
    const track = turning((t) => t);
    expect(codeOf(() => repaced(track, { verb: 'match' }))).toBe('step.needs-join');
    expect(codeOf(() => repaced(track, { verb: 'match', at: 1, ends: 'go' }))).toBe('step.bad-ends');
    expect(codeOf(() => repaced(track, { verb: 'match', at: 1, meet: 0, ends: 'run' }))).toBe(
      'pace.stands-still',
    );
    expect(codeOf(() => repaced(track, { verb: 'match', at: 1, meet: 500 }))).toBe(
      'pace.too-little-to-borrow',
    );
    expect(codeOf(() => repaced(track, { verb: 'match', at: 1, shoulders: 0 }))).toBe('pace.bad-match');
  });
});
