import { playAs } from '@slewcurve/core';
import { applySteps, type Step } from '@slewcurve/mend';
import {
  curveMotion,
  handOfEdit,
  holdAt,
  keyTime,
  limitAt,
  pressAt,
  sketchPace,
  speedOutline,
  type Ground,
  type Hand,
  type KeyPress,
  type Motion,
  type PaceSketch,
} from '@slewcurve/elements/plot';
import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { turning } from '../../support/tracks-for-elements.js';

fc.configureGlobal({ ...fc.readConfigureGlobal(), seed: 5 });

/** Four seconds at 30 keys a second whose speed rises and falls between 10 and 90 deg/s. */
const track = turning(
  Array.from({ length: 121 }, (_, i) => (50 * i) / 30 - (40 / Math.PI) * Math.sin((Math.PI * i) / 30)),
  1 / 30,
);
const motion = curveMotion(playAs(track, 'as-written'));

const ground = (more: Partial<Ground> = {}): Ground => ({
  motion,
  keys: track.times,
  frame: 1 / 30,
  ends: 'same',
  reach: 0.4,
  pixel: { time: 0.01, speed: 1 },
  ...more,
});

const press = (key: string, more: Partial<KeyPress> = {}): KeyPress => ({
  key,
  ctrlKey: false,
  metaKey: false,
  shiftKey: false,
  altKey: false,
  ...more,
});

function sketchOf(hand: Hand | undefined): PaceSketch {
  if (!hand?.law) throw new Error('The hand changes nothing.');
  return sketchPace(motion, speedOutline(motion, track.times, hand.law.span), hand.law);
}

/** What the verb makes of the hand's step. */
function done(hand: Hand): { readonly motion: Motion; readonly seconds: number } {
  const step: Step = { ...hand.edit, clip: track.clip, track: track.id };
  const { tracks } = applySteps([track], [step]);
  const after = curveMotion(playAs(tracks[0] ?? track, 'as-written'));
  return { motion: after, seconds: after.end - motion.end };
}

const up = (hand: Hand, speed: number): Hand =>
  hand.dragged({ time: 0, speed: 50 }, { time: 0, speed: 50 + speed });

describe('a press', () => {
  it('reads as its drag goes, in whole pixels, and is a shape step', () => {
    const hand = up(pressAt(ground(), 1.5), 20.3);
    expect(hand.edit).toEqual({
      verb: 'shape',
      at: 1.5,
      by: 20,
      reach: 0.4,
      ends: 'same',
      // Out to keys 9 and 81, three reaches to either side.
      span: [0.3, 2.7],
    });
    expect(hand.says).toBe('+20 deg/s at 1.500 s, reaching 400 ms');
  });

  it('with the same ends takes no time, and borrows just what it adds', () => {
    fc.assert(
      fc.property(
        fc.integer({ min: -30, max: 40 }),
        fc.double({ min: 0.6, max: 3.4, noNaN: true }),
        (by, at) => {
          fc.pre(by !== 0);
          const hand = up(pressAt(ground(), at), by);
          const { motion: sketched, seconds } = sketchOf(hand);
          expect(seconds).toBe(0);
          // The whole angle stays, as a path does under any pace.
          expect(sketched.read(sketched.end).odometer).toBeCloseTo(motion.read(motion.end).odometer, 6);
          const speeds = sketched.columns(0, 4, 400).least;
          expect(Math.min(...speeds)).toBeGreaterThanOrEqual(0);
        },
      ),
      { numRuns: 30 },
    );
  });

  it.each(['same', 'run', 'go'] as const)('is sketched as the verb does it: %s', (ends) => {
    const hand = up(pressAt(ground({ ends }), 1.5), 15);
    const sketch = sketchOf(hand);
    const verb = done(hand);
    // A key each 33 ms holds a mean of the speed: over that time it changes by up to 5 deg/s at the flanks of this press.
    for (let t = 0.2; t < 3.9; t += 0.05)
      expect(Math.abs(sketch.motion.read(t).speed - verb.motion.read(t).speed)).toBeLessThan(6);
    // The frames after it are rounded to the grid.
    expect(Math.abs(sketch.seconds - verb.seconds)).toBeLessThan(1 / 30);
    // Chords between frames are straight here: the turn is about one axis.
    expect(sketch.motion.read(3.9).odometer).toBeCloseTo(
      verb.motion.read(3.9).odometer,
      ends === 'run' ? 0 : 1,
    );
  });

  it('tells where it borrows, left and right of itself', () => {
    const { lent } = sketchOf(up(pressAt(ground(), 2), 20));
    expect(lent).toHaveLength(2);
    const [left, right] = lent;
    expect(left && left.to < 2 && right && right.from > 2).toBe(true);
    // 20 deg/s over half a bell of 0.4 s each side: 8°, less what both tails of the bell take back.
    expect((left?.angle ?? 0) + (right?.angle ?? 0)).toBeGreaterThan(5);
    expect((left?.angle ?? 0) + (right?.angle ?? 0)).toBeLessThan(8);
  });

  it('goes by 1 deg/s and by frames under the arrows, ten times as far with Shift, and reaches further with plus', () => {
    const hand = pressAt(ground(), 1.5);
    expect(hand.law).toBeUndefined();
    expect(hand.nudged(press('ArrowUp'))?.edit.by).toBe(1);
    expect(hand.nudged(press('ArrowDown', { shiftKey: true }))?.edit.by).toBe(-10);
    expect(hand.nudged(press('ArrowRight'))?.edit.at).toBe(1.533);
    expect(hand.nudged(press('+'))?.edit.reach).toBe(0.433);
    expect(hand.nudged(press('x'))).toBeUndefined();
  });

  it('keeps to the chosen span', () => {
    const hand = up(pressAt(ground({ span: [1, 2] }), 1.5), 5);
    expect(hand.edit.span?.map((time) => Math.round(time * 30))).toEqual([30, 60]);
  });

  it('that takes more than there is says so', () => {
    expect(() => sketchOf(up(pressAt(ground({ span: [1.4, 1.6] }), 1.5), 500))).toThrow(/lend/);
  });
});

describe('a limit', () => {
  it('is a cap step; its price is the verb’s', () => {
    const hand = limitAt(ground(), 1, 60);
    expect(hand.edit).toEqual({ verb: 'cap', rate: 60 });
    const sketch = sketchOf(hand);
    // Of a second and a half; the verb's last frame is its own.
    expect(Math.abs(sketch.seconds - done(hand).seconds)).toBeLessThan(1 / 30);
    expect(Math.max(...sketch.motion.columns(0, sketch.motion.end, 500).greatest)).toBeLessThan(60.01);
  });

  it('changes nothing above the trace, and follows the arrows', () => {
    expect(limitAt(ground(), 1, 120).law).toBeUndefined();
    expect(limitAt(ground(), 1, 60).nudged(press('ArrowDown', { shiftKey: true }))?.edit.rate).toBe(50);
  });
});

describe('a hold', () => {
  it('stands still for its length, which its handle sets', () => {
    const hand = holdAt(ground(), 2);
    expect(hand.edit).toEqual({ verb: 'hold', at: 2, seconds: 0.5, shoulders: 0.2 });
    const longer = hand.dragged({ time: 2.5, speed: 0 }, { time: 3, speed: 0 });
    expect(longer.edit.seconds).toBe(1);
    const sketch = sketchOf(longer);
    const begins = sketch.newTime(2);
    expect(sketch.motion.read(begins + 0.5).speed).toBeLessThan(1e-6);
    expect(Math.abs(sketch.seconds - done(longer).seconds)).toBeLessThan(1 / 30);
    expect(hand.nudged(press('ArrowRight'))?.edit.seconds).toBe(0.533);
  });
});

describe('a key drawn sideways', () => {
  it('is a mark that moves the key and nothing else', () => {
    const hand = keyTime(ground(), 30)?.dragged({ time: 1, speed: 0 }, { time: 1.02, speed: 0 });
    expect(hand?.edit).toEqual({
      verb: 'set marks',
      marks: [[1, 1.02]],
      store: 'move',
      span: [0.966, 1.034],
    });
    const step: Step = { verb: '', ...hand?.edit, clip: track.clip, track: track.id };
    const { tracks } = applySteps([track], [step]);
    expect(tracks[0]?.values).toEqual(track.values);
    expect([...(tracks[0]?.times ?? [])].map((time) => Math.round(time * 1e6))).toEqual(
      [...track.times].map((time, key) => (key === 30 ? 1_020_000 : Math.round(time * 1e6))),
    );
    expect(sketchOf(hand).motion.read(1.01).speed).toBeLessThan(motion.read(1).speed);
  });

  it('stays between its neighbours; the first and the last have but one', () => {
    const hand = keyTime(ground(), 30)?.dragged({ time: 1, speed: 0 }, { time: 9, speed: 0 });
    expect(hand?.amount).toBeLessThan(track.times[31]);
    expect(keyTime(ground(), 0)).toBeUndefined();
    expect(keyTime(ground(), 120)).toBeUndefined();
  });
});

describe('numbers typed into a sentence', () => {
  it('move the handle: every hand comes back from its own step', () => {
    const hands = [
      up(pressAt(ground(), 1.5), 12),
      limitAt(ground(), 1, 60),
      holdAt(ground(), 2),
      keyTime(ground(), 30)?.nudged(press('ArrowLeft')),
    ];
    for (const hand of hands) expect(hand && handOfEdit(hand.edit, ground())?.edit).toEqual(hand?.edit);
    expect(handOfEdit({ verb: 'lift out', keys: [3] }, ground())).toBeUndefined();
  });
});
