import { readFileSync } from 'node:fs';
import { Ajv2020 } from 'ajv/dist/2020.js';
import * as fc from 'fast-check';
import { rotationTrack, type RotationTrack } from '@slewcurve/core';
import { bufferSource, openAnimation } from '@slewcurve/formats';
import { compareFiles, compareTracks, comparisonText, kestrelPoint, type ComparedFile } from '@slewcurve/job';
import { describe, expect, test } from 'vitest';

/** A turn about x: degrees at times. */
function aboutX(times: readonly number[], degrees: readonly number[]): RotationTrack {
  const values = degrees.flatMap((angle) => {
    const half = (angle * Math.PI) / 360;
    return [Math.sin(half), 0, 0, Math.cos(half)];
  });
  return rotationTrack({ times, values, id: 'hip', clip: 'walk' });
}

async function demo(name: string): Promise<ComparedFile> {
  return { name, file: await openAnimation(bufferSource(kestrelPoint()), { name }) };
}

describe('two tracks compared', () => {
  const steady = aboutX([0, 1, 2], [0, 90, 180]);

  test('differ by nothing from themselves', () => {
    expect(compareTracks(steady, steady, 'short-way')).toMatchObject({ angle: 0, rate: 0 });
  });

  test('one key 10° off: 10° at that key, and 10 deg/s over the seconds on either side', () => {
    const { angle, angleAt, rate, rateOver } = compareTracks(
      steady,
      aboutX([0, 1, 2], [0, 100, 180]),
      'short-way',
    );
    // Six significant digits are given.
    expect([angle, angleAt, rate, rateOver]).toEqual([10, 1, 10, [0, 1]]);
  });

  test('a key left out of a steady turn makes no difference: found between keys, not at them alone', () => {
    const fewer = compareTracks(aboutX([0, 1, 2], [0, 60, 120]), aboutX([0, 2], [0, 120]), 'short-way');
    // Rounding of float64: the angle of equal orientations is some 1e-8 rad.
    expect(fewer.angle).toBeLessThan(1e-5);
    expect(fewer.rate).toBe(0);
    const bulge = compareTracks(aboutX([0, 1, 2], [0, 80, 120]), aboutX([0, 2], [0, 120]), 'short-way');
    expect([bulge.angle, bulge.angleAt]).toEqual([20, 1]);
    // 80° in the first second against 60.
    expect([bulge.rate, bulge.rateOver]).toEqual([20, [0, 1]]);
  });

  test('an angle between the keys of both is found', () => {
    // 0° to 90° in 1 s against the same with a stop at 0.5 s: nothing differs at 0 and 1 s.
    const stopped = aboutX([0, 0.25, 0.75, 1], [0, 45, 45, 90]);
    const { angle, angleAt } = compareTracks(aboutX([0, 1], [0, 90]), stopped, 'short-way');
    expect(angle).toBe(22.5);
    expect([0.25, 0.75]).toContain(angleAt);
  });

  test('are as far apart one way round as the other', () => {
    const degrees = fc.array(fc.double({ min: -80, max: 80, noNaN: true }), { minLength: 3, maxLength: 3 });
    fc.assert(
      fc.property(degrees, degrees, (one, two) => {
        const [a, b] = [aboutX([0, 1, 2], one), aboutX([0, 1.5, 2], two)];
        const [ab, ba] = [compareTracks(a, b, 'short-way'), compareTracks(b, a, 'short-way')];
        // Sums of the same numbers in another order: the last of six digits.
        expect(ab.angle).toBeCloseTo(ba.angle, 3);
        expect(ab.rate).toBeCloseTo(ba.rate, 3);
        // The largest angle is no smaller than that at any key.
        for (let key = 0; key < 3; key += 2) {
          const apart = Math.abs(one[key] - two[key]);
          expect(ab.angle).toBeGreaterThanOrEqual(Math.min(apart, 360 - apart) - 1e-3);
        }
      }),
      { seed: 4 },
    );
  });

  test('that differ by sign alone are equal as played the short way, and not as finite cubic', () => {
    const flipped = {
      ...steady,
      values: steady.values.map((value, i) => (i >= 4 && i < 8 ? -value : value)),
    };
    expect(compareTracks(steady, flipped, 'short-way')).toMatchObject({ angle: 0, rate: 0 });
    expect(compareTracks(steady, flipped, 'finite-cubic').angle).toBeGreaterThan(1);
  });
});

describe('two files compared', () => {
  test('pass when equal, and hold to the published schema', async () => {
    const comparison = compareFiles(await demo('a.glb'), await demo('b.glb'), 'as-written', {
      angle: 0,
      rate: 0,
    });
    const valid = new Ajv2020({ strict: false }).compile(
      JSON.parse(readFileSync('packages/job/schema/comparison.json', 'utf8')),
    );
    expect(valid(JSON.parse(JSON.stringify(comparison)))).toBe(true);
    expect([comparison.verdict, comparison.tracks.length]).toEqual(['pass', 12]);
  });

  test('fail for a track that one of them has not, where there is a limit', async () => {
    const [a, b] = [await demo('a.glb'), await demo('b.glb')];
    const fewer = { ...b, file: { ...b.file, clips: b.file.clips.slice(1) } };
    expect(compareFiles(a, fewer, 'as-written').verdict).toBe('pass');
    const { verdict, onlyInA, onlyInB } = compareFiles(a, fewer, 'as-written', { angle: 1 });
    expect([verdict, onlyInA.length, onlyInB]).toEqual(['fail', b.file.clips[0].tracks.length, []]);
    expect(compareFiles(fewer, a, 'as-written', { rate: 1 }).verdict).toBe('fail');
  });

  test('name a track with fewer keys too few, and one with as many adrift', async () => {
    const whole = await demo('a.glb');
    const of = (track: RotationTrack): ComparedFile => {
      const clip = { ...whole.file.clips[0], tracks: [track] };
      return { name: 'one.glb', file: { ...whole.file, clips: [clip] } };
    };
    const source = of(aboutX([0, 1, 2], [0, 80, 120]));
    const named = (copy: RotationTrack, limits: { angle?: number; rate?: number }): unknown =>
      compareFiles(source, of(copy), 'short-way', limits).findings;
    const fewer = aboutX([0, 2], [0, 120]);
    expect(named(fewer, { angle: 5 })).toEqual([
      {
        rule: 'keys.too-few',
        level: 'error',
        clip: 'walk',
        track: 'hip',
        keys: [3, 2],
        span: [1, 1],
        value: 20,
        unit: 'deg',
        limit: 5,
      },
    ]);
    expect(named(fewer, { angle: 20, rate: 15 })).toMatchObject([
      { rule: 'keys.too-few', value: 20, unit: 'deg/s', limit: 15, span: [0, 1] },
    ]);
    expect(named(fewer, {})).toEqual([]);
    const even = compareFiles(of(aboutX([0, 1, 2], [0, 60, 120])), of(fewer), 'short-way', { angle: 0.001 });
    expect([even.findings, even.verdict]).toEqual([[], 'pass']);
    const off = aboutX([0, 1, 2], [0, 70, 120]);
    expect(named(off, { angle: 5 })).toMatchObject([{ rule: 'keys.drift', keys: [3, 3], value: 10 }]);
    expect(named(off, { angle: 10 })).toEqual([]);
    const valid = new Ajv2020({ strict: false }).compile(
      JSON.parse(readFileSync('packages/job/schema/comparison.json', 'utf8')),
    );
    const comparison = compareFiles(source, of(off), 'short-way', { angle: 5 });
    expect(valid(JSON.parse(JSON.stringify(comparison)))).toBe(true);
    expect(comparisonText(comparison)).toContain(
      'error keys.drift: hip in walk is 10° off (limit 5°), 3 keys in both\n',
    );
  });

  test('say which track a playback can’t play', async () => {
    const file = await demo('a.glb');
    expect(() => compareFiles(file, file, 'stored-cubic')).toThrow(
      expect.objectContaining({ code: 'compare.unplayable' }),
    );
  });
});
