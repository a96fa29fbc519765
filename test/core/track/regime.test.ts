import { describe, expect, test } from 'vitest';
import { medianGap, regime, rotationTrack } from '@slewcurve/core';

function track(times: readonly number[]) {
  return rotationTrack({ times, values: times.flatMap(() => [0, 0, 0, 1]) });
}
const every = (gap: number) => track(Array.from({ length: 9 }, (_, key) => key * gap));

describe('regime', () => {
  test('20 keys a second are dense, fewer are sparse', () => {
    expect(regime(every(1 / 20))).toBe('dense');
    expect(regime(every(1 / 19))).toBe('sparse');
  });

  test('one and a half frames of the grid are dense whatever the rate', () => {
    expect(regime(every(1 / 16), 24)).toBe('dense');
    expect(regime(every(1 / 15.9), 24)).toBe('sparse');
  });

  test('a float32 clock does not tip the balance', () => {
    const times = Float32Array.from({ length: 40 }, (_, key) => 600 + key / 20);
    expect(regime(track([...times]))).toBe('dense');
  });

  test('a track without gaps is sparse', () => {
    expect(regime(track([]))).toBe('sparse');
    expect(regime(track([1]))).toBe('sparse');
  });

  test('the median gap does not hang on a few wide ones', () => {
    expect(medianGap(track([0, 1, 2, 3, 50, 51]))).toBe(1);
    expect(medianGap(track([0]))).toBe(0);
  });
});
