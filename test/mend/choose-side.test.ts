import { type RotationTrack, keyOrientation, logMap, playAs, relative, rotationTrack } from '@slewcurve/core';
import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { applied, codeOf, numbersOf } from '../support/edit-acceptance.js';

fc.configureGlobal({ ...fc.readConfigureGlobal(), seed: 2 });

const DEGREES = 180 / Math.PI;

/** Two keys a second apart, `degrees` about y, with the second's w as given. */
function twoKeys(degrees: number, w?: number): RotationTrack {
  const half = degrees / 2 / DEGREES;
  return rotationTrack({ times: [0, 1], values: [0, 0, 0, 1, 0, Math.sin(half), 0, w ?? Math.cos(half)] });
}

/** Degrees turned about own y from the first key to the middle of each half, signed. */
function turnAt(track: RotationTrack, time: number): number {
  const curve = playAs(track, 'as-written');
  const [from, to] = [new Float64Array(4), new Float64Array(4)];
  relative(to, curve.orientation(from, track.times[0]), curve.orientation(to, time));
  return logMap(new Float64Array(3), to)[1] * DEGREES;
}

/** The track with every stored component moved by ±1e-6 as the bits of `pattern` say. */
function moved(track: RotationTrack, pattern: number): RotationTrack {
  const values = track.values.map((number, i) => number + ((pattern >> i) & 1 ? 1e-6 : -1e-6));
  return { ...track, values };
}

/** The code of what choosing a side about own y at key 1 is refused for. */
function refusal(track: RotationTrack, rest: object = {}): string | undefined {
  return codeOf(() => applied(track, { verb: 'choose side', keys: [1], axis: [0, 1, 0], ...rest }));
}

describe('choose side', () => {
  it.each([
    [1e-16, 1],
    [1e-16, -1],
    [-1e-16, 1],
    [-1e-16, -1],
  ])(
    'NEEDS A2: from 0° to 180° with w = %g, way %i: no sign pattern of ±1e-6 on all 12 stored components changes the direction',
    (w, way) => {
      const track = twoKeys(180, w);
      const { track: after, inserted } = applied(track, {
        verb: 'choose side',
        keys: [1],
        axis: [0, way, 0],
      });
      expect(inserted).toEqual([1]);
      expect(turnAt(after, 0.5)).toBeCloseTo(90 * way, 9);
      let [least, most] = [Infinity, -Infinity];
      for (let pattern = 0; pattern < 2 ** 12; pattern++)
        for (const time of [0.25, 0.45]) {
          const turn = turnAt(moved(after, pattern), time) * way - 180 * time;
          least = Math.min(least, turn);
          most = Math.max(most, turn);
        }
      // 1e-6 on a component turns a key by up to 4e-6 rad = 2.3e-4°.
      expect(least).toBeGreaterThan(-1e-3);
      expect(most).toBeLessThan(1e-3);
      for (let pattern = 0; pattern < 2 ** 12; pattern++) {
        const late = turnAt(moved(after, pattern), 0.75) * way;
        expect(Math.abs(late - 135)).toBeLessThan(1e-3);
      }
    },
  );

  it('without it the same perturbation does change the direction', () => {
    const ways = [0, 2 ** 7].map((pattern) => Math.sign(turnAt(moved(twoKeys(180), pattern), 0.5)));
    expect(ways).toEqual([-1, 1]);
  });

  it('turns the wanted way by the wanted travel, short or long, and leaves the end keys to the bit', () => {
    fc.assert(
      fc.property(fc.double({ min: 35, max: 179.9, noNaN: true }), fc.constantFrom(1, -1), (degrees, way) => {
        const track = twoKeys(degrees);
        const { track: after } = applied(track, { verb: 'choose side', keys: [1], axis: [0, way, 0] });
        const wanted = way === 1 ? degrees : 360 - degrees;
        expect(playAs(after, 'as-written').length(0, 1) * DEGREES).toBeCloseTo(wanted, 9);
        expect(Math.sign(turnAt(after, 0.01))).toBe(way);
        expect(numbersOf(after, 0)).toEqual(numbersOf(track, 0));
        expect(numbersOf(after, 2)).toEqual(numbersOf(track, 1));
      }),
    );
  });

  it('takes several keys, numbers them as before the edit, and moves declared cuts along', () => {
    const values = [0, 0, 0, 1, 0, 1, 0, 0, 0, 0, 0, -1, 0, 0, 0, 1];
    const track = rotationTrack({ times: [0, 1, 2, 3], values, breaks: [2] });
    const {
      track: after,
      inserted,
      changed,
    } = applied(track, { verb: 'choose side', keys: [1, 2], axis: [0, -1, 0] });
    expect([...after.times]).toEqual([0, 0.5, 1, 1.5, 2, 3]);
    expect(inserted).toEqual([1, 3]);
    expect(changed).toEqual([1, 3]);
    expect(after.breaks).toEqual([4]);
    expect(playAs(after, 'as-written').length(0, 3) * DEGREES).toBeCloseTo(360, 9);
  });

  it.each([1, -1])(
    'CUBICSPLINE, way %i: turns the wanted way, tangents ½·q·(ω, 0), every old orientation as it was',
    (way) => {
      const zero = [0, 0, 0, 0];
      const keys = [
        [0, 0, 0, 1],
        [0, 1, 0, 1e-9],
        [0, Math.SQRT1_2, 0, -Math.SQRT1_2],
      ];
      const values = keys.flatMap((key) => [...zero, ...key, ...zero]);
      const track = rotationTrack({ times: [0, 1, 2], values, interpolation: 'CUBICSPLINE' });
      const { track: after, inserted } = applied(track, {
        verb: 'choose side',
        keys: [1],
        axis: [0, way, 0],
      });
      expect(inserted).toEqual([1]);
      const curve = playAs(after, 'as-written');
      expect(curve.length(0, 1) * DEGREES).toBeCloseTo(180, 5);
      expect(turnAt(after, 0.5)).toBeCloseTo(90 * way, 5);
      expect(curve.rate(new Float64Array(3), 0.5, 'own')[1]).toBeCloseTo(way * Math.PI, 6);
      for (const key of [0, 1, 2]) {
        const now = numbersOf(after, key === 0 ? 0 : key + 1);
        const sign = way === -1 && key > 0 ? -1 : 1;
        expect(now.map((number) => number * sign + 0)).toEqual(
          numbersOf(track, key).map((number) => number + 0),
        );
      }
      if (way === 1) return;
      expect(
        codeOf(() => applied(track, { verb: 'choose side', keys: [1], axis: [0, way, 0], keep: [2] })),
      ).toBe('step.nothing-left');
    },
  );

  it('never guesses: refuses without an axis, with one that tells nothing, and where nothing turns', () => {
    const half = twoKeys(180);
    expect(refusal(half, { axis: undefined })).toBe('step.needs-axis');
    expect(refusal(half, { axis: [1, 0, 0] })).toBe('step.axis-tells-nothing');
    expect(refusal(half, { keys: undefined })).toBe('step.needs-keys');
    expect(refusal(half, { keys: [0] })).toBe('step.bad-key');
    expect(refusal(half, { keys: [2] })).toBe('step.bad-key');
    expect(refusal(half, { span: [0, 0.5] })).toBe('step.nothing-left');
    expect(refusal(twoKeys(10), { axis: [0, -1, 0] })).toBe('step.not-half-a-turn');
    expect(refusal(twoKeys(0), {})).toBe('step.axis-tells-nothing');
    expect(refusal(rotationTrack({ ...half, breaks: [0] }), {})).toBe('step.nothing-between');
    expect(refusal(rotationTrack({ ...half, interpolation: 'STEP' }), {})).toBe('step.nothing-between');
    expect(
      refusal(rotationTrack({ times: [0, 1], values: [0, 0, 0, 0, 3, 0], interpolation: 'EULER' }), {}),
    ).toBe('step.needs-quaternions');
    expect(refusal({ ...half, values: half.values.map((n, i) => (i === 5 ? NaN : n)) }, {})).toBe(
      'step.no-direction',
    );
  });

  it('refuses where float32 times leave no room for a key between', () => {
    const close = { ...twoKeys(180), times: Float64Array.of(1, 1 + 2 ** -23) };
    const stored = { ...close, storage: { component: 'float32', timeComponent: 'float32' } as const };
    expect(codeOf(() => applied(stored, { verb: 'choose side', keys: [1], axis: [0, 1, 0] }))).toBe(
      'step.no-room',
    );
    expect(keyOrientation(new Float64Array(4), close, 1)[1]).toBe(1);
  });
});
