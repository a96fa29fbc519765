import { type RotationTrack, angleBetween, playAs } from '@slewcurve/core';
import {
  type Bend,
  type EditResult,
  type EditScene,
  type Price,
  type Repaced,
  type Step,
  proveEdit,
  verbNamed,
} from '@slewcurve/mend';
import { expect } from 'vitest';

const DEGREES = 180 / Math.PI;

/** A pace edit's result, with what it did to time. */
export interface PaceResult extends EditResult {
  readonly repaced: Repaced;
  readonly price: Price;
  readonly bends: readonly Bend[];
}

/** Runs a pace step and asserts what every one owes (EDITS' U): nothing but the clock is other outside the span, kept keys keep their values. */
export function repaced(
  track: RotationTrack,
  step: Omit<Step, 'clip' | 'track'>,
  scene?: EditScene,
): PaceResult {
  const [times, values] = [track.times.slice(), track.values.slice()];
  const result = verbNamed(step.verb).apply(track, { clip: track.clip, track: track.id, ...step }, scene);
  expect(track.times, 'the given track is not written').toEqual(times);
  expect(track.values, 'the given track is not written').toEqual(values);
  const proof = proveEdit(track, result.track, result, step.keep);
  expect(proof.strays).toEqual([]);
  expect(proof.keptChanged).toEqual([]);
  expect(proof.holds, `outside the span ${proof.outside}° at ${proof.outsideAt} s`).toBe(true);
  const { times: news } = result.track;
  for (let key = 1; key < news.length; key++) expect(news[key]).toBeGreaterThan(news[key - 1]);
  const { repaced: clock, price, bends } = result;
  if (!clock || !price || !bends) throw new Error('a pace verb says how time runs and what it costs');
  expect(price.seconds).toBeCloseTo(news[news.length - 1] - times[times.length - 1], 9);
  return { ...result, repaced: clock, price, bends };
}

/** Largest distance of a new key from the old path, degrees, at the old time that the retiming says. */
export function offThePath(
  track: RotationTrack,
  { track: after, repaced: { retiming } }: PaceResult,
): number {
  const [old, now] = [playAs(track, 'as-written'), playAs(after, 'as-written')];
  let most = 0;
  for (const time of after.times)
    most = Math.max(
      most,
      angleBetween(now.orientation([], time), old.orientation([], retiming.oldTime(time))),
    );
  return most * DEGREES;
}

/** Angle turned by a track as it is written, degrees. */
export function travelled(track: RotationTrack): number {
  const curve = playAs(track, 'as-written');
  return curve.length(curve.start, curve.end) * DEGREES;
}

/** Greatest speed of a track as it is written, deg/s. */
export function peakOf(track: RotationTrack): number {
  const curve = playAs(track, 'as-written');
  return curve.peak(curve.start, curve.end).rate * DEGREES;
}
