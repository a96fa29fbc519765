import { STORAGE_MODELS, angleFloor, packed, rotationTrack } from '@slewcurve/core';
import { playbackMatrix } from '@slewcurve/job';
import * as fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { oneAxisTrack } from '../support/any-track.js';
import { grid, smoothTracks } from '../support/smooth-track.js';

fc.configureGlobal({ ...fc.readConfigureGlobal(), seed: 6 });

const DEGREES = 180 / Math.PI;

describe('playbackMatrix', () => {
  test('as written at every moment departs by nothing, and packed by no more than the noise floor of what is linear', () => {
    fc.assert(
      fc.property(smoothTracks, fc.constantFrom(...STORAGE_MODELS), (track, storage) => {
        const own = playbackMatrix(track, { ticks: [30], reading: 'own' }).cells[0];
        expect(own).toMatchObject({ playback: 'as-written', departure: 0 });
        if (track.interpolation !== 'LINEAR') return;
        const [cell] = playbackMatrix(track, { ticks: [], reading: 'own', storage }).cells;
        // Between two keys that are each off by f a short arc is off by f/cos(θ/4) at most (MATHS 6.1); these steps are under 30°.
        const floor = angleFloor(packed(track, storage).storage) * DEGREES;
        expect(cell.departure).toBeLessThanOrEqual(1.01 * floor);
      }),
      { numRuns: 10 },
    );
  });

  test('a sign change plays 10° as 350° where components are joined, and the cell tells when', () => {
    const half = 5 / DEGREES;
    const track = rotationTrack({
      times: [0, 1],
      values: [0, 0, 0, 1, 0, 0, -Math.sin(half), -Math.cos(half)],
    });
    const { cells } = playbackMatrix(track, { ticks: [], reading: 'own' });
    const chord = cells.find(({ playback }) => playback === 'raw-chord')!;
    // Half-way the two go opposite ways round: 5° one way, 175° the other.
    expect(chord.departure).toBeCloseTo(180, 0);
    expect(chord.departureAt).toBeCloseTo(0.5, 6);
    expect(cells.find(({ playback }) => playback === 'short-way')!.departure).toBeLessThan(1e-6);
  });

  test('a track of no and of one key has cells of zeros', () => {
    for (const track of [rotationTrack({ times: [], values: [] }), oneAxisTrack(grid(1), [20])])
      for (const cell of playbackMatrix(track, { ticks: [24], reading: 'nearest' }).cells)
        expect(cell).toMatchObject({ worstRate: 0, departure: 0 });
  });
});
