import { type Curve, type PacedCurve, angleBetween, playAs, rotationSpline } from '@slewcurve/core';
import * as fc from 'fast-check';
import { expect } from 'vitest';
import { anyTrack } from './any-track.js';

const RADIANS = Math.PI / 180;

const tracks = anyTrack(1.5);
/** C² paths. */
export const smooth: fc.Arbitrary<Curve> = tracks.map((track) => rotationSpline(track, { kind: 'c2' }));
/** Piecewise great arcs. */
export const arcs: fc.Arbitrary<Curve> = tracks.map((track) => playAs(track, 'short-way'));
/** A place along something, off its ends. */
export const share: fc.Arbitrary<number> = fc.double({ min: 0.05, max: 0.95, noNaN: true });

/** Places along a curve's time, off its knots. */
export function* timesOf(curve: Curve, count = 24): Generator<number> {
  for (let i = 0; i < count; i++) {
    const t = curve.start + ((i + 0.37) / count) * (curve.end - curve.start);
    if (curve.knots.every((knot) => Math.abs(knot - t) > 2e-3)) yield t;
  }
}

/** rad/s. */
export function speedAt(curve: Curve, t: number): number {
  return Math.hypot(...curve.rate([0, 0, 0], t, 'own'));
}

/** What every pace owes: the path at the old time, an area that stays, speeds that are the derivatives. */
export function keepsThePath(curve: Curve, paced: PacedCurve): void {
  const { retiming } = paced;
  let before = -Infinity;
  for (const t of timesOf(paced)) {
    const old = retiming.oldTime(t);
    expect(old).toBeGreaterThanOrEqual(before);
    before = old;
    expect(angleBetween(paced.orientation([], t), curve.orientation([], old))).toBe(0);
    // There and back by the other map: where the path rests, old times have no place of their own.
    const moves = Math.min(speedAt(curve, old), speedAt(paced, t)) > 1e-3;
    expect(moves ? Math.abs(retiming.newTime(old) - t) : 0).toBeLessThan(1e-5 * (1 + paced.end));
  }
  expect(retiming.oldTime(paced.end)).toBe(curve.end);
  expect(paced.length(paced.start, paced.end)).toBeCloseTo(curve.length(curve.start, curve.end), 12);
  // The area under the exact speed is that angle: 0.01° asked by the acceptance, at most some 600 places here.
  const area = areaUnder(paced);
  expect(Math.abs(area - paced.length(paced.start, paced.end))).toBeLessThan(0.01 * RADIANS);
  for (const knot of curve.knots)
    expect(
      angleBetween(paced.orientation([], retiming.newTime(knot)), curve.orientation([], knot)),
    ).toBeLessThan(1e-9);
}

/** ∫ speed by Gauss's two points over parts of every piece, about 300 parts in all. */
function areaUnder(curve: Curve): number {
  let area = 0;
  const parts = Math.max(8, Math.ceil(300 / (curve.knots.length - 1)));
  for (let i = 0; i + 1 < curve.knots.length; i++) {
    const gap = (curve.knots[i + 1] - curve.knots[i]) / parts;
    for (let part = 0; part < parts; part++)
      for (const at of [0.5 - 0.5 / Math.sqrt(3), 0.5 + 0.5 / Math.sqrt(3)])
        area += (gap / 2) * speedAt(curve, curve.knots[i] + (part + at) * gap);
  }
  return area;
}
