import { SlewcurveError, TICK_READINGS, angleBetween, playAs, rotationTrack, ticked } from '@slewcurve/core';
import * as fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { oneAxisTrack } from '../../support/any-track.js';
import { grid, keyed, smoothTracks } from '../../support/smooth-track.js';

fc.configureGlobal({ ...fc.readConfigureGlobal(), seed: 6 });

const DEGREES = 180 / Math.PI;
const PAN = { spin: [0, 0, 60], swing: [0, 0, 0], hertz: 1, phase: 0 } as const;

function speeds(curve: ReturnType<typeof ticked>): number[] {
  return Array.from(
    curve.knots.subarray(1),
    (_, i) => Math.hypot(...curve.rate([0, 0, 0], curve.knots[i], 'own')) * DEGREES,
  );
}

describe('ticked', () => {
  test('shows the playback’s own pose at every tick, and the first and last keys', () => {
    fc.assert(
      fc.property(smoothTracks, fc.constantFrom(24, 30, 60, 144), (track, rate) => {
        const [own, seen] = [playAs(track, 'as-written'), ticked(track, 'as-written', rate)];
        expect(seen.start).toBe(own.start);
        expect(seen.end).toBeGreaterThanOrEqual(own.end - 1e-9);
        expect(seen.end).toBeLessThan(own.end + 1 / rate);
        const apart = Array.from(seen.knots, (time) =>
          angleBetween(own.orientation([], time), seen.orientation([], time)),
        );
        expect(Math.max(...apart)).toBeLessThan(1e-12);
      }),
      { numRuns: 40 },
    );
  });

  // RULES pace.comb: 24 to 30 by the nearest frame, 20 % still, the others 75 for 60 deg/s.
  test('24 keys a second at 30 ticks by the nearest key are a comb: 20 % still frames, the others 75 for 60 deg/s; by the arc 60', () => {
    const track = keyed(PAN, grid(121, 24), 'LINEAR');
    const comb = speeds(ticked(track, 'as-written', 30, 'nearest'));
    expect(comb.filter((speed) => speed < 1e-9).length / comb.length).toBeCloseTo(0.2, 1);
    expect(Math.max(...comb)).toBeCloseTo((60 * 30) / 24, 6);
    for (const speed of speeds(ticked(track, 'as-written', 30, 'linear'))) expect(speed).toBeCloseTo(60, 6);
  });

  test('a pop of one frame at 60 keys a second is not seen where no tick meets it', () => {
    const degrees = Array.from({ length: 61 }, (_, key) => (key === 31 ? 40 : 0));
    const track = oneAxisTrack(grid(61, 60), degrees);
    expect(ticked(track, 'as-written', 60).peak(0, 1).rate * DEGREES).toBeCloseTo(2400, 6);
    expect(ticked(track, 'as-written', 30).peak(0, 1).rate * DEGREES).toBeLessThan(1e-6);
  });

  test('a spin of 1,200 rpm at 30 ticks is seen turning back by 120° a tick', () => {
    // RULES turn.lost: 240° seen as −120°.
    const track = oneAxisTrack(
      grid(61, 240),
      Array.from({ length: 61 }, (_, key) => key * 30),
    );
    const seen = ticked(track, 'as-written', 30);
    expect(seen.rate([0, 0, 0], 0, 'own')[2] * DEGREES).toBeCloseTo(-120 * 30, 6);
  });

  test('linear reads cubics by their values alone; across a cut nothing turns', () => {
    const cubic = keyed(PAN, grid(11, 10), 'CUBICSPLINE');
    const flat = rotationTrack({
      ...cubic,
      values: cubic.values.map((part, i) => (i % 12 >= 4 && i % 12 < 8 ? part : 0)),
    });
    const [own, linear] = [ticked(flat, 'as-written', 60), ticked(flat, 'as-written', 60, 'linear')].map(
      speeds,
    );
    expect(Math.max(...own)).toBeGreaterThan(80);
    for (const speed of linear) expect(speed).toBeCloseTo(60, 6);
    const cut = rotationTrack({ ...oneAxisTrack(grid(4, 10), [0, 0, 90, 90]), breaks: [1] });
    for (const reading of TICK_READINGS)
      expect(ticked(cut, 'as-written', 24, reading).peak(0, 1).rate).toBe(0);
  });

  test('no key, one key, and more ticks than anybody has', () => {
    expect(ticked(rotationTrack({ times: [], values: [] }), 'as-written', 30).peak(0, 1).rate).toBe(0);
    const one = rotationTrack({ times: [2], values: [0, 0, 1, 0] });
    for (const reading of TICK_READINGS)
      expect(ticked(one, 'as-written', 30, reading).orientation([0, 0, 0, 1], 5)).toEqual([0, 0, 1, 0]);
    const long = rotationTrack({ times: [0, 1e300], values: [0, 0, 0, 1, 0, 0, 1, 0] });
    expect(() => ticked(long, 'as-written', 30)).toThrow(SlewcurveError);
    expect(() => ticked(one, 'as-written', 0)).toThrow(SlewcurveError);
  });
});
