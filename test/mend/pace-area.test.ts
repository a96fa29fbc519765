import { type RotationTrack } from '@slewcurve/core';
import { type Step } from '@slewcurve/mend';
import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { codeOf } from '../support/edit-acceptance.js';
import { type PaceResult, peakOf, repaced, travelled } from '../support/pace-acceptance.js';
import { dense, sparse } from '../support/pace-tracks.js';

fc.configureGlobal({ ...fc.readConfigureGlobal(), seed: 5 });

/** Issue 5: what a pace edit may take from the area under the trace, or add to it. Degrees. */
const AREA = 0.01;

/** Two places, as shares of the time, that the steps are made of. */
const share = fc.double({ min: 0.2, max: 0.8, noNaN: true });
type Made = (track: RotationTrack, a: number, b: number) => Omit<Step, 'clip' | 'track'>;

const steps: readonly (readonly [string, Made])[] = [
  ['cap', (track, a) => ({ verb: 'cap', rate: peakOf(track) * a })],
  ['hold, stopping dead', (track, a) => ({ verb: 'hold', at: place(track, a), seconds: 0.5 })],
  [
    'hold, with shoulders',
    (track, a) => ({ verb: 'hold', at: place(track, a), seconds: 0.5, shoulders: 0.2 }),
  ],
  ['set marks', (track, a, b) => ({ verb: 'set marks', marks: [[place(track, a), place(track, b)]] })],
  ['copy pace', () => ({ verb: 'copy pace', fromTrack: 'Other', fromClip: 'There' })],
  ['match', (track, a) => ({ verb: 'match', at: keyNear(track, a), shoulders: 0.4 })],
  [
    'shape, time running',
    (track, a, b) => ({
      verb: 'shape',
      at: place(track, a),
      by: 80 * (b - 0.5),
      reach: place(track, 0.2) - place(track, 0),
      ends: 'run',
    }),
  ],
];

describe.each(steps)('the area under the trace of %s', (_, made) => {
  it('is the same on any sparse track, as stored', () => {
    over(sparse, 10, made, {}, (track, { track: after }) => {
      expect(Math.abs(travelled(after) - travelled(track))).toBeLessThan(AREA);
    });
  });

  it('is the same on any dense track stored as cubics', () => {
    over(dense, 5, made, { store: 'cubic' }, (track, { track: after }) => {
      expect(Math.abs(travelled(after) - travelled(track))).toBeLessThan(AREA);
    });
  });

  it('is the same on a dense track at its frames where they hold the new pace; chords never add to it', () => {
    over(dense, 5, made, {}, (track, { track: after, price }) => {
      const more = travelled(after) - travelled(track);
      // Frames cut the bends of the path: what that may take is told before, as degrees off the path.
      expect(price.degrees < 0.005 ? Math.abs(more) : 0).toBeLessThan(AREA);
      expect(track.interpolation === 'LINEAR' ? more : 0).toBeLessThan(AREA);
    });
  });
});

/** Runs a step over random tracks; those where nothing can be borrowed, or nothing turns, say so and are passed over. */
function over(
  tracks: fc.Arbitrary<RotationTrack>,
  numRuns: number,
  made: Made,
  more: Pick<Step, 'store'>,
  owes: (track: RotationTrack, result: PaceResult) => void,
): void {
  fc.assert(
    fc.property(tracks, tracks, share, share, (track, given, a, b) => {
      const other = { ...given, id: 'Other', clip: 'There' };
      const scene = { nodes: [], tracks: [track, other], named: [track] };
      let result: PaceResult | undefined;
      const code = codeOf(() => (result = repaced(track, { ...made(track, a, b), ...more }, scene)));
      expect([undefined, 'pace.too-little-to-borrow', 'pace.stands-still']).toContain(code);
      fc.pre(result !== undefined);
      if (result) owes(track, result);
    }),
    { numRuns, endOnFailure: true },
  );
}

function place({ times }: RotationTrack, part: number): number {
  return times[0] + part * (times[times.length - 1] - times[0]);
}

/** The time of an inner key, if there is one. */
function keyNear({ times }: RotationTrack, part: number): number {
  const last = times.length - 1;
  return times[Math.max(1, Math.min(last - 1, Math.round(part * last)))];
}
