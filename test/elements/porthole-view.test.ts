import { playAs } from '@slewcurve/core';
import {
  FIRST_VIEW,
  PLAY_SPEEDS,
  crossTicks,
  curveMotion,
  describeMoment,
  playOn,
  sayDirection,
  seenFrom,
  turnView,
} from '@slewcurve/elements/plot';
import * as fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { turning } from '../support/tracks-for-elements.js';

const part = fc.double({ min: -1, max: 1, noNaN: true });
const front = { round: 0, up: 0 };

describe('the view of the globe', () => {
  test('from the front has x to the right, y up, z near', () => {
    expect(seenFrom(front, [1, 0, 0])).toEqual({ right: 1, up: 0, near: 0 });
    expect(seenFrom(front, [0, 1, 0])).toEqual({ right: 0, up: 1, near: 0 });
    expect(seenFrom(front, [0, 0, 1])).toEqual({ right: 0, up: 0, near: 1 });
  });

  test('from +x has x near and z to the left: right-handed', () => {
    const x = seenFrom({ round: 90, up: 0 }, [1, 0, 0]);
    const z = seenFrom({ round: 90, up: 0 }, [0, 0, 1]);
    // 1e-12: sines and cosines of doubles.
    expect(x.near).toBeCloseTo(1, 12);
    expect(z.right).toBeCloseTo(-1, 12);
  });

  test('from above sees the top: +y comes nearer', () => {
    expect(seenFrom({ round: 0, up: 30 }, [0, 1, 0]).near).toBeCloseTo(0.5, 12);
  });

  test('changes no length and keeps right, up and near a right-handed set', () => {
    fc.assert(
      fc.property(part, part, part, part, part, (x, y, z, round, up) => {
        const view = { round: round * 360, up: up * 85 };
        const { right, up: high, near } = seenFrom(view, [x, y, z]);
        expect(Math.hypot(right, high, near)).toBeCloseTo(Math.hypot(x, y, z), 12);
        const [a, b, c] = (
          [
            [1, 0, 0],
            [0, 1, 0],
            [0, 0, 1],
          ] as const
        ).map((v) => seenFrom(view, v));
        const determinant =
          a.right * (b.up * c.near - c.up * b.near) -
          b.right * (a.up * c.near - c.up * a.near) +
          c.right * (a.up * b.near - b.up * a.near);
        expect(determinant).toBeCloseTo(1, 12);
      }),
    );
  });

  test('goes round without end and stops short of the poles', () => {
    expect(turnView(front, -30, 200)).toEqual({ round: 330, up: 85 });
    expect(turnView(FIRST_VIEW, 720, 0)).toEqual(FIRST_VIEW);
  });
});

describe('the path', () => {
  test('has a tick every tenth of a second of the file clock', () => {
    expect(crossTicks(0.25, 0.61, 0.1).map((t) => Number(t.toFixed(9)))).toEqual([0.3, 0.4, 0.5, 0.6]);
    expect(crossTicks(1, 0, 0.1)).toEqual([]);
  });
});

describe('the words of the globe', () => {
  test('say direction by azimuth and height', () => {
    expect([
      sayDirection([0, 0, 1]),
      sayDirection([1, 0, 0]),
      sayDirection([-1, 0, 0]),
      sayDirection([0, 1, 0]),
      sayDirection([0, 1, 1]),
      sayDirection([0, 0, -1]),
    ]).toEqual([
      'ahead',
      '90° right of ahead',
      '90° left of ahead',
      'straight up',
      'ahead and 45° up',
      'back',
    ]);
  });

  test('say speed and axis, or that it stands still', () => {
    const motion = curveMotion(playAs(turning([0, 10, 20, 20]), 'as-written'));
    expect(describeMoment(motion, 0.1, 0.01)).toBe(
      'At 0.10 s own y points straight up, own z points 10° right of ahead; it turns at 100 deg/s about parent y.',
    );
    expect(describeMoment(motion, 0.25, 0.01)).toContain('it stands still');
  });
});

describe('playing', () => {
  test('runs from 0.05 to 4 times the clock on the wall', () => {
    expect([PLAY_SPEEDS[0], PLAY_SPEEDS.at(-1)]).toEqual([0.05, 4]);
    expect(playOn(1, 0.1, 0.05, [0, 2], false)).toEqual({ time: 1.005, ended: false });
  });

  test('goes round a loop, and stops at the end elsewhere', () => {
    expect(playOn(1.9, 0.2, 1, [0, 2], true).time).toBeCloseTo(0.1, 12);
    expect(playOn(1.9, 0.2, 1, [0, 2], false)).toEqual({ time: 2, ended: true });
    expect(playOn(5, 0.1, 1, [5, 5], true)).toEqual({ time: 5, ended: true });
  });
});
