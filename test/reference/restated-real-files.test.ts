// Whole-file edits on open captures. The files lie beside the project and are not shipped.
import { playAs, type RotationTrack } from '@slewcurve/core';
import { bufferSource, patchedBytes } from '@slewcurve/formats';
import { openFile } from '@slewcurve/job';
import { applySteps, type Step } from '@slewcurve/mend';
import { describe, expect, it } from 'vitest';
import { sharedFile } from '../support/shared-data.js';

const WALK = sharedFile('data/bvh/cmu/12_01_walk.bvh');

async function tracksOf(bytes: Uint8Array): Promise<readonly RotationTrack[]> {
  return (await openFile(bufferSource(bytes), { name: 'walk.bvh' })).file.clips[0].tracks;
}

/** The file's bytes after steps on all its tracks, written by its own plan. */
async function edited(bytes: Uint8Array, step: Omit<Step, 'clip' | 'track'>): Promise<Uint8Array> {
  const { file } = await openFile(bufferSource(bytes), { name: 'walk.bvh' });
  const { tracks } = applySteps(file.clips[0].tracks, [{ clip: '*', track: '*', ...step }], file.nodes);
  return patchedBytes(bytes, await file.plan(tracks, [], step.axes === undefined ? [] : [step.axes]));
}

function peaks(tracks: readonly RotationTrack[]): number[] {
  return tracks.map((track) => {
    const curve = playAs(track, 'as-written');
    return curve.peak(curve.start, curve.end).rate;
  });
}

describe.skipIf(WALK.absent)('whole-file edits on an open capture', () => {
  it('restated axes leave every peak speed within 1e-6 of itself, and the way back every byte', async () => {
    const bytes = WALK.read();
    const there = await edited(bytes, { verb: 'restate', axes: 'x -z y' });
    const was = peaks(await tracksOf(bytes));
    peaks(await tracksOf(there)).forEach((peak, i) =>
      expect(Math.abs(peak - was[i])).toBeLessThanOrEqual(1e-6 * was[i]),
    );
    const back = await edited(there, { verb: 'restate', axes: 'x z -y' });
    expect(Buffer.compare(back, bytes)).toBe(0);
  });

  it('a rounded Frame Time becomes the frame that it was rounded from, and no other byte', async () => {
    const bytes = WALK.read();
    const after = await edited(bytes, { verb: 're-time to grid', fps: 120 });
    const [old, now] = [bytes, after].map((one) =>
      new TextDecoder('latin1').decode(one).split(/^Frame Time:.*$/m),
    );
    expect(now).toEqual(old);
    const [track] = await tracksOf(after);
    expect(track.times[track.times.length - 1]).toBeCloseTo((track.times.length - 1) / 120, 9);
  });
});
