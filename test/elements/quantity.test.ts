import { sayAngle, sayCount, sayList, sayNumber, sayRate, saySpan, sayTime } from '@slewcurve/elements/plot';
import { describe, expect, test } from 'vitest';

describe('numbers as people read them', () => {
  test('keep three digits, whole digits always, thousands apart', () => {
    expect([2022.4, 114.04, 12.43, 0.633, 0.0123, 1_080_000, 0].map((value) => sayNumber(value))).toEqual([
      '2,022',
      '114',
      '12.4',
      '0.633',
      '0.0123',
      '1,080,000',
      '0',
    ]);
  });

  test('have a true minus, and none before nothing', () => {
    expect([-12.43, -0.0000001].map((value) => sayNumber(value))).toEqual(['−12.4', '−0.000001 or less']);
    expect(sayTime(-0.0001)).toBe('0.000 s');
  });

  test('say none where there is no number', () => {
    expect([sayRate(Number.NaN), sayAngle(Number.POSITIVE_INFINITY)]).toEqual(['none deg/s', 'none°']);
  });

  test('carry their unit', () => {
    expect([sayRate(36), sayAngle(12.4), sayTime(0.6333), saySpan(0.0333), saySpan(45)]).toEqual([
      '36 deg/s',
      '12.4°',
      '0.633 s',
      '33.3 ms',
      '45 s',
    ]);
  });

  test('count and list in words', () => {
    expect([0, 1, 2022].map((count) => sayCount(count, 'key'))).toEqual(['no keys', '1 key', '2,022 keys']);
    expect(sayList(['a', 'b', 'c'])).toBe('a, b and c');
  });
});
