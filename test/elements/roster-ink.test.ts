import { columnMaxima, habitOf, inkDensity, inkRow, keptUp, trackInk } from '@slewcurve/elements/plot';
import * as fc from 'fast-check';
import { describe, expect, test } from 'vitest';

const FRAME = 1 / 120;

/** Three minutes at 120 Hz of slow swinging, up to 60 deg/s. */
function swinging(): Float32Array {
  return Float32Array.from({ length: 21_600 }, (_, i) => 30 + 30 * Math.sin(i / 400));
}

/** Opening by looking at every window. */
const scan = (values: readonly number[], length: number): number[] => {
  const before = Math.floor((length - 1) / 2);
  const after = length - 1 - before;
  const least = values.map((_, i) => Math.min(...values.slice(Math.max(0, i - before), i + after + 1)));
  return values.map((_, i) => Math.max(...least.slice(Math.max(0, i - after), i + before + 1)));
};

describe('the ink of a track', () => {
  test('has a pop of one frame among 21,600 at its blackest, on 800 pixels', () => {
    const speeds = swinging();
    // 5° in one frame at 120 Hz.
    speeds[9000] = 600;
    const sheet = { width: 800, height: 10, data: new Uint8ClampedArray(800 * 10 * 4) };
    inkRow(sheet, trackInk(speeds, FRAME, 0.1), 0, 10, [31, 78, 121]);
    const alphaAt = (x: number): number => sheet.data[x * 4 + 3];
    const tall = Array.from({ length: 800 }, (_, x) => x).filter((x) => alphaAt(x) > 0);
    // The top pixel of the row is inked in the pop's column alone.
    expect(tall).toEqual([Math.floor((9000 / 21_600) * 800)]);
    expect(alphaAt(tall[0])).toBe(255);
  });

  test('leaves a whip pale, however fast: 0.35 s at 900 deg/s is meant', () => {
    const speeds = swinging();
    speeds.fill(900, 9000, 9000 + Math.round(0.35 / FRAME));
    const ink = trackInk(speeds, FRAME, 0.1);
    expect(ink.darkest).toBeLessThan(0.35);
    expect(ink.darkest).toBe(Math.max(...ink.density));
  });

  test('is nothing at the noise floor and below', () => {
    expect(inkDensity(0.1, 50, 0.1)).toBe(0);
    expect(trackInk(new Float32Array(100), FRAME, 0.1).darkest).toBe(0);
  });

  test('grows with speed and stays within 0 and 1', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 0, max: 1e6, noNaN: true }),
        fc.double({ min: 0, max: 1e6, noNaN: true }),
        fc.double({ min: 0, max: 1e4, noNaN: true }),
        (a, b, usual) => {
          const [low, high] = [Math.min(a, b), Math.max(a, b)].map((speed) => inkDensity(speed, usual, 0.1));
          expect(low).toBeLessThanOrEqual(high);
          expect(low >= 0 && high <= 1).toBe(true);
        },
      ),
    );
  });

  test('keeps what is kept up, as a plain scan finds it', () => {
    fc.assert(
      fc.property(
        fc.array(fc.integer({ min: 0, max: 50 }), { minLength: 1, maxLength: 60 }),
        fc.integer({ min: 1, max: 12 }),
        (values, length) => {
          expect([...keptUp(values, length)]).toEqual(scan(values, length));
        },
      ),
    );
  });

  test('takes the habit at the 95th percentile', () => {
    expect(habitOf(Array.from({ length: 101 }, (_, i) => i))).toBe(95);
    expect(habitOf([])).toBe(0);
  });

  test('an empty track has no ink', () => {
    const sheet = { width: 4, height: 2, data: new Uint8ClampedArray(32) };
    inkRow(sheet, trackInk([], FRAME, 0.1), 0, 2, [0, 0, 0]);
    expect(Math.max(...sheet.data)).toBe(0);
  });

  test('loses no one-bin spike at any width', () => {
    fc.assert(
      fc.property(
        fc.integer({ min: 1, max: 5000 }),
        fc.nat(),
        fc.integer({ min: 1, max: 3000 }),
        (length, where, width) => {
          const values = new Float32Array(length).fill(0.25);
          values[where % length] = 1;
          const columns = columnMaxima(values, width);
          expect(columns[Math.min(width - 1, Math.floor(((where % length) / length) * width))]).toBe(1);
          expect(Math.min(...columns)).toBeGreaterThanOrEqual(0.25);
        },
      ),
    );
  });

  test('draws a spike in the column where it stands', () => {
    const values = new Float32Array(1000);
    values[250] = 1;
    const columns = columnMaxima(values, 100);
    expect(columns[25]).toBe(1);
    // The border of columns 24 and 25 lies in its bin, so both have it and the line stays joined.
    expect([...columns].filter((value) => value > 0)).toHaveLength(2);
  });
});
