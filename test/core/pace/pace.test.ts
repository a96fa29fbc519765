import {
  type Curve,
  EASES,
  type PaceLaw,
  type PacedCurve,
  angleBetween,
  measure,
  pace,
  playAs,
  rampEase,
  rotationSpline,
  turnedAngle,
} from '@slewcurve/core';
import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { differenceFromSlopes } from '../../support/against-samples.js';
import { anyTrack } from '../../support/any-track.js';
import { codeOf } from '../../support/edit-acceptance.js';

fc.configureGlobal({ ...fc.readConfigureGlobal(), seed: 5 });
const RUNS = { numRuns: 5, endOnFailure: true };
const RADIANS = Math.PI / 180;

const tracks = anyTrack(1.5);
/** C² paths and piecewise great arcs. */
const smooth = tracks.map((track) => rotationSpline(track, { kind: 'c2' }));
const arcs = tracks.map((track) => playAs(track, 'short-way'));
const share = fc.double({ min: 0.05, max: 0.95, noNaN: true });

/** Places along a curve's time, off its knots. */
function* timesOf(curve: Curve, count = 24): Generator<number> {
  for (let i = 0; i < count; i++) {
    const t = curve.start + ((i + 0.37) / count) * (curve.end - curve.start);
    if (curve.knots.every((knot) => Math.abs(knot - t) > 2e-3)) yield t;
  }
}

function speedAt(curve: Curve, t: number): number {
  return Math.hypot(...curve.rate([0, 0, 0], t, 'own'));
}

/** What every pace owes: the path at the old time, an area that stays, speeds that are the derivatives. */
function keepsThePath(curve: Curve, paced: PacedCurve): void {
  const { retiming } = paced;
  let before = -Infinity;
  for (const t of timesOf(paced)) {
    const old = retiming.oldTime(t);
    expect(old).toBeGreaterThanOrEqual(before);
    before = old;
    expect(angleBetween(paced.orientation([], t), curve.orientation([], old))).toBe(0);
    // There and back by the other map: where the path rests, old times have no place of their own.
    const moves = Math.min(speedAt(curve, old), speedAt(paced, t)) > 1e-3;
    expect(moves ? Math.abs(retiming.newTime(old) - t) : 0).toBeLessThan(1e-5 * (1 + paced.end));
  }
  expect(retiming.oldTime(paced.end)).toBe(curve.end);
  expect(paced.length(paced.start, paced.end)).toBeCloseTo(curve.length(curve.start, curve.end), 12);
  // The area under the exact speed is that angle: 0.01° asked by the acceptance, 48 places a piece here.
  const area = areaUnder(paced);
  expect(Math.abs(area - paced.length(paced.start, paced.end))).toBeLessThan(0.01 * RADIANS);
  for (const knot of curve.knots)
    expect(
      angleBetween(paced.orientation([], retiming.newTime(knot)), curve.orientation([], knot)),
    ).toBeLessThan(1e-9);
}

/** ∫ speed by Gauss's two points over 24 parts of every piece. */
function areaUnder(curve: Curve): number {
  let area = 0;
  for (let i = 0; i + 1 < curve.knots.length; i++) {
    const gap = (curve.knots[i + 1] - curve.knots[i]) / 24;
    for (let part = 0; part < 24; part++)
      for (const at of [0.5 - 0.5 / Math.sqrt(3), 0.5 + 0.5 / Math.sqrt(3)])
        area += (gap / 2) * speedAt(curve, curve.knots[i] + (part + at) * gap);
  }
  return area;
}

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

describe('pace', () => {
  it('keeps one speed along any path', () => {
    fc.assert(
      fc.property(smooth, (curve) => {
        const paced = pace(curve, { kind: 'constant' });
        keepsThePath(curve, paced);
        const mean = curve.length(curve.start, curve.end) / (curve.end - curve.start);
        for (const t of timesOf(paced)) expect(speedAt(paced, t)).toBeCloseTo(mean, 9);
      }),
      RUNS,
    );
  });

  it('eases with exact rates and accelerations: they are the slopes of what it plays', () => {
    fc.assert(
      fc.property(
        smooth,
        fc.constantFrom(...Object.values(EASES), rampEase({ rise: 0.3 })),
        (curve, ease) => {
          const paced = pace(curve, { kind: 'ease', ease, seconds: 3 });
          keepsThePath(curve, paced);
          const total = curve.length(curve.start, curve.end);
          expect(paced.peak(0, paced.end).rate).toBeCloseTo((ease.peakSpeed * total) / 3, 5);
          // Five points 1e-4 s apart in curves that bend up to some 1000 rad/s⁴, near-stops left out by a wide berth.
          for (const t of timesOf(paced, 15)) {
            const moves = speedAt(curve, paced.retiming.oldTime(t)) > 0.3;
            expect(moves ? differenceFromSlopes(paced, t, 1e-4, 'own') : 0).toBeLessThan(1e-3);
          }
        },
      ),
      RUNS,
    );
  });

  it('turns a steady 90° in 1 s by minimum jerk with the peaks of the tables', () => {
    const steady = playAs(
      {
        ...fc.sample(tracks, 1)[0],
        times: Float64Array.of(0, 1),
        values: Float64Array.of(0, 0, 0, 1, 0, Math.SQRT1_2, 0, Math.SQRT1_2),
      },
      'short-way',
    );
    const { peakRate, peakAcceleration } = measure(
      pace(steady, { kind: 'ease', ease: EASES['minimum-jerk'] }),
    );
    expect(peakRate / RADIANS).toBeCloseTo(90 * 1.875, 9);
    expect(peakAcceleration / RADIANS).toBeCloseTo(90 * 5.773503, 4);
  });

  it('keeps the jump at a corner: v·|Δn| (two 60°/s arcs about square axes: 84.9 deg/s, MATHS 5)', () => {
    const h = Math.sin(Math.PI / 6);
    const corner = playAs(
      {
        ...fc.sample(tracks, 1)[0],
        times: Float64Array.of(0, 1, 2),
        // 60° about x, then 60° about own y.
        values: Float64Array.of(
          0,
          0,
          0,
          1,
          h,
          0,
          0,
          Math.cos(Math.PI / 6),
          h * Math.cos(Math.PI / 6),
          h * Math.cos(Math.PI / 6),
          h * h,
          Math.cos(Math.PI / 6) ** 2,
        ),
      },
      'short-way',
    );
    const paced = pace(corner, { kind: 'constant' });
    expect(measure(paced).worstRateJump / RADIANS).toBeCloseTo(60 * Math.SQRT2, 6);
  });

  it('ramps at both ends from rest to rest and leaves the middle at its pace', () => {
    fc.assert(
      fc.property(smooth, (curve) => {
        const old = curve.end - curve.start;
        const paced = pace(curve, { kind: 'ramps', rise: 0.2 * old, fall: 0.3 * old });
        keepsThePath(curve, paced);
        expect(paced.end - paced.start).toBeCloseTo(1.5 * old, 9);
        expect(speedAt(paced, paced.start)).toBe(0);
        expect(speedAt(paced, paced.end)).toBeCloseTo(0, 9);
        const middle = curve.start + 0.45 * old;
        expect(speedAt(paced, paced.retiming.newTime(middle))).toBeCloseTo(speedAt(curve, middle), 9);
        for (const t of timesOf(paced, 15))
          expect(differenceFromSlopes(paced, t, 1e-4, 'own')).toBeLessThan(1e-3);
        const same = pace(curve, { kind: 'ramps', rise: 0.2 * old, fall: 0.3 * old, seconds: old });
        expect(same.end).toBeCloseTo(curve.end, 12);
        keepsThePath(curve, same);
      }),
      RUNS,
    );
  });

  it('caps the speed to the limit exactly, keeps the rest of the pace, and adds the least time there is', () => {
    fc.assert(
      fc.property(fc.oneof(smooth, arcs), share, (curve, at) => {
        const peak = curve.peak(curve.start, curve.end).rate;
        const rate = peak * at;
        const paced = pace(curve, { kind: 'cap', rate });
        keepsThePath(curve, paced);
        expect(paced.peak(paced.start, paced.end).rate).toBeLessThanOrEqual(rate * (1 + 1e-7));
        for (const t of timesOf(paced)) {
          const old = paced.retiming.oldTime(t);
          expect(speedAt(paced, t)).toBeCloseTo(Math.min(rate, speedAt(curve, old)), 6);
        }
        // ∫ max(0, |ω|/v − 1) dt over a fine grid.
        let least = 0;
        const count = 2000;
        const gap = (curve.end - curve.start) / count;
        for (let i = 0; i < count; i++)
          least += gap * Math.max(0, speedAt(curve, curve.start + (i + 0.5) * gap) / rate - 1);
        // The grid's own error: it cuts the curve's peaks.
        expect(Math.abs(paced.end - curve.end - least)).toBeLessThan(2e-3 * least + 1e-4);
      }),
      RUNS,
    );
  });

  it('caps speed and acceleration, bends included, to 0.5 % on C² paths', () => {
    fc.assert(
      fc.property(smooth, share, share, (curve, ofRate, ofAcceleration) => {
        const before = measure(curve);
        const rate = before.peakRate * ofRate;
        fc.pre(before.peakAcceleration > 0.1);
        const acceleration = before.peakAcceleration * ofAcceleration;
        const paced = pace(curve, { kind: 'cap', rate, acceleration });
        keepsThePath(curve, paced);
        expect(paced.peak(paced.start, paced.end).rate).toBeLessThanOrEqual(rate * 1.000001);
        let most = 0;
        for (let i = 1; i < 300; i++) {
          const t = paced.start + ((i + 0.21) / 301) * (paced.end - paced.start);
          most = Math.max(most, Math.hypot(...paced.acceleration([0, 0, 0], t, 'own')));
        }
        expect(most).toBeLessThanOrEqual(acceleration * 1.005);
        // Never faster than it was.
        for (const t of timesOf(paced))
          expect(speedAt(paced, t)).toBeLessThanOrEqual(
            speedAt(curve, paced.retiming.oldTime(t)) * 1.00001 + 1e-6,
          );
      }),
      RUNS,
    );
  });

  it('takes a straight move at the least time that its limits let: the trapezoid', () => {
    // 90° about one axis; 60 deg/s and 120 deg/s² take 2.0 s, 60 deg/s² 2.5 s (JOB B4).
    const move = rotationSpline(
      {
        ...fc.sample(tracks, 1)[0],
        times: Float64Array.of(0, 0.1),
        values: Float64Array.of(0, 0, 0, 1, 0, Math.SQRT1_2, 0, Math.SQRT1_2),
      },
      { kind: 'c2' },
    );
    const eased = pace(move, { kind: 'ease', ease: EASES['minimum-jerk'] });
    for (const [limit, seconds] of [
      [120, 2],
      [60, 2.5],
    ]) {
      const paced = pace(eased, { kind: 'cap', rate: 60 * RADIANS, acceleration: limit * RADIANS });
      expect(paced.end).toBeGreaterThan(seconds * 0.999);
      expect(paced.end).toBeLessThan(seconds * 1.01);
    }
  });

  it('presses the trace: with the same ends the area stays, and no speed falls below nothing', () => {
    const by = fc.double({ min: -2, max: 2, noNaN: true });
    let taken = 0;
    fc.assert(
      fc.property(fc.oneof(smooth, arcs), share, by, (curve, at, size) => {
        const old = curve.end - curve.start;
        const law: PaceLaw = {
          kind: 'press',
          at: curve.start + at * old,
          reach: old / 5,
          by: size,
          ends: 'same',
        };
        const code = codeOf(() => pace(curve, law));
        expect([undefined, 'pace.too-little-to-borrow']).toContain(code);
        if (code !== undefined) return;
        const paced = pace(curve, law);
        taken++;
        keepsThePath(curve, paced);
        expect(paced.end).toBeCloseTo(curve.end, 12);
        const was = speedAt(curve, law.kind === 'press' ? law.at : 0);
        // At the place itself the trace goes where it is pressed to; on smooth paths to the width of a place.
        expect(speedAt(paced, law.kind === 'press' ? law.at : 0)).toBeCloseTo(Math.max(0, was + size), 1);
      }),
      RUNS,
    );
    expect(taken).toBeGreaterThan(0);
  });

  it('presses the trace and lets time run: the path stays, the time is ∫dS/v*', () => {
    fc.assert(
      fc.property(smooth, share, fc.double({ min: 0.1, max: 2, noNaN: true }), (curve, at, by) => {
        const old = curve.end - curve.start;
        const paced = pace(curve, {
          kind: 'press',
          at: curve.start + at * old,
          reach: old / 5,
          by,
          ends: 'run',
        });
        keepsThePath(curve, paced);
        expect(paced.end).toBeLessThan(curve.end);
      }),
      RUNS,
    );
    expect(
      codeOf(() => {
        const [curve] = fc.sample(arcs, 1);
        pace(curve, { kind: 'press', at: curve.start + 0.01, reach: 1, by: -1e3, ends: 'run' });
      }),
    ).toBe('pace.stands-still');
  });

  it('follows a drawn speed, scaled to the angle that there is', () => {
    fc.assert(
      fc.property(
        smooth,
        fc.array(fc.double({ min: 0, max: 3, noNaN: true }), { minLength: 3, maxLength: 9 }),
        (curve, heights) => {
          fc.pre(heights.some((height) => height > 0.1));
          const old = curve.end - curve.start;
          const times = heights.map((_, i) => (i / (heights.length - 1)) * old);
          const paced = pace(curve, { kind: 'drawn', times, speeds: heights });
          keepsThePath(curve, paced);
          const total = curve.length(curve.start, curve.end);
          const drawn =
            heights.slice(1).reduce((sum, height, i) => sum + (height + heights[i]) / 2, 0) *
            (old / (heights.length - 1));
          expect(speedAt(paced, curve.start + times[1])).toBeCloseTo((heights[1] * total) / drawn, 6);
        },
      ),
      RUNS,
    );
  });

  it('holds: no speed for as long as asked, later times shifted, the pace at both sides as it was', () => {
    fc.assert(
      fc.property(fc.oneof(smooth, arcs), share, fc.constantFrom(0, 0.1), (curve, at, shoulders) => {
        const old = curve.end - curve.start;
        const time = curve.start + at * old;
        const paced = pace(curve, { kind: 'hold', at: time, seconds: 0.75, shoulders: shoulders * old });
        keepsThePath(curve, paced);
        const begins = paced.retiming.newTime(time);
        for (const since of [0.01, 0.3, 0.74]) expect(speedAt(paced, begins + since)).toBe(0);
        const side =
          Math.min(shoulders * old, time - curve.start) + Math.min(shoulders * old, curve.end - time);
        expect(paced.end - curve.end).toBeCloseTo(0.75 + side, 9);
      }),
      RUNS,
    );
  });

  it('puts marks where they are asked, without a jump of the speed and never back', () => {
    fc.assert(
      fc.property(smooth, share, share, share, share, (curve, a, b, c, d) => {
        fc.pre(Math.abs(a - b) > 0.02 && Math.abs(c - d) > 0.02);
        const old = curve.end - curve.start;
        const place = (u: number): number => curve.start + u * old;
        const marks = [
          { old: place(Math.min(a, b)), time: place(Math.min(c, d)) },
          { old: place(Math.max(a, b)), time: place(Math.max(c, d)) },
        ];
        const paced = pace(curve, { kind: 'marks', marks });
        keepsThePath(curve, paced);
        for (const mark of marks)
          expect(
            angleBetween(paced.orientation([], mark.time), curve.orientation([], mark.old)),
          ).toBeLessThan(1e-9);
        const turned = (from: number, to: number): number => paced.length(from, to);
        for (const mark of marks) {
          const [before, after] = [turned(mark.time - 1e-6, mark.time), turned(mark.time, mark.time + 1e-6)];
          expect(Math.abs(before - after)).toBeLessThan(1e-9);
        }
      }),
      RUNS,
    );
  });

  it('changes a span alone: before it nothing, after it the same shifted', () => {
    fc.assert(
      fc.property(fc.oneof(smooth, arcs), share, (curve, at) => {
        const old = curve.end - curve.start;
        const span = [curve.start + 0.3 * at * old, curve.start + (0.3 * at + 0.5) * old] as const;
        const paced = pace(curve, { kind: 'stretch', seconds: 1.7 * (span[1] - span[0]), span });
        keepsThePath(curve, paced);
        const { retiming } = paced;
        for (const t of timesOf(curve)) {
          const wanted =
            t < span[0] ? t : t > span[1] ? t + 0.7 * (span[1] - span[0]) : span[0] + 1.7 * (t - span[0]);
          expect(retiming.newTime(t)).toBeCloseTo(wanted, 12);
          expect(speedAt(paced, wanted)).toBeCloseTo(
            speedAt(curve, t) / (t > span[0] && t < span[1] ? 1.7 : 1),
            6,
          );
        }
      }),
      RUNS,
    );
  });

  it.each<[string, PaceLaw]>([
    ['pace.bad-span', { kind: 'constant', span: [-1, 1] }],
    ['pace.bad-span', { kind: 'constant', span: [1, 1] }],
    ['pace.bad-number', { kind: 'constant', seconds: 0 }],
    ['pace.bad-number', { kind: 'cap', rate: -1 }],
    ['pace.bad-number', { kind: 'cap', rate: 1, acceleration: NaN }],
    ['pace.bad-number', { kind: 'ramps', rise: 50 }],
    ['pace.bad-number', { kind: 'hold', at: 1e6, seconds: 1 }],
    ['pace.bad-press', { kind: 'press', at: 1, reach: 0, by: 1, ends: 'same' }],
    ['pace.bad-marks', { kind: 'marks', marks: [{ old: 1e3, time: 1 }] }],
  ])('refuses with %s what cannot be', (code, law) => {
    const [track] = fc.sample(tracks, 1);
    expect(codeOf(() => pace(playAs(track, 'short-way'), law))).toBe(code);
  });
});
