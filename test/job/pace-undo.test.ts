import { type RotationTrack, playAs } from '@slewcurve/core';
import { VERBS } from '@slewcurve/mend';
import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { type GltfJson, Packer, glb } from '../support/gltf-bytes.js';
import { SETTINGS, mendBy } from '../support/mended.js';
import { peakOf, travelled } from '../support/pace-acceptance.js';
import { dense, sparse } from '../support/pace-tracks.js';

fc.configureGlobal({ ...fc.readConfigureGlobal(), seed: 5 });

/** A GLB of one turning node, and a second one whose pace may be copied. */
function fileOf(track: RotationTrack, other: RotationTrack): Uint8Array {
  const packer = new Packer();
  const samplers = [track, other].map(({ times, values, interpolation }) => ({
    input: packer.add('SCALAR', [...times]),
    output: packer.add('VEC4', [...values]),
    interpolation,
  }));
  const json: GltfJson = {
    ...packer.json,
    nodes: [{ name: 'arm' }, { name: 'other' }],
    animations: [
      {
        name: 'Move',
        samplers,
        channels: samplers.map((_, node) => ({ sampler: node, target: { node, path: 'rotation' } })),
      },
    ],
  };
  return glb(json, packer.data);
}

/** A step of every pace verb, by what the track is like. */
function stepsFor(track: RotationTrack): readonly object[] {
  const { start, end } = playAs(track, 'as-written');
  const [at, length] = [start + 0.4 * (end - start), end - start];
  const rate = 0.8 * peakOf(track);
  const press = { verb: 'shape', at, by: 0.1 * rate, reach: length / 6 };
  return [
    { verb: 'ease in/out' },
    { verb: 'even out' },
    { verb: 'cap', rate },
    press,
    { ...press, ends: 'run' },
    { ...press, ends: 'go' },
    { verb: 'copy pace', fromTrack: 'other' },
    { verb: 'match', at: end, shoulders: length / 3, ends: 'run' },
    { verb: 'hold', at, seconds: 0.3 },
    { verb: 'set marks', marks: [[at, at + 0.05 * length]] },
    { verb: 'stretch', seconds: 1.5 * length },
    { verb: 'shrink', seconds: 0.7 * length },
    { verb: 'reverse' },
    { verb: 'there and back' },
    { verb: 'whole turns', keys: [1], turns: 2 },
    ...(track.interpolation === 'LINEAR' ? [{ verb: 'ease through' }] : []),
  ];
}

function moving(track: RotationTrack): boolean {
  return travelled(track) > 20 && track.times.length > 2;
}

describe('undo', () => {
  it('gives the very bytes back after every pace verb, on random tracks, sparse and dense', async () => {
    const tracks = [
      ...fc.sample(sparse.filter(moving), { numRuns: 2, seed: 4 }),
      ...fc.sample(dense.filter(moving), { numRuns: 1, seed: 4 }),
    ];
    const used = new Set<string>();
    for (const [i, track] of tracks.entries()) {
      const bytes = fileOf(track, tracks[(i + 1) % tracks.length]);
      for (const step of stepsFor(track)) {
        const named = { clip: 'Move', track: 'arm', verb: '', ...step };
        // mendBy takes every step back and compares bytes; beyond the span it shows no change.
        const { steps } = await mendBy(SETTINGS, bytes, named);
        expect(steps[0].changed, named.verb).toBeGreaterThan(0);
        used.add(named.verb);
      }
    }
    // Re-timing to a grid takes its node along too, but is no pace.
    const paced = VERBS.map(({ name, reads }) => (reads.includes('with') ? name : '')).filter(
      (name) => name !== '' && name !== 're-time to grid',
    );
    expect(paced.filter((name) => !used.has(name))).toEqual([]);
  });
});
