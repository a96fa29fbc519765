import { linearScale, overshoots, tracePath, withinMotion } from '@slewcurve/elements/plot';
import { describe, expect, test } from 'vitest';

const place = { left: 0, width: 1, base: 100, height: 100 };
const columns = (greatest: number[], least = greatest): { greatest: Float32Array; least: Float32Array } => ({
  greatest: Float32Array.from(greatest),
  least: Float32Array.from(least),
});

describe('the trace', () => {
  test('is one point a column where a column holds one speed', () => {
    expect(tracePath(columns([10, 10, 20]), linearScale(100), place)).toBe('M0.5 90L1.5 90L2.5 80');
  });

  test('draws greatest and least where a column holds many, nearer end first', () => {
    expect(tracePath(columns([10, 90], [10, 10]), linearScale(100), place)).toBe('M0.5 90L1.5 90L1.5 10');
    expect(tracePath(columns([90, 90], [90, 10]), linearScale(100), place)).toBe('M0.5 10L1.5 10L1.5 90');
  });

  test('breaks where there is no motion', () => {
    expect(tracePath(columns([10, Number.NaN, 10]), linearScale(100), place)).toBe('M0.5 90M2.5 90');
    const cut = withinMotion(columns([5, 5, 5, 5]), { from: 0, to: 4 }, { start: 0, end: 2.5 });
    expect([...cut.greatest]).toEqual([5, 5, 5, Number.NaN]);
  });

  test('says what is faster than the paper is tall, the fastest of neighbours', () => {
    expect(overshoots(columns([1, 200, 300, 1, 1, 150]), linearScale(100), place, 3)).toEqual([
      { x: 2.5, speed: 300 },
      { x: 5.5, speed: 150 },
    ]);
  });
});
