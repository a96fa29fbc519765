import { playAs } from '@slewcurve/core';
import { applySteps } from '@slewcurve/mend';
import {
  curveMotion,
  drawingAt,
  fewestPoints,
  handOfEdit,
  sketchPace,
  speedOutline,
  type Ground,
  type Hand,
  type Place,
} from '@slewcurve/elements/plot';
import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { turning } from '../../support/tracks-for-elements.js';

fc.configureGlobal({ ...fc.readConfigureGlobal(), seed: 5 });

/** Two seconds at 60 deg/s, 50 keys a second. */
const track = turning(
  Array.from({ length: 101 }, (_, i) => i * 1.2),
  0.02,
);
const motion = curveMotion(playAs(track, 'as-written'));
const ground: Ground = {
  motion,
  keys: track.times,
  frame: 0.02,
  span: [0, 2],
  ends: 'same',
  reach: 0.2,
  pixel: { time: 0.005, speed: 1 },
};

/** Strokes from place to place, as a pointer's moves come. */
const drawn = (places: readonly Place[]): Hand =>
  places.slice(1).reduce((hand, to, i) => hand.dragged(places[i] ?? to, to), drawingAt(ground, 1, 10));

describe('a drawing', () => {
  it('begins as the speed is and changes nothing', () => {
    const hand = drawingAt(ground, 1, 10);
    expect(hand.law).toBeUndefined();
    expect(hand.edit.speeds).toEqual([
      [0, 60],
      [2, 60],
    ]);
  });

  it('is told by few points, and says how far they are off the hand and by what they are scaled', () => {
    const hand = drawn([
      { time: 0, speed: 0 },
      { time: 1, speed: 90 },
      { time: 2, speed: 0 },
    ]);
    expect(hand.edit).toEqual({
      verb: 'shape',
      speeds: [
        [0, 0],
        [1, 90],
        [2, 0],
      ],
      span: [0, 2],
    });
    // 120° are turned, 90° are drawn.
    expect(hand.says).toBe(
      'drawn with 3 points, within 0 deg/s of the hand, times 1.33 to turn as far as before',
    );
    expect(handOfEdit(hand.edit, ground)?.edit).toEqual(hand.edit);
  });

  it('is sketched as the verb does it', () => {
    const hand = drawn([
      { time: 0, speed: 10 },
      { time: 0.8, speed: 90 },
      { time: 2, speed: 30 },
    ]);
    if (!hand.law) throw new Error('Nothing is drawn.');
    const sketch = sketchPace(motion, speedOutline(motion, track.times, hand.law.span), hand.law);
    const { tracks } = applySteps([track], [{ ...hand.edit, clip: track.clip, track: track.id }]);
    const done = curveMotion(playAs(tracks[0] ?? track, 'as-written'));
    expect(sketch.seconds).toBe(0);
    // A key each 20 ms holds the mean of a speed that changes by 2 deg/s meanwhile.
    for (let t = 0.1; t < 1.9; t += 0.07)
      expect(Math.abs(sketch.motion.read(t).speed - done.read(t).speed)).toBeLessThan(2);
    expect(sketch.motion.read(2).odometer).toBeCloseTo(120, 6);
  });

  it('is raised softly about a place by the keyboard, which walks along it', () => {
    const key = { ctrlKey: false, metaKey: false, altKey: false, shiftKey: true };
    const hand = drawingAt(ground, 1, 10)
      .nudged({ ...key, key: 'ArrowRight' })
      ?.nudged({ ...key, key: 'ArrowUp' });
    expect(hand?.amount).toBe(70);
    // Ten places of 1/48 of the span on from its middle.
    expect(hand?.time).toBeCloseTo(1 + 20 / 48, 9);
    expect(hand?.law).toBeDefined();
  });

  it('keeps within what a line may lose, whatever the line', () => {
    const line = fc
      .array(fc.double({ min: 0, max: 100, noNaN: true }), { minLength: 2, maxLength: 40 })
      .map((speeds) => speeds.map((speed, i): Place => ({ time: i, speed })));
    fc.assert(
      fc.property(line, fc.double({ min: 0, max: 20, noNaN: true }), (places, most) => {
        const few = fewestPoints(places, most);
        expect([few[0], few[few.length - 1]]).toEqual([places[0], places[places.length - 1]]);
        for (const { time, speed } of places) {
          const after = Math.max(
            1,
            few.findIndex((point) => point.time >= time),
          );
          const [a, b] = [few[after - 1], few[after]];
          if (!a || !b) throw new Error('Two ends at least.');
          const told = a.speed + ((b.speed - a.speed) * (time - a.time)) / (b.time - a.time);
          expect(Math.abs(told - speed)).toBeLessThanOrEqual(most + 1e-9);
        }
      }),
    );
  });
});
