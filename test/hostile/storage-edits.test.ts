import { SlewcurveError, playAs, storedTrack, type Interpolation, type RotationTrack } from '@slewcurve/core';
import { verbNamed, type Step } from '@slewcurve/mend';
import * as fc from 'fast-check';
import { describe, expect, test } from 'vitest';

fc.configureGlobal({ ...fc.readConfigureGlobal(), seed: 6 });

const PER_KEY = { STEP: 4, LINEAR: 4, CUBICSPLINE: 12, EULER: 3 } as const;
const number = fc.oneof(
  { weight: 8, arbitrary: fc.double({ min: -1, max: 1, noNaN: true }) },
  fc.constantFrom(0, -0, NaN, Infinity, -Infinity, 1e300, -1e300, 5e-324),
);
const time = fc.oneof(
  { weight: 8, arbitrary: fc.double({ min: -2, max: 2, noNaN: true }) },
  fc.constantFrom(0, 0.5, NaN, Infinity, 1e300, -1e300),
);

/** Tracks of anything: times in no order, numbers that are none, no keys at all. */
const tracks: fc.Arbitrary<RotationTrack> = fc
  .tuple(
    fc.constantFrom<Interpolation>('STEP', 'LINEAR', 'CUBICSPLINE', 'EULER'),
    fc.nat({ max: 6 }),
    fc.boolean(),
  )
  .chain(([interpolation, count, sorted]) =>
    fc
      .tuple(
        fc.array(time, { minLength: count, maxLength: count }),
        fc.array(number, {
          minLength: PER_KEY[interpolation] * count,
          maxLength: PER_KEY[interpolation] * count,
        }),
      )
      .map(([times, values]) =>
        storedTrack({
          times: sorted ? times.toSorted((a, b) => a - b) : times,
          values,
          interpolation,
          ...(interpolation === 'EULER' && { sequence: 'ZXY' }),
        }),
      ),
  );

const STEPS: readonly Omit<Step, 'clip' | 'track'>[] = [
  { verb: 'sort times' },
  { verb: 're-time to grid', fps: 30 },
  { verb: 're-time to grid' },
  { verb: 're-grid', fps: 30 },
  { verb: 're-grid', fps: 30, source: 24 },
  { verb: 'convert', interpolation: 'LINEAR' },
  { verb: 'convert', interpolation: 'CUBICSPLINE' },
  { verb: 'set tangents' },
  { verb: 'unwrap' },
  { verb: 'restate', axes: 'x z -y' },
  { verb: 'mirror', normal: 'x' },
];

/** The edited track, or the track itself where the edit refuses it with a code; anything else is thrown. */
function editedOr(track: RotationTrack, edit: Omit<Step, 'clip' | 'track'>): RotationTrack {
  try {
    return verbNamed(edit.verb).apply(track, { clip: '', track: '', ...edit }).track;
  } catch (error) {
    if (error instanceof SlewcurveError) return track;
    throw error;
  }
}

describe('edits of storage on tracks of anything', () => {
  test.each(STEPS)('%o refuses with a code, or leaves a track that plays', (edit) => {
    fc.assert(
      fc.property(tracks, (track) => {
        const after = editedOr(track, edit);
        const curve = playAs(after, 'as-written');
        expect(Math.hypot(...curve.orientation([0, 0, 0, 1], 0.1))).toBeCloseTo(1, 9);
      }),
      { numRuns: 60 },
    );
  });
});
