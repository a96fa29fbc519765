import {
  chartIntent,
  closeUpSpan,
  foldRows,
  frameBy,
  keyNumbers,
  moveSpan,
  type KeyPress,
} from '@slewcurve/elements/plot';
import * as fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { chartOf, popped } from '../support/tracks-for-elements.js';

const data = chartOf(popped(), { frameRate: 30 });
const rows = foldRows(0, 3, 1);
const press = (key: string, held: Partial<KeyPress> = {}): KeyPress => ({
  key,
  ctrlKey: false,
  metaKey: false,
  shiftKey: false,
  altKey: false,
  ...held,
});
const goes = (key: string, time: number, held: Partial<KeyPress> = {}): number | undefined => {
  const intent = chartIntent(press(key, held), time, data, rows);
  return intent?.kind === 'go' ? intent.time : undefined;
};

describe('the keys of the chart', () => {
  test('left and right are a frame, on the grid', () => {
    expect(goes('ArrowRight', 0)).toBeCloseTo(1 / 30, 12);
    expect(goes('ArrowRight', 0.05)).toBeCloseTo(2 / 30, 12);
    expect(goes('ArrowLeft', 0.05)).toBeCloseTo(1 / 30, 12);
  });

  test('with Ctrl they are the next and the previous key', () => {
    const ctrl = { ctrlKey: true };
    expect(goes('ArrowRight', 0.55, ctrl)).toBe(data.keys[6]);
    expect(goes('ArrowLeft', 0.6, ctrl)).toBe(data.keys[5]);
    expect(goes('ArrowLeft', 0, ctrl)).toBe(0);
    expect(goes('ArrowRight', 3, ctrl)).toBe(3);
  });

  test('every key of the track is reached with Ctrl and Right, none twice', () => {
    const met = [0];
    for (let time = 0; met.length < 100; met.push(time)) {
      const next = goes('ArrowRight', time, { ctrlKey: true });
      if (next === undefined || next === time) break;
      time = next;
    }
    expect(met).toEqual([...data.keys]);
  });

  test('Home and End are the ends of the row, Up and Down a row', () => {
    expect(goes('Home', 1.4)).toBe(1);
    expect(goes('End', 1.4)).toBeCloseTo(2 - 1 / 30, 12);
    expect(goes('ArrowDown', 1.4)).toBeCloseTo(2.4, 12);
    expect(goes('ArrowUp', 1.4)).toBeCloseTo(0.4, 12);
    expect(goes('ArrowUp', 0.4)).toBe(0.4);
  });

  test('the cursor never leaves the motion', () => {
    fc.assert(
      fc.property(
        fc.constantFrom('ArrowLeft', 'ArrowRight', 'ArrowUp', 'ArrowDown', 'Home', 'End'),
        fc.double({ min: 0, max: 3, noNaN: true }),
        fc.boolean(),
        (key, time, ctrlKey) => {
          const next = goes(key, time, { ctrlKey });
          expect(next === undefined || (next >= 0 && next <= 3)).toBe(true);
        },
      ),
    );
  });

  test('Shift widens, Page Down is the next finding, Enter the close-up, Escape back, Space plays', () => {
    expect(chartIntent(press('ArrowRight', { shiftKey: true }), 0, data, rows)).toMatchObject({
      widen: true,
    });
    expect(chartIntent(press('PageDown'), 0, data, rows)).toEqual({ kind: 'note', step: 1 });
    expect(chartIntent(press('PageUp'), 0, data, rows)).toEqual({ kind: 'note', step: -1 });
    expect(['Enter', 'Escape', ' '].map((key) => chartIntent(press(key), 0, data, rows)?.kind)).toEqual([
      'open-close-up',
      'back',
      'play',
    ]);
  });

  test('letters, and keys held with Alt, are left to others', () => {
    expect(chartIntent(press('q'), 0, data, rows)).toBeUndefined();
    expect(chartIntent(press('ArrowLeft', { altKey: true }), 0, data, rows)).toBeUndefined();
    expect(chartIntent(press('z', { ctrlKey: true }), 0, data, rows)).toBeUndefined();
  });

  test('a frame on and a frame back is where it was', () => {
    for (let frame = 1; frame < 80; frame++)
      expect(frameBy(frameBy(frame / 30, 1, data), -1, data)).toBeCloseTo(frame / 30, 12);
  });
});

describe('the close-up', () => {
  test('is a few seconds around the cursor, or the span with room, inside the motion', () => {
    expect(closeUpSpan(1.5, undefined, 4, data)).toEqual([1, 2]);
    expect(closeUpSpan(0, undefined, 4, data)).toEqual([0, 1]);
    expect(closeUpSpan(0, [1, 2], 4, data)).toEqual([0.75, 2.25]);
  });

  test('moves and widens without leaving the motion', () => {
    expect(moveSpan([1, 2], data.motion, 0.5)).toEqual([1.5, 2.5]);
    expect(moveSpan([1, 2], data.motion, 9)).toEqual([2, 3]);
    expect(moveSpan([1, 2], data.motion, 0, 0.5, 1.5)).toEqual([1.25, 1.75]);
    expect(moveSpan([1, 2], data.motion, 0, 100)).toEqual([0, 3]);
  });

  test('tells the numbers of a key: 125° about parent y, 150 deg/s before, 50 after', () => {
    const numbers = keyNumbers(data, 12);
    expect(numbers.angle).toBeCloseTo(125, 9);
    expect(numbers.axis[1]).toBeCloseTo(1, 12);
    expect(numbers.speedIn).toBeCloseTo(150, 6);
    expect(numbers.speedOut).toBeCloseTo(50, 6);
    expect(numbers.before?.angle).toBeCloseTo(15, 9);
    expect(numbers.after?.angle).toBeCloseTo(5, 9);
    expect(keyNumbers(data, 0).speedIn).toBeUndefined();
  });
});
