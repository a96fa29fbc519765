import {
  type RotationTrack,
  angleBetween,
  conjugate,
  keyOrientation,
  multiply,
  playAs,
  relative,
  rotationTrack,
} from '@slewcurve/core';
import { shelfTurn } from '@slewcurve/mend';
import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { applied, codeOf, numbersOf } from '../support/edit-acceptance.js';
import { grid, keyed, motions, turned } from '../support/smooth-track.js';

fc.configureGlobal({ ...fc.readConfigureGlobal(), seed: 2 });

const DEGREES = 180 / Math.PI;
const WAVE = { spin: [20, 35, -10], swing: [25, 10, 15], hertz: 0.4, phase: 1 } as const;
const STILL = { spin: [0, 0, 0], swing: [0, 0, 0], hertz: 0.1, phase: 0 } as const;

function shelf(
  track: RotationTrack,
  key: number,
  degrees: [number, number, number],
  side: 'own' | 'parent',
): RotationTrack {
  const tail = Array.from({ length: track.times.length - key }, (_, i) => key + i);
  return turned(track, tail, degrees, side);
}

function poseOf(track: RotationTrack, key: number): Float64Array {
  return keyOrientation(new Float64Array(4), track, key);
}

/** The turn from a key to the next that the side leaves alone: d·q leaves q_k⁻¹q_{k+1}, q·d leaves q_{k+1}q_k⁻¹. */
function between(of: RotationTrack, key: number, side: 'own' | 'parent'): Float64Array {
  const [from, to] = [poseOf(of, key), poseOf(of, key + 1)];
  return side === 'parent' ? relative(from, from, to) : multiply(to, to, conjugate(from, from));
}

const sides = fc.constantFrom('own' as const, 'parent' as const);
const degrees = fc.double({ min: 1, max: 40, noNaN: true });

describe('re-seat', () => {
  it('takes a shelf back to the motion before it, on the side that it was made', () => {
    fc.assert(
      fc.property(
        motions,
        fc.constantFrom('LINEAR', 'CUBICSPLINE'),
        sides,
        fc.tuple(degrees, degrees, degrees),
        fc.integer({ min: 6, max: 14 }),
        (motion, kind, side, off, key) => {
          const good = keyed(motion, grid(22), kind);
          const { track: after } = applied(shelf(good, key, off, side), {
            verb: 're-seat',
            keys: [key],
            side,
          });
          for (let other = 0; other < 22; other++)
            // What the fit takes of the motion's own roughness at 30 Hz; 2.4e-6° measured over 300 motions.
            expect(angleBetween(poseOf(after, other), poseOf(good, other)) * DEGREES).toBeLessThan(1e-3);
        },
      ),
    );
  });

  it('leaves the relative motion of the whole tail as it is to 1e-10° under both sides, and no key before it changed', () => {
    fc.assert(
      fc.property(motions, sides, fc.tuple(degrees, degrees, degrees), (motion, side, off) => {
        const track = shelf(keyed(motion, grid(24), 'LINEAR'), 11, off, 'own');
        const { track: after, changed } = applied(track, { verb: 're-seat', keys: [11], side });
        expect(changed[0]).toBe(11);
        for (let key = 11; key < 23; key++)
          expect(angleBetween(between(track, key, side), between(after, key, side)) * DEGREES).toBeLessThan(
            1e-10,
          );
      }),
    );
  });

  it('fits the turn that survey fits: a shelf on a still track to the last digits', () => {
    const track = shelf(keyed(STILL, grid(20), 'LINEAR'), 9, [3, -4, 12], 'own');
    [3, -4, 12].forEach((angle, axis) => expect(shelfTurn(track, 9)[axis] * DEGREES).toBeCloseTo(angle, 9));
    const beside = { ...track, values: track.values.map((n, i) => (i >> 2 === 2 ? NaN : n)) };
    expect(shelfTurn(beside, 9)[2] * DEGREES).toBeCloseTo(12, 6);
  });

  it('near an end goes by the rates beside the step', () => {
    const good = keyed({ ...STILL, spin: [0, 30, 0] }, grid(6), 'LINEAR');
    const track = shelf(good, 1, [0, 8, 0], 'own');
    expect(shelfTurn(track, 1)[1] * DEGREES).toBeCloseTo(8, 9);
  });

  it('with a fade leaves later keys as stored and adds the speed of a minimum-jerk step', () => {
    // RULES: 2° over 0.2 s costs 19 deg/s, 12° over 0.5 s 45 deg/s (1.875 times the mean).
    for (const [off, fade, speed] of [
      [2, 0.2, 18.75],
      [12, 0.5, 45],
    ]) {
      const track = shelf(keyed(STILL, grid(480, 240), 'LINEAR'), 120, [0, off, 0], 'own');
      const { track: after, changed } = applied(track, { verb: 're-seat', keys: [120], fade });
      expect(changed.at(-1)).toBeLessThan(120 + fade * 240);
      const peak = playAs(after, 'as-written').peak(0, 2).rate * DEGREES;
      // Mean over one key step of 1/240 s beside the exact peak.
      expect(Math.abs(peak / speed - 1)).toBeLessThan(0.005);
      expect(numbersOf(after, 400)).toEqual(numbersOf(track, 400));
    }
  });

  it('under CUBICSPLINE turns tangents along, the fade in them', () => {
    const good = keyed(WAVE, grid(60), 'CUBICSPLINE');
    const track = shelf(good, 20, [4, 0, 6], 'parent');
    for (const fade of [undefined, 0.8]) {
      const step = { verb: 're-seat', keys: [20], ...(fade !== undefined && { fade }) };
      const { track: after } = applied(track, step);
      const curve = playAs(after, 'as-written');
      for (let key = 21; key < 50; key++) {
        // The rate that the tangents say against the one that the poses beside the key show, deg/s.
        const time = after.times[key];
        const [from, to] = [time - 1e-3, time + 1e-3].map((t) => curve.orientation(new Float64Array(4), t));
        const shown = (angleBetween(from, to) / 2e-3) * DEGREES;
        expect(
          Math.abs(Math.hypot(...curve.rate(new Float64Array(3), time, 'own')) * DEGREES - shown),
        ).toBeLessThan(0.1);
      }
    }
  });

  it('leaves kept keys and those outside the span', () => {
    const track = shelf(keyed(WAVE, grid(20), 'LINEAR'), 8, [0, 10, 0], 'own');
    expect(applied(track, { verb: 're-seat', keys: [8], keep: [12], span: [0, 0.45] }).changed).toEqual([
      8, 9, 10, 11, 13,
    ]);
  });

  it('refuses what it cannot do', () => {
    const track = keyed(WAVE, grid(20), 'LINEAR');
    const code = (rest: object, of: RotationTrack = track): string | undefined =>
      codeOf(() => applied(of, { verb: 're-seat', ...rest }));
    expect(code({})).toBe('step.needs-keys');
    expect(code({ keys: [8, 9] })).toBe('step.one-key');
    expect(code({ keys: [20] })).toBe('step.bad-key');
    expect(code({ keys: [0] })).toBe('step.nothing-between');
    expect(code({ keys: [8] }, rotationTrack({ ...track, breaks: [7] }))).toBe('step.nothing-between');
    expect(code({ keys: [8], span: [0, 0.1] })).toBe('step.nothing-left');
    expect(
      code({ keys: [8] }, { ...track, values: track.values.map((n, i) => (i >> 2 === 8 ? NaN : n)) }),
    ).toBe('step.no-direction');
  });
});
