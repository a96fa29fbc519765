import { angleBetween, expMap, playAs, rotationTrack, type RotationTrack } from '@slewcurve/core';
import { describe, expect, test } from 'vitest';

const DEGREES = 180 / Math.PI;

/** A steady turn about x of `degrees` a key, one key a tenth of a second, negated from `flip` on. */
function steady(degrees: number, flip: number): RotationTrack {
  const times = Array.from({ length: 6 }, (_, i) => i / 10);
  const values = times.flatMap((_, i) =>
    expMap<number[]>([], [(i * degrees) / DEGREES, 0, 0]).map((part) => (i < flip ? part : -part)),
  );
  return rotationTrack({ times, values });
}

describe('a sign change played without care for signs', () => {
  test.each([1, 0.1, 0.001])(
    'at %f° a key the peak of the chord is the closed form 2|d|²/(h|v|), however narrow',
    (degrees) => {
      const curve = playAs(steady(degrees, 3), 'raw-chord');
      // Between q and −q′ at the half angle a: |v| = sin a, |d|² = 2 + 2 cos a.
      const a = degrees / DEGREES / 2;
      const due = (2 * (2 + 2 * Math.cos(a))) / (0.1 * Math.sin(a));
      const peak = curve.peak(curve.start, curve.end);
      // The chord's length at its least is lost to rounding in proportion to 1e-16 over the half angle.
      expect(Math.abs(peak.rate / due - 1)).toBeLessThan(1e-15 / a);
      expect(curve.length(0.2, 0.3)).toBeCloseTo(2 * Math.PI - 2 * a, 12);
    },
  );

  test.each([1, 0.1, 0.001])(
    'at %f° a key the cubic finds its peak: no time beside it is faster',
    (degrees) => {
      const curve = playAs(steady(degrees, 3), 'finite-cubic');
      const peak = curve.peak(curve.start, curve.end);
      const rate = (t: number): number => Math.hypot(...curve.rate([0, 0, 0], t, 'own'));
      const width = 0.1 / peak.rate;
      for (let step = 1e-3; step < 1e5; step *= 1.3)
        for (const t of [peak.time - step * width, peak.time + step * width])
          expect(peak.rate).toBeGreaterThanOrEqual(rate(t) * (1 - 1e-9));
      // Half a whole turn, less the little that was meant: 2π is turned within the narrow peak.
      expect(curve.length(0.2, 0.3)).toBeGreaterThan(0.98 * 2 * Math.PI);
    },
  );

  test('an exact q to −q has no way to turn: the chord holds the key before it, at no rate (B29)', () => {
    const curve = playAs(
      rotationTrack({ times: [0, 1], values: [0, 0.6, 0, 0.8, 0, -0.6, 0, -0.8] }),
      'raw-chord',
    );
    expect(angleBetween(curve.orientation([], 0.5), [0, 0.6, 0, 0.8])).toBe(0);
    expect(curve.peak(0, 1).rate).toBe(0);
  });

  test('aligned, the three playbacks agree to what chords and cubics differ by', () => {
    const aligned = steady(5, 99);
    const peaks = (['short-way', 'raw-chord', 'finite-cubic'] as const).map(
      (id) => playAs(aligned, id).peak(0, 0.5).rate * DEGREES,
    );
    expect(peaks[0]).toBeCloseTo(50, 9);
    // A span of 5°: tan(θ/4)/(θ/4) = 1.00016.
    expect(peaks[1] / 50).toBeCloseTo(1.00016, 4);
    expect(peaks[2] / 50).toBeCloseTo(1, 2);
  });
});

test('lengths of keys do not turn anything that is played as stored numbers of one length (B28)', () => {
  const track = steady(30, 99);
  const longer = rotationTrack({ ...track, values: track.values.map((part) => part * 1e-5) });
  for (const id of ['raw-chord', 'finite-cubic'] as const)
    expect(
      angleBetween(playAs(track, id).orientation([], 0.23), playAs(longer, id).orientation([], 0.23)),
    ).toBeLessThan(1e-14);
});

test('gaps of 5e-324 s and of 1e300 s give finite rates', () => {
  for (const id of ['short-way', 'chord', 'raw-chord', 'finite-cubic'] as const)
    for (const times of [
      [0, 5e-324, 1],
      [-1e300, 0, 1e300],
    ]) {
      const curve = playAs(rotationTrack({ times, values: [0, 0, 0, 1, 0, 0, 1, 0, 0, 1, 0, 0] }), id);
      for (const t of times) {
        const numbers = [
          ...curve.rate<number[]>([], t, 'parent'),
          ...curve.acceleration<number[]>([], t, 'own'),
        ];
        expect(numbers.every(Number.isFinite)).toBe(true);
      }
    }
});

describe('a stored cubic’s promise of an even rate', () => {
  const key = [0.1, -0.5, 0.7, 0.5];
  const tangent = [0.3, 0.2, -0.4, 0.6];
  /** Three keys, the tangents of the middle one as given. */
  const through = (arriving: readonly number[], leaving: readonly number[]): RotationTrack => {
    const none = [0, 0, 0, 0];
    return rotationTrack({
      times: [0, 1, 2],
      values: [
        [none, [0, 0, 0, 1], [0.1, 0, 0, 0]],
        [arriving, key, leaving],
        [[0, 0.1, 0, 0], [0, 0, 1, 0], none],
      ].flat(2),
      interpolation: 'CUBICSPLINE',
    });
  };
  const continuity = (arriving: readonly number[], leaving: readonly number[]): number =>
    playAs(through(arriving, leaving), 'stored-cubic').continuity;

  test('is 1 where both tangents of a key are one, and where they differ along its value alone, which does not turn', () => {
    expect(continuity(tangent, tangent)).toBe(1);
    expect(
      continuity(
        tangent,
        tangent.map((part, k) => part + 0.7 * key[k]),
      ),
    ).toBe(1);
  });

  test.each([0, 1, 2, 3])('is 0 where component %i of them differs', (component) => {
    const other = tangent.map((part, k) => (k === component ? part + 1e-6 : part));
    expect(continuity(tangent, other)).toBe(0);
  });
});
