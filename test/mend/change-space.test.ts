import {
  type RotationTrack,
  type SceneNode,
  angleBetween,
  multiply,
  playAs,
  replaceTrack,
  toEuler,
} from '@slewcurve/core';
import { applySteps, proveEdit } from '@slewcurve/mend';
import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { anyQuaternion } from '../support/any-quaternion.js';
import { codeOf } from '../support/edit-acceptance.js';
import { grid, keyed, motions } from '../support/smooth-track.js';

fc.configureGlobal({ ...fc.readConfigureGlobal(), seed: 6 });

const DEGREES = 180 / Math.PI;
const WAVE = { spin: [20, 35, -10], swing: [25, 10, 15], hertz: 0.4, phase: 1 } as const;
const PATHS = ['Crane', 'Crane/Arm', 'Crane/Arm/Head'];

function nodesOf(rest: readonly (readonly number[])[]): SceneNode[] {
  return PATHS.map((path, i) => ({
    path,
    parent: i - 1,
    rotation: rest[i],
    translation: [0, 0, 0],
    scale: [1, 1, 1],
    joint: false,
  }));
}

const IDENTITIES = PATHS.map(() => [0, 0, 0, 1]);

/** Where the last node stands in the world at a time, by its tracks, at rest where it has none. */
function inWorld(tracks: readonly RotationTrack[], nodes: readonly SceneNode[], t: number): number[] {
  return nodes.reduce<number[]>(
    (whole, { path, rotation }) => {
      const track = tracks.find(({ id }) => id === path);
      return multiply<number[]>([], whole, track ? playAs(track, 'as-written').orientation([], t) : rotation);
    },
    [0, 0, 0, 1],
  );
}

function worst(times: readonly number[], was: (t: number) => number[], is: (t: number) => number[]): number {
  return Math.max(...times.map((t) => angleBetween(was(t), is(t)) * DEGREES));
}

const LOOKS = Array.from({ length: 97 }, (_, i) => (i / 96) * 1.2);

describe('change space', () => {
  it('makes world numbers the parent’s: the world shows what was stored, within 0.01°, between keys too', () => {
    const cases = fc.tuple(motions, motions, anyQuaternion, fc.constantFrom('LINEAR', 'CUBICSPLINE'));
    fc.assert(
      fc.property(cases, ([crane, head, rest, mode]) => {
        const nodes = nodesOf([[0, 0, 0, 1], rest, [0, 0, 0, 1]]);
        const tracks = [
          { ...keyed(crane, grid(7, 5), 'LINEAR'), id: PATHS[0], clip: '' },
          {
            ...keyed(head, grid(13, 10), mode === 'LINEAR' ? 'LINEAR' : 'CUBICSPLINE'),
            id: PATHS[2],
            clip: '',
          },
        ];
        const { tracks: after, results } = applySteps(
          tracks,
          [{ verb: 'change space', clip: '*', track: PATHS[2], space: 'parent' }],
          nodes,
        );
        expect(after[0]).toBe(tracks[0]);
        const stored = playAs(tracks[1], 'as-written');
        expect(
          worst(
            LOOKS,
            (t) => stored.orientation([], t),
            (t) => inWorld(after, nodes, t),
          ),
        ).toBeLessThanOrEqual(0.01);
        expect(proveEdit(tracks[1], after[1], results[0].result).holds).toBe(true);
        const { tracks: back } = applySteps(
          after,
          [{ verb: 'change space', clip: '*', track: PATHS[2], space: 'world' }],
          nodes,
        );
        const again = playAs(back[1], 'as-written');
        expect(
          worst(
            LOOKS,
            (t) => stored.orientation([], t),
            (t) => again.orientation([], t),
          ),
        ).toBeLessThanOrEqual(0.02);
      }),
      { numRuns: 12 },
    );
  });

  it('takes a whole file of world numbers at once: each parent as it is stored, not as it becomes', () => {
    const nodes = nodesOf(IDENTITIES);
    const world = PATHS.map((id, i) => ({
      ...keyed({ ...WAVE, spin: [10 * i, 20, 30 - 10 * i] }, grid(13, 10), 'LINEAR'),
      id,
      clip: '',
    }));
    const step = { verb: 'change space', clip: '*', track: '*' } as const;
    const { tracks: local } = applySteps(world, [{ ...step, space: 'parent' }], nodes);
    expect(local[0]).toBe(world[0]);
    const stored = playAs(world[2], 'as-written');
    // Each of two links is within 0.01°.
    expect(
      worst(
        LOOKS,
        (t) => stored.orientation([], t),
        (t) => inWorld(local, nodes, t),
      ),
    ).toBeLessThanOrEqual(0.02);
    const { tracks: back } = applySteps(local, [{ ...step, space: 'world' }], nodes);
    const again = playAs(back[2], 'as-written');
    expect(
      worst(
        LOOKS,
        (t) => stored.orientation([], t),
        (t) => again.orientation([], t),
      ),
    ).toBeLessThanOrEqual(0.04);
  });

  it('keeps the times where asked, exact at every key, for files whose tracks share rows', () => {
    const nodes = nodesOf(IDENTITIES);
    const head = keyed(WAVE, grid(13, 10), 'LINEAR');
    const angles = replaceTrack(head, {
      interpolation: 'EULER',
      sequence: 'ZXY',
      values: Float64Array.from(
        [...head.times.keys()].flatMap((key) =>
          toEuler<number[]>([], head.values.subarray(4 * key, 4 * key + 4), 'ZXY'),
        ),
      ),
    });
    const tracks = [
      { ...keyed({ ...WAVE, phase: 0 }, grid(13, 10), 'LINEAR'), id: PATHS[1], clip: '' },
      { ...angles, id: PATHS[2], clip: '' },
    ];
    const step = {
      verb: 'change space',
      clip: '*',
      track: PATHS[2],
      space: 'parent',
      store: 'frames',
    } as const;
    const { tracks: after } = applySteps(tracks, [step], nodes);
    expect(after[1].times).toEqual(tracks[1].times);
    expect([after[1].interpolation, after[1].sequence]).toEqual(['EULER', 'ZXY']);
    const stored = playAs(tracks[1], 'as-written');
    expect(
      worst(
        [...head.times],
        (t) => stored.orientation([], t),
        (t) => inWorld(after, nodes, t),
      ),
    ).toBeLessThan(1e-9);
  });

  it('leaves a root alone, and refuses what it knows no parent of, and STEP', () => {
    const nodes = nodesOf(IDENTITIES);
    const root = { ...keyed(WAVE, grid(4), 'LINEAR'), id: PATHS[0], clip: '' };
    const step = { verb: 'change space', clip: '*', track: '*', space: 'world' } as const;
    expect(applySteps([root], [step], nodes).tracks[0]).toBe(root);
    expect(codeOf(() => applySteps([root], [step]))).toBe('step.needs-parents');
    expect(codeOf(() => applySteps([root], [{ ...step, space: undefined }], nodes))).toBe('step.needs-space');
    const held = { ...keyed(WAVE, grid(4), 'STEP'), id: PATHS[1], clip: '' };
    expect(codeOf(() => applySteps([held], [step], nodes))).toBe('step.no-convert');
  });
});
