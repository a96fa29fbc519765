import { EASES, type Ease, cubicBezierEase, rampEase } from '@slewcurve/core';
import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { codeOf } from '../../support/edit-acceptance.js';

const ALL: readonly Ease[] = [
  ...Object.values(EASES),
  rampEase({ rise: 1 / 3 }),
  rampEase({ rise: 0.5 }),
  rampEase({ rise: 0.2, fall: 0.6 }),
  rampEase({ rise: 1 / 3, corner: 0.5 }),
  rampEase({ rise: 0.3, fall: 0.45, corner: 0.2 }),
  cubicBezierEase(0.25, 0.1, 0.25, 1),
  cubicBezierEase(0.42, 0, 0.58, 1),
];

/** Half of the fourth digit and a little, of a number as a table prints it. */
function digits(table: number): number {
  return table === 0 ? 0 : 5 * 10 ** (Math.floor(Math.log10(table)) - 4);
}

/** Greatest size of `f` on a grid of 20 000 places, ends a millionth inside. */
function most(f: (u: number) => number): number {
  let found = 0;
  for (let i = 0; i <= 20_000; i++)
    found = Math.max(found, Math.abs(f(Math.max(1e-6, Math.min(1 - 1e-6, i / 20_000)))));
  return found;
}

describe('an ease', () => {
  it.each(ALL.map((ease) => [ease.name, ease] as const))(
    '%s goes from 0 to 1, and its speed and acceleration are the derivatives',
    (_, ease) => {
      expect(ease.position(0)).toBe(0);
      expect(ease.position(1)).toBe(1);
      const h = 1e-5;
      for (let i = 1; i < 200; i++) {
        const u = i / 200 + 0.0003;
        if (u > 1 - h || ease.knots.some((knot) => Math.abs(knot - u) < 2 * h)) continue;
        // Central differences: h²·f‴ of error, with third derivatives up to some 1000 here.
        expect((ease.position(u + h) - ease.position(u - h)) / (2 * h)).toBeCloseTo(ease.speed(u), 6);
        expect((ease.speed(u + h) - ease.speed(u - h)) / (2 * h)).toBeCloseTo(ease.acceleration(u), 4);
      }
    },
  );

  // Peaks as cam design's tables print them (MATHS 5). Modified sine 1.76, 5.53, 69.47: a published cam table. The others: the usual handbook values
  // (R. L. Norton, from memory) and, for ramps, motion-control's own closed forms.
  it.each<[Ease, number, number, number]>([
    [EASES.cubic, 1.5, 6, 12],
    [EASES['minimum-jerk'], 1.875, 5.7735, 60],
    [EASES['polynomial-4567'], 2.1875, 7.5132, 52.5],
    [EASES['half-cosine'], 1.5708, 4.9348, 15.503],
    [EASES.cycloid, 2, 6.2832, 39.478],
    [EASES['modified-sine'], 1.7596, 5.528, 69.47],
    [rampEase({ rise: 1 / 3 }), 1.5, 4.5, 0],
    [rampEase({ rise: 0.5 }), 2, 4, 0],
    [rampEase({ rise: 1 / 3, corner: 0.5 }), 1.5, 9, 54],
    // A = 1/((1 − r)(r − j)) and J = A/j with r = 0.4, j = 0.1.
    [rampEase({ rise: 0.4, corner: 0.25 }), 1 / 0.6, 1 / (0.6 * 0.3), 10 / (0.6 * 0.3)],
    // V = 2/(2 − r_a − r_d).
    [rampEase({ rise: 0.1, fall: 0.3 }), 1.25, 12.5, 0],
  ])('$0.name peaks as the tables say', (ease, speed, acceleration, jerk) => {
    expect(Math.abs(ease.peakSpeed - speed)).toBeLessThanOrEqual(digits(speed));
    expect(Math.abs(ease.peakAcceleration - acceleration)).toBeLessThanOrEqual(digits(acceleration));
    expect(Math.abs(ease.peakJerk - jerk)).toBeLessThanOrEqual(digits(jerk));
    // And the functions do what the data say: grid peaks, a grid step short of the top at the most.
    expect(most((u) => ease.speed(u))).toBeCloseTo(ease.peakSpeed, 5);
    expect(most((u) => ease.acceleration(u)) / ease.peakAcceleration).toBeCloseTo(1, 3);
    const h = 1e-5;
    const inside = (u: number): boolean => ease.knots.every((knot) => Math.abs(knot - u) > 3 * h);
    const jerkOf = (u: number): number =>
      inside(u) ? (ease.acceleration(u + h) - ease.acceleration(u - h)) / (2 * h) : 0;
    expect(most(jerkOf) / Math.max(1, ease.peakJerk)).toBeCloseTo(Math.min(1, ease.peakJerk), 2);
  });

  it('starts and stops at rest, but for the constant one and handles that say otherwise', () => {
    for (const ease of ALL) {
      const rests = ease.speed(0) === 0 && Math.abs(ease.speed(1)) < 1e-12;
      expect(rests, ease.name).toBe(ease.jumps !== 'speed');
    }
  });

  it('never runs back, whatever the ramps', () => {
    const share = fc.double({ min: 0.01, max: 0.5, noNaN: true });
    fc.assert(
      fc.property(share, share, fc.double({ min: 0, max: 0.5, noNaN: true }), (rise, fall, corner) => {
        const ease = rampEase({ rise, fall, corner });
        let before = 0;
        let leastStep = Infinity;
        let leastSpeed = Infinity;
        for (let i = 0; i <= 300; i++) {
          const now = ease.position(i / 300);
          leastStep = Math.min(leastStep, now - before);
          leastSpeed = Math.min(leastSpeed, ease.speed(i / 300));
          before = now;
        }
        expect(leastStep).toBeGreaterThanOrEqual(-1e-15);
        expect(leastSpeed).toBeGreaterThanOrEqual(-1e-12);
        expect(before).toBe(1);
      }),
    );
  });

  it('refuses ramps that do not fit', () => {
    for (const ramps of [{ rise: 0 }, { rise: 0.6 }, { rise: 0.2, fall: 0.9 }, { rise: 0.3, corner: 0.6 }])
      expect(codeOf(() => rampEase(ramps))).toBe('ease.bad-ramp');
  });
});

describe('cubicBezierEase', () => {
  // The keywords of W3C CSS Easing Functions Level 1: ease, ease-in, ease-out, ease-in-out.
  it('has the peaks of the standard’s keywords (MATHS 5)', () => {
    const ease = cubicBezierEase(0.25, 0.1, 0.25, 1);
    expect(ease.speed(0)).toBeCloseTo(0.4, 12);
    expect(ease.peakSpeed).toBeCloseTo(2.288, 3);
    expect(ease.peakAcceleration).toBeCloseTo(12.2, 1);
    const easeIn = cubicBezierEase(0.42, 0, 1, 1);
    expect(easeIn.speed(1)).toBeCloseTo(1.7241, 4);
    expect(easeIn.peakSpeed).toBeCloseTo(1.7241, 4);
    expect(easeIn.peakAcceleration).toBe(Infinity);
    const easeInOut = cubicBezierEase(0.42, 0, 0.58, 1);
    expect(easeInOut.peakSpeed).toBeCloseTo(1.7241, 4);
    expect(easeInOut.peakAcceleration).toBeCloseTo(4.438, 3);
    expect(Number.isFinite(easeInOut.peakJerk)).toBe(true);
  });

  it('mirrors ease-out from ease-in', () => {
    const [easeIn, easeOut] = [cubicBezierEase(0.42, 0, 1, 1), cubicBezierEase(0, 0, 0.58, 1)];
    for (let i = 0; i <= 50; i++)
      expect(easeOut.position(i / 50)).toBeCloseTo(1 - easeIn.position(1 - i / 50), 14);
  });

  it('meets the curve’s own points, for any handles', () => {
    const share = fc.double({ min: 0, max: 1, noNaN: true });
    const height = fc.double({ min: -2, max: 3, noNaN: true });
    fc.assert(
      fc.property(share, height, share, height, share, (x1, y1, x2, y2, s) => {
        const at = (p: number, q: number): number =>
          3 * (1 - s) ** 2 * s * p + 3 * (1 - s) * s * s * q + s ** 3;
        const u = at(x1, x2);
        const ease = cubicBezierEase(x1, y1, x2, y2);
        // Where the curve stands upright a rounding of x is worth its cube root in y.
        const slope = Math.abs(ease.speed(u));
        fc.pre(slope < 1e3);
        expect(Math.abs(ease.position(u) - at(y1, y2))).toBeLessThan(1e-11 * (1 + slope));
      }),
    );
  });

  it('holds no NaN at handles of no length and upright ones', () => {
    for (const ease of [
      cubicBezierEase(0, 0, 1, 1),
      cubicBezierEase(0, 0, 0, 0),
      cubicBezierEase(1, 1, 1, 1),
      cubicBezierEase(0, 1, 1, 0),
      cubicBezierEase(1, 0, 0, 1),
      cubicBezierEase(0, 0.5, 0.5, 1),
    ])
      for (const u of [-0.5, 0, 1e-9, 0.25, 0.5, 1 - 1e-9, 1, 1.5])
        for (const number of [ease.position(u), ease.speed(u), ease.acceleration(u)])
          expect(number, `${ease.name} at ${u}`).not.toBeNaN();
    expect(cubicBezierEase(0, 0, 1, 1).acceleration(0.3)).toBe(0);
    expect(cubicBezierEase(0, 1, 1, 0).speed(0)).toBe(Infinity);
  });

  it('goes on along its end tangents outside 0 to 1', () => {
    const ease = cubicBezierEase(0.25, 0.1, 0.5, 1);
    expect(ease.position(-0.5)).toBeCloseTo(-0.2, 14);
    expect(ease.position(1.5)).toBeCloseTo(1, 14);
    // The first handle stands on the start, so the second one tells the direction.
    expect(cubicBezierEase(0, 0, 0.5, 1).position(-0.25)).toBeCloseTo(-0.5, 14);
    // Upright: level.
    expect(cubicBezierEase(0, 1, 0.5, 1).position(-0.25)).toBe(-0);
  });

  it('refuses handles whose x is outside 0 to 1', () => {
    expect(codeOf(() => cubicBezierEase(-0.1, 0, 1, 1))).toBe('ease.bad-handle');
    expect(codeOf(() => cubicBezierEase(0, 0, 1.01, 1))).toBe('ease.bad-handle');
    expect(codeOf(() => cubicBezierEase(0, NaN, 1, 1))).toBe('ease.bad-handle');
  });
});
