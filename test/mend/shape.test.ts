import {
  type RotationTrack,
  angleBetween,
  conjugate,
  keyOrientation,
  letAngleGo,
  multiply,
  playAs,
  rotationTrack,
} from '@slewcurve/core';
import { type EditResult, parseSentence, sayStep } from '@slewcurve/mend';
import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { applied, codeOf, numbersOf } from '../support/edit-acceptance.js';
import { offThePath, repaced, travelled } from '../support/pace-acceptance.js';
import { played, sparse } from '../support/pace-tracks.js';

fc.configureGlobal({ ...fc.readConfigureGlobal(), seed: 5 });
const RUNS = { numRuns: 15, endOnFailure: true };
const DEGREES = 180 / Math.PI;

describe('shape', () => {
  it('presses the speed and keeps the area: ends stay, keys lie on the path', () => {
    fc.assert(
      fc.property(
        played,
        fc.double({ min: 0.2, max: 0.8, noNaN: true }),
        fc.double({ min: -40, max: 40, noNaN: true }),
        (track, share, by) => {
          const { times } = track;
          const length = times[times.length - 1] - times[0];
          const step = { verb: 'shape', at: times[0] + share * length, by, reach: length / 5 };
          const code = codeOf(() => repaced(track, step));
          expect([undefined, 'pace.too-little-to-borrow']).toContain(code);
          if (code !== undefined) return;
          const result = repaced(track, step);
          expect(result.price.seconds).toBeCloseTo(0, 9);
          expect(offThePath(track, result)).toBeLessThan(0.001);
          const lost = Math.abs(travelled(result.track) - travelled(track));
          expect(result.price.degrees < 0.005 ? lost : 0).toBeLessThan(0.01);
        },
      ),
      RUNS,
    );
  });

  it('lets time run: pressed up, the span gets shorter', () => {
    const [track] = fc.sample(sparse, { numRuns: 1, seed: 3 });
    const result = repaced(track, { verb: 'shape', at: 0.8, by: 20, reach: 0.3, ends: 'run' });
    expect(result.price.seconds).toBeLessThan(0);
    expect(codeOf(() => repaced(track, { verb: 'shape', at: 0.8 }))).toBe('step.needs-press');
  });
});

describe('shape, drawn', () => {
  it('turns as far as before in the same time, its speed in proportion to the drawing', () => {
    fc.assert(
      fc.property(
        played,
        fc.array(fc.double({ min: 1, max: 90, noNaN: true }), { minLength: 2, maxLength: 6 }),
        (track, drawn) => {
          const { times } = track;
          const length = times[times.length - 1] - times[0];
          fc.pre(travelled(track) > 1);
          const speeds = drawn.map(
            (speed, i) => [times[0] + (length * i) / (drawn.length - 1), speed] as const,
          );
          const result = repaced(track, { verb: 'shape', speeds });
          expect(result.price.seconds).toBeCloseTo(0, 9);
          expect(offThePath(track, result)).toBeLessThan(0.001);
          const lost = Math.abs(travelled(result.track) - travelled(track));
          expect(result.price.degrees < 0.005 ? lost : 0).toBeLessThan(0.01);
          // By the middle of the drawing its own share of the area is turned, as near as frames tell.
          const middle = track.times[0] + length / 2;
          const { retiming } = result.repaced;
          const done = playAs(track, 'as-written').length(times[0], retiming.oldTime(middle)) * DEGREES;
          expect(done / travelled(track)).toBeCloseTo(
            areaUpTo(speeds, middle) / areaUpTo(speeds, Infinity),
            6,
          );
        },
      ),
      RUNS,
    );
  });

  it('refuses a drawing without any speed, and says a drawing in a sentence', () => {
    const [track] = fc.sample(sparse, { numRuns: 1, seed: 3 });
    const still = [
      [0, 0],
      [9, 0],
    ] as const;
    expect(codeOf(() => repaced(track, { verb: 'shape', speeds: still }))).toBe('step.no-speed');
    const step = {
      verb: 'shape',
      clip: 'Walk',
      track: 'Neck',
      speeds: [[0, 10] as const, [1.5, 0] as const],
    };
    expect(sayStep(step)).toBe(
      'Shape the speed of all keys of Neck in Walk, drawn through 10 deg/s at 0 s and 0 deg/s at 1.5 s.',
    );
    expect(parseSentence(sayStep(step))).toEqual(step);
  });
});

/** Trapezoids up to a time. */
function areaUpTo(points: readonly (readonly [number, number])[], time: number): number {
  let area = 0;
  for (let i = 1; i < points.length; i++) {
    const [[t0, v0], [t1, v1]] = [points[i - 1], points[i]];
    const end = Math.min(time, t1);
    if (end > t0) area += ((end - t0) * (2 * v0 + ((v1 - v0) * (end - t0)) / (t1 - t0))) / 2;
  }
  return area;
}

function half(degrees: number): number {
  return degrees / DEGREES / 2;
}

/** Presses and lets the angle go, at a place, and asserts what every edit owes. */
function freed(track: RotationTrack, step: object): EditResult {
  return applied(track, { verb: 'shape', ends: 'go', ...step });
}

describe('shape, letting angle go', () => {
  it('keeps every time and what was before; what follows is the old motion after one turn', () => {
    fc.assert(
      fc.property(
        played,
        fc.double({ min: 0.2, max: 0.8, noNaN: true }),
        fc.double({ min: -40, max: 40, noNaN: true }),
        (track, share, by) => {
          const { times } = track;
          const last = times.length - 1;
          const length = times[last] - times[0];
          const [at, reach] = [times[0] + share * length, length / 6];
          const result = freed(track, { at, by, reach });
          // Outside the press every old key is there at its old time; before it also with its old numbers.
          const [old, now] = [playAs(track, 'as-written'), playAs(result.track, 'as-written')];
          const wanted = letAngleGo(old, { at, reach, by: by / DEGREES });
          for (let key = 0; key <= last; key++) {
            const found = result.track.times.indexOf(times[key]);
            expect(found).toBeGreaterThanOrEqual(0);
            expect(times[key] > at - reach ? [] : numbersOf(result.track, found)).toEqual(
              times[key] > at - reach ? [] : numbersOf(track, key),
            );
          }
          for (const time of result.track.times)
            expect(
              angleBetween(now.orientation([], time), wanted.orientation([], time)) * DEGREES,
            ).toBeLessThan(0.001);
          // One turn about the parent's axes takes every later old pose to the new one.
          const turn = multiply(
            [],
            now.orientation([], now.end),
            conjugate([], old.orientation([], old.end)),
          );
          for (const later of [0.3, 0.6, 0.9].map((part) => at + reach + part * (old.end - at - reach)))
            expect(
              later <= at + reach
                ? 0
                : angleBetween(now.orientation([], later), multiply([], turn, old.orientation([], later))),
            ).toBeLessThan(1e-9);
          // What is turned more or less is the area that was pressed, where the storage holds the press.
          const changed = travelled(result.track) - wanted.length(wanted.start, wanted.end) * DEGREES;
          expect((result.price?.degrees ?? 0) < 0.005 ? Math.abs(changed) : 0).toBeLessThan(0.01);
          expect(result.price?.seconds).toBe(0);
          expect(result.repaced).toBeUndefined();
          expect(result.added).toBe(0);
        },
      ),
      RUNS,
    );
  });

  it('presses a pan of 90° to one of 100°, and what follows is seated anew', () => {
    // 45 deg/s for 2 s, then a tilt of 30° in 1 s; pressed by 20 deg/s with a reach of 0.5 s: 10° more.
    const track = rotationTrack({
      times: [0, 2, 3],
      values: [
        [0, 0, 0],
        [0, 90, 0],
        [30, 90, 0],
      ].flatMap(([x, y]) => {
        const pan = [0, Math.sin(half(y)), 0, Math.cos(half(y))];
        return multiply([], pan, [Math.sin(half(x)), 0, 0, Math.cos(half(x))]);
      }),
    });
    const step = { at: 1, by: 20, reach: 0.5 };
    const { track: after, inserted, largest } = freed(track, step);
    expect(largest).toBeCloseTo(10, 6);
    expect(inserted.length).toBeGreaterThan(20);
    const last = after.times.length - 1;
    const seated = multiply([], keyOrientation([], after, last), conjugate([], keyOrientation([], track, 2)));
    // About the parent's y by 10°: the horizon stays where it was.
    expect(2 * Math.atan2(seated[1], seated[3]) * DEGREES).toBeCloseTo(10, 6);
    expect(Math.hypot(seated[0], seated[2])).toBeLessThan(1e-12);
    const moved = freed(track, { ...step, store: 'move' });
    expect(moved.inserted).toEqual([]);
    expect(moved.price?.degrees).toBeGreaterThan(1);
    const cubic = freed(track, { ...step, store: 'cubic' });
    expect(cubic.track.interpolation).toBe('CUBICSPLINE');
    expect(cubic.price?.degrees).toBeLessThan(0.001);
  });

  it('says so, and reads it back', () => {
    const step = { verb: 'shape', clip: 'A', track: 'B', at: 1, by: 20, reach: 0.5, ends: 'go' as const };
    expect(sayStep(step)).toBe(
      'Shape the speed of all keys of B in A, at 1 s, pressed by 20 deg/s, reaching 0.5 s, letting angle go and re-seating what follows.',
    );
    expect(parseSentence(sayStep(step))).toEqual(step);
  });

  it('refuses to turn a kept key, or where nothing turns, and no other verb lets the angle go', () => {
    const [track] = fc.sample(sparse, { numRuns: 1, seed: 3 });
    const at = track.times[0] + 0.1;
    const last = track.times.length - 1;
    expect(codeOf(() => freed(track, { at, by: 5, reach: 0.1, keep: [last] }))).toBe('step.kept-in-the-way');
    expect(freed(track, { at, by: 5, reach: 0.1, keep: [0] }).inserted.length).toBeGreaterThan(0);
    const still = rotationTrack({ times: [0, 1], values: [0, 0, 0, 1, 0, 0, 0, 1] });
    expect(codeOf(() => freed(still, { at: 0.5, by: 5, reach: 0.1 }))).toBe('pace.no-turn');
    expect(codeOf(() => applied(track, { verb: 'ease in/out', ends: 'go' }))).toBe('step.bad-ends');
  });
});
