import { describe, expect, test } from 'vitest';
import type { SceneNode } from '@slewcurve/core';
import { surveyTrack } from '@slewcurve/survey';
import { grid, keyed, turned } from '../support/smooth-track.js';

const AT_REST = { rotation: [0, 0, 0, 1], translation: [0, 0, 0], scale: [1, 1, 1], joint: true };

/** Shoulder, then an elbow 0.3 m and a hand 0.4 m further on, at right angles: 0.5 m. */
const ARM: readonly SceneNode[] = [
  { ...AT_REST, path: 'Arm', parent: -1 },
  { ...AT_REST, path: 'Arm/Elbow', parent: 0, translation: [0.3, 0, 0] },
  { ...AT_REST, path: 'Arm/Elbow/Hand', parent: 1, translation: [0, 0.4, 0] },
];

const smooth = keyed({ spin: [0, 20, 0], swing: [0, 0, 0], hertz: 0.4, phase: 1 }, grid(90), 'LINEAR');
const popped = turned(smooth, [30], [0, 0, 12]);

function effectAt(node: number, nodes: readonly SceneNode[], metres?: number) {
  const track = { ...popped, source: { ...popped.source, node } };
  const finding = surveyTrack(track, { nodes, ...(metres !== undefined && { metres }) }).find(
    ({ rule }) => rule === 'jump.lone-key',
  )!;
  return { value: finding.value, effect: finding.effect };
}

describe('visible effect', () => {
  test('a shoulder that pops by 12° moves the hand, 0.5 m away, by 105 mm', () => {
    const { value, effect } = effectAt(0, ARM, 1);
    expect(effect?.unit).toBe('mm');
    // The chord over the fitted offset, six significant digits.
    expect(effect!.value).toBeCloseTo(1000 * Math.sin((value * Math.PI) / 360), 2);
    expect(Math.abs(effect!.value - 105)).toBeLessThan(2);
  });

  test('of an elbow it is the hand 0.4 m away; of the hand nothing can be told', () => {
    expect(effectAt(1, ARM, 1).effect!.value / effectAt(0, ARM, 1).effect!.value).toBeCloseTo(0.8, 5);
    expect(effectAt(2, ARM, 1).effect).toBeUndefined();
  });

  test('scales and turns of parents count, and so does the unit', () => {
    const turnedArm = ARM.map((node, i) => (i === 0 ? { ...node, rotation: [0, 0, 1, 0] } : node));
    expect(effectAt(0, turnedArm, 1)).toEqual(effectAt(0, ARM, 1));
    const doubled = ARM.map((node, i) => (i === 0 ? { ...node, scale: [2, 2, 2] } : node));
    expect(effectAt(0, doubled, 0.5).effect!.value).toBeCloseTo(effectAt(0, ARM, 1).effect!.value, 3);
  });

  test('without a unit, or without a tree, nothing is told', () => {
    expect(effectAt(0, ARM).effect).toBeUndefined();
    expect(effectAt(0, [], 1).effect).toBeUndefined();
  });

  test('a camera, or what carries one, is told in pixels of a picture 1,080 high', () => {
    const camera = { verticalView: Math.PI / 2 };
    const rig = ARM.map((node, i) => (i === 2 ? { ...node, camera } : node));
    const { value, effect } = effectAt(2, rig);
    expect(effect!.unit).toBe('px');
    // Of a view of 90° the picture is two focal lengths high.
    expect(effect!.value).toBeCloseTo(540 * Math.tan((value * Math.PI) / 180), 2);
    expect(effectAt(0, rig).effect).toMatchObject({ unit: 'px' });
  });

  test('a ring of parents ends', () => {
    const ring = ARM.map((node, i) => ({ ...node, parent: (i + 2) % 3 }));
    expect(effectAt(0, ring, 1).effect?.unit).toBe('mm');
  });
});
