import {
  type RotationTrack,
  angleBetween,
  expMap,
  keyOrientation,
  logMap,
  multiply,
  playAs,
  relative,
  replaceTrack,
} from '@slewcurve/core';
import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { between, captured, moved, panTilt, straysFrom } from '../support/captured.js';
import { decibels, lineAt, power } from '../support/dft.js';
import { applied, codeOf, numbersOf } from '../support/edit-acceptance.js';
import { grid, keyed, motions } from '../support/smooth-track.js';

fc.configureGlobal({ ...fc.readConfigureGlobal(), seed: 11 });

const DEGREES = 180 / Math.PI;
const RATE = 60;

/** A slow pan and tilt. */
const move = (t: number): Float64Array => panTilt(moved(t, 1, 6, 60), moved(t, 2, 8, -15));

/** The same with a hum in pan: strength in degrees by time. */
function humming(hertz: number, strength: (t: number) => number) {
  return (t: number): Float64Array =>
    panTilt(moved(t, 1, 6, 60) + strength(t) * Math.sin(2 * Math.PI * hertz * t + 0.7), moved(t, 2, 8, -15));
}

const between3And7 = (t: number): number => (t >= 3 && t < 7 ? 0.4 : 0);

/** Own axes from one track's keys to another's, about one axis, degrees. */
function offsets(track: RotationTrack, from: RotationTrack, axis = 1): number[] {
  return Array.from(
    track.times,
    (_, key) =>
      logMap(
        [0, 0, 0],
        relative(
          [0, 0, 0, 1],
          keyOrientation([0, 0, 0, 1], from, key),
          keyOrientation([0, 0, 0, 1], track, key),
        ),
      )[axis] * DEGREES,
  );
}

/** The track with the motion's hum taken off by what made it: same grain, no hum. */
function quiet(track: RotationTrack, strength: (t: number) => number, hertz: number): RotationTrack {
  const values = Array.from(track.times).flatMap((t, key) => {
    const pan = strength(t) * Math.sin(2 * Math.PI * hertz * t + 0.7);
    const back = expMap(new Float64Array(4), [0, -pan / DEGREES, 0]);
    return [...multiply(new Float64Array(4), back, keyOrientation(new Float64Array(4), track, key))];
  });
  return replaceTrack(track, { values: Float64Array.from(values) });
}

const swelling = (t: number): number => 0.1 + 0.3 * Math.sin((Math.PI * t) / 10) ** 2;

const always = (): number => 0.4;

describe('take out hum', () => {
  // EDITS: hum −20 dB, all else within 0.02°.
  it.each([
    [5.3, 0],
    [11, 0],
    [14.2, 0],
    [11, 0.04],
  ])('at %d Hz under a grain of %d° it falls by 20 dB, and all else stays within 0.02°', (hertz, grain) => {
    const track = captured(humming(hertz, between3And7), { keys: 600, rate: RATE, grain, seed: 2 });
    const { track: after, changed } = applied(track, { verb: 'take out hum', hertz, span: [2, 8.5] });
    const wanted = quiet(track, between3And7, hertz);
    expect(Math.max(...between(after, wanted))).toBeLessThan(0.02);
    const [was, is] = [track, after].map((one) => power(offsets(one, wanted)));
    expect(decibels(is, was)).toBeLessThan(-20);
    // It begins at key 180 and ends with key 419; where it passes through zero a key may count as still.
    expect(changed[0]).toBeGreaterThanOrEqual(179);
    expect(changed.at(-1)).toBeLessThanOrEqual(420);
  });

  // The discrete Fourier sum, worked out apart from the edit. A hum of whole cycles in a whole number of keys is one line of it.
  it('takes one line out of the spectrum and leaves the others', () => {
    const lines = [
      [2, 0.2],
      [7, 0.1],
      [9.5, 0.15],
      [14, 0.1],
      [20, 0.05],
    ] as const;
    const shake = (t: number): Float64Array =>
      panTilt(
        lines.reduce(
          (sum, [hertz, degrees]) => sum + degrees * Math.sin(2 * Math.PI * hertz * t + hertz),
          0,
        ) +
          0.4 * Math.sin(2 * Math.PI * 11 * t),
        0,
      );
    const track = captured(shake, { keys: 600, rate: RATE });
    const { track: after } = applied(track, { verb: 'take out hum', hertz: 11 });
    const pans = [track, after].map((one) =>
      offsets(
        one,
        captured(() => panTilt(0, 0), { keys: 600, rate: RATE }),
      ),
    );
    expect(lineAt(pans[0], RATE, 11)).toBeCloseTo(0.4, 6);
    expect(20 * Math.log10(lineAt(pans[1], RATE, 11) / 0.4)).toBeLessThan(-40);
    for (const [hertz, degrees] of lines) {
      expect(lineAt(pans[0], RATE, hertz)).toBeCloseTo(degrees, 6);
      // A quarter of the 0.02° that all else may change.
      expect(Math.abs(lineAt(pans[1], RATE, hertz) - degrees)).toBeLessThan(0.005);
    }
    // Parseval: what was taken away is the power of that line, 0.4²/2, and no more.
    expect(power(pans[0].map((pan, key) => pan - pans[1][key])) / 0.08).toBeCloseTo(1, 2);
  });

  it('follows a hum whose strength and phase change slowly', () => {
    const track = captured(humming(9, swelling), { keys: 600, rate: RATE, grain: 0.01 });
    const wanted = quiet(track, swelling, 9);
    const { track: after } = applied(track, { verb: 'take out hum', hertz: 9 });
    const [was, is] = [track, after].map((one) => power(offsets(one, wanted)));
    expect(decibels(is, was)).toBeLessThan(-20);
  });

  it('finds the frequency beside the one that it is told', () => {
    const track = captured(humming(11, between3And7), { keys: 600, rate: RATE });
    for (const hertz of [10.9, 11.15]) {
      const { track: after } = applied(track, { verb: 'take out hum', hertz });
      expect(Math.max(...between(after, quiet(track, between3And7, 11)))).toBeLessThan(0.02);
    }
  });

  it('fades where the hum runs on beyond the span, and leaves outliers where they stand', () => {
    const sound = captured(humming(11, always), { keys: 600, rate: RATE, grain: 0.01 });
    const track = replaceTrack(sound, { values: Float64Array.from(sound.values) });
    track.values.set(panTilt(90, 40), 4 * 300);
    const span = [2, 8] as const;
    const { track: after } = applied(track, { verb: 'take out hum', hertz: 11, span, keep: [250] });
    expect(numbersOf(after, 250)).toEqual(numbersOf(track, 250));
    for (const key of [0, 100, 119, 481, 599]) expect(numbersOf(after, key)).toEqual(numbersOf(track, key));
    // Two cycles from the border and from the kept key it is gone, away from the outlier.
    const strays = between(after, quiet(track, always, 11));
    for (const key of [140, 180, 230, 270, 290, 310, 400, 460]) expect(strays[key]).toBeLessThan(0.02);
    // The outlier goes along with the hum, and no further.
    expect(between(after, track)[300]).toBeLessThan(0.41);
    // No jump of the edit: from key to key it changes no faster than the hum itself.
    const change = offsets(after, track);
    const most = Math.max(...change.slice(1).map((x, key) => Math.abs(x - change[key])));
    expect(most).toBeLessThan(1.05 * 2 * 0.4 * Math.sin((Math.PI * 11) / RATE));
  });

  it('takes the hum’s own rate off the tangents of a CUBICSPLINE', () => {
    const hum = humming(6, between3And7);
    const dense = grid(600, RATE);
    const values = dense.flatMap((t) => {
      const h = 1e-6;
      const tangent = hum(t + h).map((part, i) => (part - hum(t - h)[i]) / (2 * h));
      return [...tangent, ...hum(t), ...tangent];
    });
    const track = replaceTrack(captured(move, { keys: 600, rate: RATE }), {
      values: Float64Array.from(values),
      interpolation: 'CUBICSPLINE',
    });
    const { track: after } = applied(track, { verb: 'take out hum', hertz: 6 });
    const played = playAs(after, 'as-written');
    for (let t = 3.2; t < 6.8; t += 0.0371) {
      // Also between keys; the cubic itself is good to 1e-4° here.
      expect(angleBetween(played.orientation([0, 0, 0, 1], t), move(t)) * DEGREES).toBeLessThan(0.02);
      const wanted = angleBetween(move(t - 1e-4), move(t + 1e-4)) / 2e-4;
      const rate = Math.hypot(...played.rate([0, 0, 0], t, 'own'));
      // The hum alone turned at up to 15 deg/s.
      expect(Math.abs(rate - wanted) * DEGREES).toBeLessThan(0.8);
    }
  });

  it('works on uneven keys', () => {
    const times = grid(600, RATE).map((t, key) => t + (key % 3) * 0.002);
    const hum = humming(8, between3And7);
    const track = replaceTrack(captured(move, { keys: 600, rate: RATE }), {
      times: Float64Array.from(times),
      values: Float64Array.from(times.flatMap((t) => [...hum(t)])),
    });
    const { track: after } = applied(track, { verb: 'take out hum', hertz: 8, span: [1, 9] });
    expect(Math.max(...straysFrom(after, move))).toBeLessThan(0.02);
  });

  it('does what every edit owes on any dense track, or says that nothing hums', () => {
    fc.assert(
      fc.property(
        motions,
        fc.constantFrom('LINEAR' as const, 'CUBICSPLINE' as const),
        fc.uniqueArray(fc.nat(89), { maxLength: 4 }),
        fc.double({ min: 3, max: 12, noNaN: true }),
        (motion, interpolation, keep, hertz) => {
          const track = keyed(motion, grid(90), interpolation);
          const step = { verb: 'take out hum', hertz, keep, span: [0.3, 2.6] as const };
          const code = codeOf(() => applied(track, step));
          expect([undefined, 'step.no-hum']).toContain(code);
        },
      ),
      { numRuns: 30 },
    );
  });

  it('says what to do where it cannot be applied', () => {
    const track = captured(move, { keys: 600, rate: RATE, grain: 0.02 });
    const code = (step: object, on = track): string | undefined =>
      codeOf(() => applied(on, { verb: 'take out hum', ...step }));
    expect(code({})).toBe('step.needs-hertz');
    expect(code({ hertz: 11 })).toBe('step.no-hum');
    expect(code({ hertz: 30 })).toBe('step.too-fast');
    expect(code({ hertz: 11, span: [3, 3.2] })).toBe('step.too-short');
    expect(code({ hertz: 11, span: [300, 400] })).toBe('step.too-short');
    expect(code({ hertz: 11 }, replaceTrack(track, { interpolation: 'STEP' }))).toBe('step.plays-no-turn');
    const sparse = replaceTrack(track, { times: track.times.map((t) => 20 * t) });
    expect(code({ hertz: 0.5 }, sparse)).toBe('step.needs-dense-keys');
  });
});
