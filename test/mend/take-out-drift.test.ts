import { angleBetween, expMap, keyOrientation, multiply, playAs, replaceTrack } from '@slewcurve/core';
import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { between, captured, moved, panTilt } from '../support/captured.js';
import { applied, codeOf, numbersOf } from '../support/edit-acceptance.js';
import { smoothTracks } from '../support/smooth-track.js';

fc.configureGlobal({ ...fc.readConfigureGlobal(), seed: 13 });

const DEGREES = 180 / Math.PI;

/** A pose that turns by 0.25 deg/s about a slanting own axis. */
function drifting(t: number): Float64Array {
  const turn = [0.1, 1, 0.2].map((part) => (0.25 * t * part) / (DEGREES * Math.hypot(0.1, 1, 0.2)));
  return multiply(new Float64Array(4), panTilt(40, 20), expMap(new Float64Array(4), turn));
}

/** Degrees between two keys. */
function net(track: ReturnType<typeof captured>, a: number, b: number): number {
  const [p, q] = [a, b].map((key) => keyOrientation(new Float64Array(4), track, key));
  return angleBetween(p, q) * DEGREES;
}

const goesOn = (t: number): Float64Array => {
  const turned = panTilt(moved(t, 10, 14, 90), 0);
  return multiply(new Float64Array(4), turned, drifting(Math.min(t, 10)));
};

describe('take out drift', () => {
  const track = captured(drifting, { keys: 600, rate: 30 });

  // EDITS: net turn at most 0.05°.
  it('leaves no net turn in a whole track, and keeps its first pose', () => {
    expect(net(track, 0, 599)).toBeCloseTo(4.99, 2);
    const { track: after, largest } = applied(track, { verb: 'take out drift' });
    expect(net(after, 0, 599)).toBeLessThan(1e-6);
    expect(numbersOf(after, 0)).toEqual(numbersOf(track, 0));
    expect(largest).toBeCloseTo(4.99, 2);
    const { track: late } = applied(track, { verb: 'take out drift', anchor: 'end' });
    expect(net(late, 0, 599)).toBeLessThan(1e-6);
    expect(numbersOf(late, 599)).toEqual(numbersOf(track, 599));
  });

  it('is not tilted by noise on single keys', () => {
    const noisy = captured(drifting, { keys: 600, rate: 30, grain: 0.2, seed: 3 });
    const { track: after } = applied(noisy, { verb: 'take out drift' });
    const still = captured(drifting, { keys: 600, rate: 30 });
    const clean = applied(still, { verb: 'take out drift' }).track;
    // Line against line: 0.2° of noise over 600 keys tilts it by 0.2·√12/√600 = 0.03° from end to end, an axis.
    const tilt = (key: number): number =>
      net(noisy, key, key) + Math.abs(between(after, noisy)[key] - between(clean, still)[key]);
    expect(tilt(599)).toBeLessThan(0.08);
  });

  it('keeps what goes on beyond the span, and pays the drift back within it', () => {
    const span = [5, 15] as const;
    const { track: both } = applied(track, { verb: 'take out drift', span });
    expect(net(both, 0, 599)).toBe(net(track, 0, 599));
    // Two seconds at each end are the shoulders: between them it stands.
    expect(net(both, 211, 389)).toBeLessThan(1e-6);
    const { track: start } = applied(track, { verb: 'take out drift', span, anchor: 'start', shoulders: 1 });
    expect(net(start, 150, 419)).toBeLessThan(1e-6);
    const { track: end } = applied(track, { verb: 'take out drift', span, anchor: 'end', shoulders: 1 });
    expect(net(end, 181, 450)).toBeLessThan(1e-6);
    // What is paid back in a second goes at up to 15/8 of its mean, and never in one step.
    const curve = playAs(start, 'as-written');
    expect(curve.peak(14, 15).rate * DEGREES).toBeLessThan(1.9 * 2.5);
    expect(curve.peak(0, 14).rate * DEGREES).toBeLessThan(0.26);
  });

  it('keeps the end beside which motion goes on where nothing else is said', () => {
    const shot = captured(goesOn, { keys: 600, rate: 30 });
    const { track: after } = applied(shot, { verb: 'take out drift', span: [0, 10] });
    expect(net(after, 0, 300)).toBeLessThan(1e-6);
    expect(numbersOf(after, 300)).toEqual(numbersOf(shot, 300));
    expect(playAs(after, 'as-written').peak(0, 10).rate * DEGREES).toBeLessThan(1e-3);
  });

  it('turns the tangents of a CUBICSPLINE along', () => {
    const values = Array.from(track.times).flatMap((t) => {
      const tangent = drifting(t + 1e-4).map((part, i) => (part - drifting(t - 1e-4)[i]) / 2e-4);
      return [...tangent, ...drifting(t), ...tangent];
    });
    const cubic = replaceTrack(track, { values: Float64Array.from(values), interpolation: 'CUBICSPLINE' });
    const { track: after } = applied(cubic, { verb: 'take out drift' });
    const curve = playAs(after, 'as-written');
    // The tangents' own central difference is good to 1e-5.
    expect(curve.peak(0, 19).rate * DEGREES).toBeLessThan(1e-4);
  });

  it('does what every edit owes on any track', () => {
    fc.assert(
      fc.property(
        smoothTracks,
        fc.constantFrom(undefined, 'start' as const, 'end' as const, 'both' as const),
        fc.uniqueArray(fc.nat(13), { maxLength: 3 }),
        fc.double({ min: 0, max: 1, noNaN: true }),
        (any, anchor, keep, shoulders) => {
          if (any.interpolation === 'STEP') return;
          const last = any.times.length - 1;
          const span = [any.times[1], any.times[last - 2]] as const;
          const step = { verb: 'take out drift', keep, span, shoulders, ...(anchor && { anchor }) };
          expect([undefined, 'step.too-far']).toContain(codeOf(() => applied(any, step)));
        },
      ),
    );
  });

  it('says what to do where it cannot be applied', () => {
    const code = (step: object, on = track): string | undefined =>
      codeOf(() => applied(on, { verb: 'take out drift', ...step }));
    expect(code({ span: [1, 1.01] })).toBe('step.nothing-left');
    expect(code({}, replaceTrack(track, { interpolation: 'STEP' }))).toBe('step.plays-no-turn');
    const spin = captured((t) => panTilt(36 * t, 0), { keys: 400, rate: 30 });
    expect(code({}, spin)).toBe('step.too-far');
  });
});
