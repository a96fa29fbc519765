import { readFileSync } from 'node:fs';
import { describe, expect, test } from 'vitest';
import { fitHalfAngle, greatestError } from '../../support/chebyshev-fit.js';

// The polynomials are inside the package; what is committed is read from its source, so that no copy of it can be what passes.
const source = readFileSync('packages/core/src/sampler/half-angle.ts', 'utf8');

/** Coefficients of one function, in rising powers, signs put back by the series' own (+ − + −). */
function committed(name: string): number[] {
  const body = /return([^;]+);/.exec(source.slice(source.indexOf(`function ${name}(`)))?.[1] ?? '';
  const sizes = [...body.matchAll(/(?<![\w.])\d+(?:\.\d+)?(?:e-\d+)?/g)].map(([text]) => Number(text));
  return sizes.map((size, power) => (power % 2 === 0 ? size : -size));
}

function committedBound(name: string): number {
  return Number(new RegExp(`const ${name} = ([\\d.]+);`).exec(source)?.[1]);
}

// π²/16 and a little: h is at most a quarter turn's arc, give or take the rounding of its two keys.
const WIDEST = 0.6169;

describe.each([
  { name: 'Near64', end: committedBound('NEAR_64') ** 2, degree: 3, cos: 8.5e-17, sin: 9.4e-18 },
  { name: 'Wide64', end: WIDEST, degree: 6, cos: 9.5e-17, sin: 1.2e-17 },
  { name: 'Near32', end: committedBound('NEAR_32') ** 2, degree: 2, cos: 5.6e-9, sin: 8e-10 },
  { name: 'Wide32', end: WIDEST, degree: 3, cos: 2.8e-8, sin: 3.1e-9 },
])('half-angle polynomials $name', ({ name, end, degree, cos, sin }) => {
  test.each(['cos', 'sin'] as const)('are what the fit gives: %s', (of) => {
    const fit = fitHalfAngle(of, end, degree);
    // So that what does not turn is held to the bit; the errors below are of the coefficients with it.
    if (name === 'Near32') fit[0] = 1;
    expect(committed(of === 'cos' ? `cosine${name}` : `sine${name}`)).toEqual(fit);
  });

  test('are no further off than their comments say', () => {
    expect(greatestError('cos', committed(`cosine${name}`), end)).toBeLessThanOrEqual(cos);
    expect(greatestError('sin', committed(`sine${name}`), end)).toBeLessThanOrEqual(sin);
  });
});

test('h / sin h is what the fit gives, and no further off than its comment says', () => {
  const end = committedBound('NEAR_SINE_64');
  const coefficients = committed('arcOverSine64').map(Math.abs);
  expect(coefficients).toEqual(fitHalfAngle('arcsin', end, 8));
  expect(greatestError('arcsin', coefficients, end)).toBeLessThanOrEqual(1.7e-17);
});

test('the fit itself is right: its error falls as the series says and Math.cos agrees', () => {
  const coefficients = fitHalfAngle('cos', WIDEST, 6);
  for (const u of [0, 0.1, 0.3, WIDEST]) {
    const value = coefficients.reduceRight((sum, c) => sum * u + c, 0);
    // Two roundings at most of numbers up to 1.
    expect(Math.abs(value - Math.cos(Math.sqrt(u)))).toBeLessThanOrEqual(2.3e-16);
  }
  expect(greatestError('cos', fitHalfAngle('cos', WIDEST, 2), WIDEST)).toBeGreaterThan(1e-6);
});
