import { type RotationTrack, angleBetween, keyOrientation, playAs, rotationSpline } from '@slewcurve/core';
import { verbNamed } from '@slewcurve/mend';
import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { codeOf } from '../support/edit-acceptance.js';
import { dense, sparse } from '../support/pace-tracks.js';

fc.configureGlobal({ ...fc.readConfigureGlobal(), seed: 5 });
const RUNS = { numRuns: 15, endOnFailure: true };
const DEGREES = 180 / Math.PI;

function through(track: RotationTrack, step: object): unknown {
  return verbNamed('ease through').apply(track, { verb: 'ease through', clip: '', track: '', ...step });
}

describe('ease through', () => {
  it('passes every key at its time, has no corner left, and stays within 0.01° of the spline', () => {
    fc.assert(
      fc.property(sparse, (track) => {
        fc.pre(track.times.length > 2);
        const {
          track: after,
          inserted,
          added,
        } = verbNamed('ease through').apply(track, {
          verb: 'ease through',
          clip: '',
          track: '',
        });
        expect(after.interpolation).toBe('CUBICSPLINE');
        expect(added).toBe(0);
        expect(after.times.length - inserted.length).toBe(track.times.length);
        const curve = playAs(after, 'as-written');
        for (let key = 0; key < track.times.length; key++)
          expect(
            angleBetween(curve.orientation([], track.times[key]), keyOrientation([], track, key)),
          ).toBeLessThan(1e-9);
        const spline = rotationSpline(track, { kind: 'c2' });
        for (const t of after.times.subarray(1, -1)) {
          const [before, later] = [t - 1e-7, t + 1e-7].map((at) => curve.rate([0, 0, 0], at, 'own'));
          const jump = Math.hypot(...before.map((rate, i) => rate - later[i]));
          // Rate continuous to 1 %, and to what 2e-7 s of acceleration make.
          expect(jump).toBeLessThan(0.01 * Math.hypot(...later) + 1e-3);
        }
        for (let i = 1; i < 60; i++) {
          const t = curve.start + (i / 60) * (curve.end - curve.start);
          expect(angleBetween(curve.orientation([], t), spline.orientation([], t)) * DEGREES).toBeLessThan(
            0.01,
          );
        }
      }),
      RUNS,
    );
  });

  it('refuses what has no corners to take, and a part of a track', () => {
    const [track] = fc.sample(
      dense.filter(({ interpolation }) => interpolation === 'CUBICSPLINE'),
      { numRuns: 1, seed: 1 },
    );
    expect(codeOf(() => through(track, {}))).toBe('step.one-mode');
    const [linear] = fc.sample(sparse, { numRuns: 1, seed: 1 });
    expect(codeOf(() => through(linear, { span: [0, 1] }))).toBe('step.one-mode');
  });
});
