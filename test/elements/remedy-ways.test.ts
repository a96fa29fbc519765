import { remedyWays } from '@slewcurve/elements/plot';
import type { Step } from '@slewcurve/mend';
import { expect, test } from 'vitest';

const half = (axis: readonly [number, number, number]): Step => ({
  verb: 'choose side',
  clip: 'Walk',
  track: 'Neck',
  keys: [3],
  axis,
});

test('two ways round are two buttons that say about which axis each turns', () => {
  expect(remedyWays([half([0, 1, 0]), half([0, -1, 0])]).map(({ button }) => button)).toEqual([
    'Choose the side of key 3, about own y',
    'Choose the side of key 3, about minus own y',
  ]);
  expect(remedyWays([half([0, 3, 4]), half([0, -3, -4])])[0]?.button).toBe(
    'Choose the side of key 3, about (0, 0.6, 0.8)',
  );
});

test('one way alone is said as short as it goes', () => {
  expect(remedyWays([half([0, 1, 0])])).toEqual([
    {
      button: 'Choose the side of key 3',
      sentence: 'Choose the side of key 3 of Neck in Walk, turning about (0, 1, 0) in its own frame.',
    },
  ]);
});

test('other edits are told by their own openings, equal ones by the side or the spread', () => {
  const seat: Step = { verb: 're-seat', clip: 'Walk', track: 'Neck', keys: [5], side: 'parent' };
  const close: Step = { verb: 'close loop', clip: 'Walk', track: 'Neck', spread: 'tail' };
  expect(remedyWays([seat, { ...seat, side: 'own' }, close]).map(({ button }) => button)).toEqual([
    'Re-seat from key 5, on the parent’s side',
    'Re-seat from key 5, on its own side',
    expect.stringMatching(/^Close the loop/),
  ]);
});
