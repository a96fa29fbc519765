import type { RotationTrack } from '@slewcurve/core';
import * as fc from 'fast-check';
import { anyTrack } from './any-track.js';
import { grid, keyed, motions } from './smooth-track.js';

/** LINEAR tracks of 2 to 7 keys, 0.2 to 2 s apart, steps of up to 86° about any axes. */
export const sparse: fc.Arbitrary<RotationTrack> = anyTrack(1.5);

/** 60 keys at 30 Hz of a smooth motion, LINEAR or CUBICSPLINE. */
export const dense: fc.Arbitrary<RotationTrack> = fc
  .tuple(motions, fc.constantFrom('LINEAR' as const, 'CUBICSPLINE' as const))
  .map(([motion, interpolation]) => keyed(motion, grid(60), interpolation));

/** Tracks that a pace can be given to, sparse and dense. */
export const played: fc.Arbitrary<RotationTrack> = fc.oneof(sparse, dense);
