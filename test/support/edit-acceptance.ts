import { type RotationTrack, VALUES_PER_KEY } from '@slewcurve/core';
import { type EditResult, type Step, proveEdit, verbNamed } from '@slewcurve/mend';
import { expect } from 'vitest';

/** Runs a step on a track and asserts what every edit owes (EDITS' U): stray bytes none, kept bytes none, 1e-7° outside. */
export function applied(track: RotationTrack, step: Omit<Step, 'clip' | 'track'>): EditResult {
  const timesBefore = Float64Array.from(track.times);
  const valuesBefore = Float64Array.from(track.values);
  const result = verbNamed(step.verb).apply(track, { clip: track.clip, track: track.id, ...step });
  expect(track.times, 'the given track is not written').toEqual(timesBefore);
  expect(track.values, 'the given track is not written').toEqual(valuesBefore);
  const proof = proveEdit(track, result.track, result, step.keep);
  expect(proof.strays).toEqual([]);
  expect(proof.keptChanged).toEqual([]);
  expect(proof.sameTimes).toBe(true);
  expect(proof.outside, 'degrees outside the span').toBeLessThanOrEqual(1e-7);
  expect(proof.holds).toBe(true);
  return result;
}

/** All numbers that one key stores. */
export function numbersOf(track: RotationTrack, key: number): number[] {
  const size = VALUES_PER_KEY[track.interpolation];
  return [...track.values.subarray(key * size, (key + 1) * size)];
}

/** The code of the SlewcurveError that a call throws; undefined where it throws nothing. */
export function codeOf(call: () => unknown): string | undefined {
  try {
    call();
  } catch (error) {
    if (error instanceof Error && 'code' in error && typeof error.code === 'string') return error.code;
    throw error;
  }
  return undefined;
}
