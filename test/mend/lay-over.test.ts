import {
  type RotationTrack,
  type SceneNode,
  angleBetween,
  expMap,
  keyOrientation,
  multiply,
  playAs,
  rotationTrack,
  turnAboutOwn,
  turnAboutParent,
  turnAboutWorld,
} from '@slewcurve/core';
import { applySteps, parseSentence, sayStep, type Step } from '@slewcurve/mend';
import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { applied, codeOf, numbersOf } from '../support/edit-acceptance.js';
import { grid, keyed, motions } from '../support/smooth-track.js';

fc.configureGlobal({ ...fc.readConfigureGlobal(), seed: 5 });

const DEGREES = 180 / Math.PI;
const size = fc.double({ min: -100, max: 100, noNaN: true });
const turns = fc.tuple(size, size, size);
const abouts = fc.constantFrom('own' as const, 'parent' as const, 'world' as const);

function poseOf(track: RotationTrack, key: number): Float64Array {
  return keyOrientation(new Float64Array(4), track, key);
}

/** A node on an arm that turns about z by 90° in 2 s, on a base that stands turned by 90° about x. */
const HALF = Math.SQRT1_2;
const nodes: readonly SceneNode[] = ['base', 'base/arm', 'base/arm/hand'].map((path, i) => ({
  path,
  parent: i - 1,
  rotation: i === 0 ? [HALF, 0, 0, HALF] : [0, 0, 0, 1],
  translation: [0, 0, 0],
  scale: [1, 1, 1],
  joint: false,
}));
const arm = rotationTrack({
  times: [0, 2],
  values: [0, 0, 0, 1, 0, 0, HALF, HALF],
  id: 'base/arm',
  clip: 'Wave',
});

function laid(hand: RotationTrack, step: Omit<Step, 'clip' | 'track' | 'verb'>): RotationTrack {
  const { tracks } = applySteps(
    [arm, hand],
    [{ verb: 'lay over', clip: 'Wave', track: 'base/arm/hand', ...step }],
    nodes,
  );
  if (!tracks[1]) throw new Error('Two tracks.');
  return tracks[1];
}

const hands = fc
  .tuple(motions, fc.constantFrom('LINEAR' as const, 'CUBICSPLINE' as const))
  .map(([motion, kind]): RotationTrack => ({
    ...keyed(motion, grid(20), kind),
    id: 'base/arm/hand',
    clip: 'Wave',
  }));

describe('lay over', () => {
  it('turns a key as core turns one, about three kinds of axes, and leaves all others to the bit', () => {
    fc.assert(
      fc.property(hands, turns, abouts, fc.integer({ min: 0, max: 19 }), (hand, turn, about, key) => {
        const after = laid(hand, { keys: [key], turn, about });
        const whole = Math.hypot(...turn) / DEGREES;
        fc.pre(whole > 1e-3);
        const q = poseOf(hand, key);
        // The arm, on the base: MATHS' p of a parent that moves.
        const parent = multiply(
          new Float64Array(4),
          [HALF, 0, 0, HALF],
          playAs(arm, 'as-written').orientation(new Float64Array(4), hand.times[key] ?? 0),
        );
        const wanted =
          about === 'own'
            ? turnAboutOwn(new Float64Array(4), q, turn, whole)
            : about === 'parent'
              ? turnAboutParent(new Float64Array(4), q, turn, whole)
              : turnAboutWorld(new Float64Array(4), q, parent, turn, whole);
        expect(angleBetween(poseOf(after, key), wanted) * DEGREES).toBeLessThan(1e-9);
        for (const other of Array.from({ length: 20 }, (_, i) => i).filter((i) => i !== key))
          expect(numbersOf(after, other)).toEqual(numbersOf(hand, other));
      }),
      { numRuns: 40 },
    );
  });

  it('is taken off again by the turn the other way round, within 1e-5 degrees', () => {
    fc.assert(
      fc.property(hands, turns, abouts, (hand, turn, about) => {
        const there = laid(hand, { turn, about });
        const back = laid(there, { turn: [-turn[0], -turn[1], -turn[2]], about });
        for (let key = 0; key < 20; key++)
          expect(angleBetween(poseOf(back, key), poseOf(hand, key)) * DEGREES).toBeLessThan(1e-5);
      }),
      { numRuns: 20 },
    );
  });

  it('gives three results for one turn where the axes are three', () => {
    const wave = { spin: [80, 140, -40], swing: [25, 10, 15], hertz: 0.4, phase: 1 } as const;
    const hand = { ...keyed(wave, grid(20), 'LINEAR'), id: 'base/arm/hand', clip: 'Wave' };
    const poses = (['own', 'parent', 'world'] as const).map((about) =>
      poseOf(laid(hand, { keys: [7], turn: [0, 30, 0], about }), 7),
    );
    for (const [a, b] of [
      [0, 1],
      [1, 2],
      [0, 2],
    ] as const)
      expect(angleBetween(poses[a] ?? [], poses[b] ?? []) * DEGREES).toBeGreaterThan(1);
  });

  it('turns a whole cubic about the parent’s axes without changing its own speeds between the keys', () => {
    fc.assert(
      fc.property(motions, turns, (motion, turn) => {
        const track = keyed(motion, grid(12), 'CUBICSPLINE');
        const { track: after } = applied(track, { verb: 'lay over', turn, about: 'parent' });
        const [before, then] = [playAs(track, 'as-written'), playAs(after, 'as-written')];
        const d = expMap(
          new Float64Array(4),
          turn.map((angle) => angle / DEGREES),
        );
        for (let t = 0.01; t < (track.times[11] ?? 0); t += 0.037) {
          const wanted = multiply(new Float64Array(4), d, before.orientation(new Float64Array(4), t));
          expect(angleBetween(then.orientation(new Float64Array(4), t), wanted) * DEGREES).toBeLessThan(1e-5);
        }
      }),
      { numRuns: 20 },
    );
  });

  it('fades over shoulders: full in the span, none beyond them', () => {
    const [track] = fc.sample(
      motions.map((motion) => keyed(motion, grid(40), 'LINEAR')),
      { numRuns: 1, seed: 2 },
    );
    if (!track) throw new Error('One track.');
    const time = (key: number): number => track.times[key] ?? 0;
    const { track: after } = applied(track, {
      verb: 'lay over',
      turn: [0, 20, 0],
      span: [time(15), time(20)],
      shoulders: time(5) - time(0),
    });
    const turned = Array.from({ length: 40 }, (_, key) =>
      Math.round(angleBetween(poseOf(track, key), poseOf(after, key)) * DEGREES * 1e6),
    );
    expect(turned.slice(15, 21)).toEqual(Array.from({ length: 6 }, () => 20e6));
    expect([...turned.slice(0, 11), ...turned.slice(25)].every((angle) => angle === 0)).toBe(true);
    // m(0.6) of the minimum-jerk step: 0.68256.
    expect(turned[22]).toBeCloseTo(20e6 * 0.68256, -1);
    expect(turned[13]).toBeCloseTo(20e6 * 0.68256, -1);
  });

  it('needs a turn, and for the world’s axes the file around it', () => {
    const [track] = fc.sample(hands, { numRuns: 1, seed: 2 });
    expect(codeOf(() => applied(track ?? arm, { verb: 'lay over' }))).toBe('step.needs-turn');
    expect(codeOf(() => applied(track ?? arm, { verb: 'lay over', turn: [1, 0, 0], about: 'world' }))).toBe(
      'step.needs-parents',
    );
  });

  it('is said about its axes', () => {
    const step = { verb: 'lay over', clip: 'Walk', track: 'Neck', keys: [19], turn: [0, 10, 0] as const };
    const said = "Lay a turn over key 19 of Neck in Walk, of (0, 10, 0)°, about its parent's axes.";
    expect(sayStep({ ...step, about: 'parent' })).toBe(said);
    expect(parseSentence(said)).toEqual({ ...step, about: 'parent' });
  });
});
