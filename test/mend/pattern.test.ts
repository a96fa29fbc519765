import { matchesPattern } from '@slewcurve/mend';
import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';

fc.configureGlobal({ ...fc.readConfigureGlobal(), seed: 2 });

describe('matchesPattern', () => {
  it.each([
    ['*', '', true],
    ['*', 'Hips/Spine', true],
    ['Hips/*', 'Hips/Spine/Neck', true],
    ['*/Neck', 'Hips/Spine/Neck', true],
    ['H*S*k', 'Hips/Spine/Neck', true],
    ['H*x*k', 'Hips/Spine/Neck', false],
    ['aba*aba', 'aba', false],
    ['a*b*a', 'aba', true],
    ['ab*ba', 'aba', false],
    ['Hips', 'hips', false],
    ['Arm.l', 'Armxl', false],
    ['[2]', '2', false],
    ['', '', true],
    ['', 'a', false],
  ])('%j on %j: %s', (pattern, name, fits) => {
    expect(matchesPattern(pattern, name)).toBe(fits);
  });

  it('agrees with the same pattern as a regular expression', () => {
    const text = fc.string({ unit: fc.constantFrom('a', 'b', '/', '*', '.'), maxLength: 12 });
    fc.assert(
      fc.property(text, text, (pattern, name) => {
        const regular = new RegExp(
          `^${pattern
            .split('*')
            .map((part) => part.replaceAll('.', '\\.'))
            .join('.*')}$`,
        );
        expect(matchesPattern(pattern, name)).toBe(regular.test(name));
      }),
      { numRuns: 500 },
    );
  });
});
