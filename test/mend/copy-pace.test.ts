import { type RotationTrack, playAs, rotationTrack } from '@slewcurve/core';
import { type Step, applySteps, parseSentence, sayStep } from '@slewcurve/mend';
import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { codeOf } from '../support/edit-acceptance.js';
import { offThePath, repaced, travelled } from '../support/pace-acceptance.js';
import { played } from '../support/pace-tracks.js';
import { type Motion, grid, keyed } from '../support/smooth-track.js';

fc.configureGlobal({ ...fc.readConfigureGlobal(), seed: 5 });
const RUNS = { numRuns: 12, endOnFailure: true };

/** Shares of its angle that a track has turned by 40 even shares of its time. */
function odometer(track: RotationTrack, from: number, to: number): number[] {
  const curve = playAs(track, 'as-written');
  const whole = curve.length(from, to);
  return Array.from({ length: 41 }, (_, i) => curve.length(from, from + (i / 40) * (to - from)) / whole);
}

function ends({ times }: RotationTrack): [number, number] {
  return [times[0], times[times.length - 1]];
}

describe('copy pace', () => {
  it('makes both odometers one curve within 1 %, keys on the path, the time as it was', () => {
    fc.assert(
      fc.property(played, played, (track, given) => {
        fc.pre(travelled(track) > 5 && travelled(given) > 5);
        const other = { ...given, id: 'Other', clip: 'There' };
        const step: Omit<Step, 'clip' | 'track'> = {
          verb: 'copy pace',
          fromTrack: 'Other',
          fromClip: 'There',
        };
        const result = repaced(track, step, { nodes: [], tracks: [track, other], named: [track] });
        expect(result.price.seconds).toBeCloseTo(0, 9);
        expect(offThePath(track, result)).toBeLessThan(0.001);
        const wanted = odometer(other, ...ends(other));
        const own = odometer(result.track, ...ends(track));
        // Within 1 % where the frames hold the new pace at all: the price says where they do not.
        const off = Math.max(...own.map((share, i) => Math.abs(share - wanted[i])));
        expect(result.price.degrees < 0.1 ? off : 0).toBeLessThan(0.01);
      }),
      RUNS,
    );
  });

  it('has the speeds of the other too, frame by frame, within 1 % of the greatest', () => {
    const one: Motion = { spin: [0, 30, 0], swing: [10, 0, 5], hertz: 0.4, phase: 1 };
    const two: Motion = { spin: [0, 10, 5], swing: [25, 10, 0], hertz: 0.5, phase: 2 };
    const track = keyed(one, grid(90), 'LINEAR');
    const other = { ...keyed(two, grid(120, 60), 'LINEAR'), id: 'Other' };
    const { track: after } = repaced(
      track,
      { verb: 'copy pace', fromTrack: 'Other' },
      { nodes: [], tracks: [track, other], named: [track] },
    );
    const [a, b] = [playAs(after, 'as-written'), playAs(other, 'as-written')];
    const scale = (curve: typeof a): number =>
      (curve.end - curve.start) / curve.length(curve.start, curve.end);
    // Over tenths of the time, so that frames of 30 and of 60 Hz see the same.
    for (let tenth = 0; tenth < 10; tenth++) {
      const share = (curve: typeof a): number => {
        const h = (curve.end - curve.start) / 10;
        return (curve.length(curve.start + tenth * h, curve.start + (tenth + 1) * h) / h) * scale(curve);
      };
      expect(Math.abs(share(a) - share(b))).toBeLessThan(0.01 * scale(b) * b.peak(b.start, b.end).rate);
    }
  });

  it('takes a span of its own track too', () => {
    const values = grid(91).flatMap((t) => {
      const angle = t < 1 ? t * t : 2 * t - 1;
      return [0, 0, Math.sin(angle / 2), Math.cos(angle / 2)];
    });
    const track = rotationTrack({ times: grid(91), values });
    const result = repaced(track, { verb: 'copy pace', span: [1, 3], fromSpan: [0, 1] });
    // The first second turns by u²; so does the span now, 4 rad in 2 s: half of it by √2 s, and a frame's chord 1e-3 rad off.
    const curve = playAs(result.track, 'as-written');
    expect(curve.length(1, 3)).toBeCloseTo(4, 9);
    expect(curve.length(1, 1 + Math.SQRT2)).toBeCloseTo(2, 2);
    expect(result.track.times).toEqual(track.times);
  });

  it('runs as a step of a card, and is said and read back', () => {
    const [track] = fc.sample(played, { numRuns: 1, seed: 2 });
    const other = { ...track, id: 'Other' };
    const step = { verb: 'copy pace', clip: track.clip, track: 'Other', fromTrack: track.id || '*' };
    const sentence = { ...step, clip: 'A', fromTrack: 'arm left', fromClip: 'B', fromSpan: [1, 2] as const };
    expect(sayStep(sentence)).toBe(
      'Copy the pace onto all keys of Other in A, from track "arm left", from clip B, from 1 s to 2 s there.',
    );
    expect(parseSentence(sayStep(sentence))).toEqual(sentence);
    const run = (more: object): unknown =>
      applySteps([{ ...track, id: 'One' }, other], [{ ...step, fromTrack: 'One', ...more }]);
    expect(codeOf(() => run({}))).toBeUndefined();
    expect(codeOf(() => run({ fromTrack: 'Nobody' }))).toBe('step.no-other');
    expect(codeOf(() => run({ fromTrack: '*' }))).toBe('step.many-others');
    expect(codeOf(() => run({ fromTrack: undefined }))).toBe('step.needs-other');
  });
});
