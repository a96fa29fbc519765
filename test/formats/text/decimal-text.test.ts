import * as fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { measure, playAs } from '@slewcurve/core';
import { openText, rewritten, tracksOf } from '../../support/text-files.js';

// Numbers go in and out by way of a table, as a user sees them.
const read = async (...numbers: readonly string[]): Promise<number[]> => {
  const rows = numbers.map((number, key) => `${key},0,0,${number},1\n`).join('');
  const [track] = tracksOf(await openText(`t,qx,qy,qz,qw\n${rows}`, 'a.csv'));
  return numbers.map((_, key) => track.values[4 * key + 2]);
};

describe('decimal text', () => {
  test('is read as the nearest float64, whatever its length', async () => {
    await fc.assert(
      fc.asyncProperty(
        fc.array(fc.double({ noNaN: true }), { minLength: 1, maxLength: 20 }),
        async (numbers) => {
          const finite = numbers.filter((x) => Number.isFinite(x));
          fc.pre(finite.length > 0);
          for (const spell of [String, (x: number) => x.toExponential(17), (x: number) => x.toFixed(9)]) {
            const texts = finite.map(spell);
            expect(await read(...texts)).toEqual(texts.map(Number));
          }
        },
      ),
    );
  });

  test('has many spellings', async () => {
    expect(await read('+.5', '-5.', '1E+2', '007', '-0', '0.1', '123456789012345', '.1e1')).toEqual([
      0.5, -5, 100, 7, -0, 0.1, 123456789012345, 1,
    ]);
    expect(await read('nan', 'NaN', '-nan(ind)', 'inf', '-Infinity', '1.#INF', '1.#QNAN')).toEqual([
      NaN,
      NaN,
      NaN,
      Infinity,
      -Infinity,
      Infinity,
      NaN,
    ]);
  });

  test.each(['1.2.3', '--1', '1e', 'e5', '0x10', '1_000', '1,5', '.', '+', '١'])(
    '%s is no number',
    async (text) => {
      await expect(read('0', `"${text}"`)).rejects.toMatchObject({ code: 'delimited.bad-number' });
    },
  );

  test('comes back within half a step of the decimals of its column', async () => {
    const angle = fc.double({ min: -720, max: 720, noNaN: true });
    await fc.assert(
      fc.asyncProperty(fc.nat(9), fc.tuple(angle, angle), angle, async (decimals, rows, instead) => {
        const text = `t,rz_deg\n${rows.map((row, key) => `${key},${row.toFixed(decimals)}\n`).join('')}`;
        const [track] = tracksOf(await openText(text, 'a.csv'));
        const values = track.values.slice();
        values[0] = (instead * Math.PI) / 180;
        const made = await rewritten(text, 'a.csv', [{ ...track, values }]);
        const [again] = tracksOf(await openText(made, 'a.csv'));
        const step = 10 ** -decimals * (Math.PI / 180);
        // Float64 rounding beside half a step.
        expect(Math.abs(again.values[0] - values[0])).toBeLessThanOrEqual(0.5 * step * (1 + 1e-9) + 1e-14);
        expect(again.values[3]).toBe(track.values[3]);
        expect(made.split('\n')[2]).toBe(text.split('\n')[2]);
      }),
    );
  });

  test('gives a noise floor that no rounding exceeds', async () => {
    // A turn of 10 deg/s in angles of two decimals at 60 a second: RULES, noise floor.
    const rows = Array.from({ length: 121 }, (_, key) => `${key / 60},${((10 * key) / 60).toFixed(2)}\n`);
    const [track] = tracksOf(await openText(`t,rz_deg\n${rows.join('')}`, 'a.csv'));
    const off = Math.abs(measure(playAs(track, 'as-written')).peakRate - (10 * Math.PI) / 180);
    const { rateFloor } = await import('@slewcurve/core');
    expect(off).toBeGreaterThan(0);
    expect(off).toBeLessThan(rateFloor(track, 0));
  });
});
