import { rotationSpline } from '@slewcurve/core';
import { expect, test } from 'vitest';
import { oneAxisTrack } from '../../support/any-track.js';

const DEGREES = 180 / Math.PI;

test('tension, continuity and bias go by key where they are lists, and continuity lets the rate jump', () => {
  const track = oneAxisTrack([0, 1, 2, 3], [0, 10, 40, 60]);
  const curve = rotationSpline(track, {
    kind: 'tension-continuity-bias',
    tension: [0, 1, 0, 0],
    continuity: [0, 0, 0.5, 0],
  });
  const rateAt = (t: number): number => curve.rate([0, 0, 0], t, 'own')[2] * DEGREES;
  expect(curve.continuity).toBe(0);
  expect(rateAt(1)).toBeCloseTo(0, 12);
  // Turns of 30° and 20°. In: ½(½·30 + 1½·20); out: ½(1½·30 + ½·20).
  expect(rateAt(2 - 1e-12)).toBeCloseTo(22.5, 8);
  expect(rateAt(2)).toBeCloseTo(27.5, 9);
});

test('a bias of 1 goes by the segment before the key alone, −1 by the one after', () => {
  const track = oneAxisTrack([0, 1, 3], [0, 10, 40]);
  const rateAt = (bias: number): number =>
    rotationSpline(track, { kind: 'tension-continuity-bias', bias }).rate([0, 0, 0], 1, 'own')[2] * DEGREES;
  // 2/(1 s + 2 s) times the turn.
  expect(rateAt(1)).toBeCloseTo(20 / 3, 10);
  expect(rateAt(-1)).toBeCloseTo(20, 10);
});
