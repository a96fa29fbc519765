import { turnedAngle } from '@slewcurve/core';
import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { arcs, share, smooth } from '../../support/keeps-the-path.js';

fc.configureGlobal({ ...fc.readConfigureGlobal(), seed: 5 });
const RUNS = { numRuns: 5, endOnFailure: true };

describe('turnedAngle', () => {
  it('is turned back by its inverse, also where the speed nears nothing', () => {
    fc.assert(
      fc.property(fc.oneof(smooth, arcs), share, (curve, at) => {
        const turned = turnedAngle(curve);
        const angle = at * turned.total;
        const t = turned.timeAt(angle);
        expect(Math.abs(turned.angleAt(t) - angle)).toBeLessThan(1e-12);
        expect(turned.timeAt(turned.total)).toBeLessThanOrEqual(curve.end);
        expect(turned.timeAt(0)).toBe(curve.start);
        expect(turned.angleAt(curve.end + 1)).toBe(turned.total);
      }),
      RUNS,
    );
  });
});
