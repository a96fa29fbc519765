import { type RotationTrack, rotationTrack } from '@slewcurve/core';
import { type EditProof, type EditResult, proveEdit, verbNamed } from '@slewcurve/mend';
import { describe, expect, it } from 'vitest';
import { grid, keyed, turned } from '../support/smooth-track.js';

const WAVE = { spin: [20, 35, -10], swing: [25, 10, 15], hertz: 0.4, phase: 1 } as const;

function lifted(): { track: RotationTrack; result: EditResult } {
  const track = turned(keyed(WAVE, grid(20), 'LINEAR'), [6, 15], [12, 0, 0]);
  const step = { verb: 'lift out', clip: '', track: '', keys: [6, 15] };
  return { track, result: verbNamed('lift out').apply(track, step) };
}

/** The proof where one stored number of the new track is not what the edit made it. */
function proofWith(number: number, by: number, extra: Partial<EditResult> = {}): EditProof {
  const { track, result } = lifted();
  const values = result.track.values.map((value, i) => (i === number ? value + by : value));
  return proveEdit(track, rotationTrack({ ...result.track, values }), { ...result, ...extra });
}

describe('proveEdit', () => {
  it('holds for an honest edit and tells how far it went', () => {
    const { track, result } = lifted();
    const proof = proveEdit(track, result.track, result);
    expect(proof).toMatchObject({ holds: true, strays: [], keptChanged: [], sameTimes: true, outside: 0 });
    // The key itself is among the samples, and moves most.
    expect(proof.inside).toBeCloseTo(result.largest, 9);
    expect([6 / 30, 15 / 30]).toContain(proof.insideAt);
  });

  it('finds a stray number, by the last bit, and a motion that changes between two changed keys that lie apart', () => {
    const nudged = proofWith(4 * 10, 2 ** -53);
    expect(nudged).toMatchObject({ holds: false, strays: [10] });
    const moved = proofWith(4 * 10, 1e-3);
    expect(moved.strays).toEqual([10]);
    expect(moved.outside).toBeGreaterThan(0.01);
    expect(Math.abs(moved.outsideAt - 10 / 30)).toBeLessThan(1 / 30);
  });

  it('finds a result that owns up to fewer keys or a shorter span than it changed', () => {
    expect(proofWith(0, 0, { changed: [6] })).toMatchObject({ holds: false, strays: [15] });
    const cut = proofWith(0, 0, { span: [5 / 30, 7 / 30] });
    expect(cut.holds).toBe(false);
    expect(cut.outside).toBeGreaterThan(1);
    const { span: _, ...still } = lifted().result;
    expect(proveEdit(lifted().track, still.track, still).holds).toBe(false);
  });

  it('finds a kept key that changed and a time that moved', () => {
    const { track, result } = lifted();
    expect(proveEdit(track, result.track, result, [5, 15])).toMatchObject({
      holds: false,
      keptChanged: [15],
    });
    const times = result.track.times.map((time, key) => (key === 6 ? time + 1e-4 : time));
    expect(proveEdit(track, rotationTrack({ ...result.track, times }), result)).toMatchObject({
      holds: false,
      sameTimes: false,
    });
  });

  it('lets a change of the first or last key reach the ends, which are held', () => {
    const track = keyed(WAVE, grid(8), 'STEP');
    for (const key of [0, 7]) {
      const bad = turned(track, [key], [30, 0, 0]);
      const result = verbNamed('lift out').apply(bad, { verb: 'lift out', clip: '', track: '', keys: [key] });
      expect(proveEdit(bad, result.track, result).holds).toBe(true);
    }
  });

  it('takes tracks of no keys', () => {
    const none = rotationTrack({ times: [], values: [] });
    expect(proveEdit(none, none, { changed: [], inserted: [] }).holds).toBe(true);
  });
});
