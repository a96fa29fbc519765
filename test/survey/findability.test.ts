import { describe, expect, test } from 'vitest';
import { VERBS } from '@slewcurve/mend';
import { RULES, explainWord } from '@slewcurve/survey';

// WORDS, "Findability": what people look for, and what each of it must land on.
const ROWS: readonly (readonly [words: string, targets: string])[] = [
  ['curve editor, animation curve', 'chart'],
  ['keyframe', 'key'],
  ['easing, cubic-bezier, slow in, slow out', 'ease in/out'],
  ['retime, time remap, constant speed, speed ramp', 'even out, set marks, stretch, cap'],
  ['pause, stepped', 'hold, step'],
  ['loop, cycle, walk cycle, seamless', 'close loop, seam.loop-gap, seam.loop-kink, seam.doubled-end'],
  ['pop, spike, glitch, outlier', 'jump.lone-key, jump.shelf'],
  ['jitter, noise', 'shake.grain'],
  ['wobble, vibration', 'shake.hum'],
  ['drift', 'shake.creep'],
  [
    'flip, 180, sign, hemisphere, shortest path, long way, spinning, alignSigns',
    'turn.sign-flip, turn.half, turn.long-way',
  ],
  ['gimbal lock, Euler flip, wrap, 360', 'turn.gimbal, turn.euler-flip, turn.wrap, unwrap'],
  ['camera roll, Dutch angle, horizon, tilt', 'roll, straighten horizon, horizon.roll'],
  ['look-at, tracking shot', 'look at, horizon.overhead'],
  ['hand-held, camera shake', 'sway'],
  ['whip pan, judder, strobing', 'limit.picture, declare'],
  ['stutter, dropped frames, freeze, duplicate frames', 'jump.freeze, pace.comb'],
  [
    'overshoot, stop-and-go, tangents, spline, C1, C2',
    'pace.overrun, pace.pearls, pace.tangent-scale, ease through',
  ],
  ['smooth, filter, denoise', 'smooth, take out hum'],
  ['resample, bake', 're-grid'],
  ['reduce keys, compress', 'thin, pack check'],
  ['blend, crossfade', 'mix, join'],
  ['additive, layer', 'lay over, take out base'],
  ['left/right', 'mirror'],
  ['follow-through, overlap', 'lag'],
  ['local, world, parent space', 'change space'],
  [
    'rotation order, up axis, degrees, radians',
    'restate, turn.gimbal, file.axes-suspect, file.degrees-or-radians',
  ],
  ['angular velocity, acceleration, jerk, total rotation', 'chart, measure'],
  ['suppress, waive, ignore, threshold, config', 'stamp, baseline, house rules'],
  ['motion path, in-betweens, 3-D view', 'porthole'],
];

const SOON = new Set(['roll', 'straighten horizon', 'horizon.roll', 'look at', 'horizon.overhead', 'sway', 'thin', 'pack check', 'mix', 'join', 'lag', 'take out base', 'file.axes-suspect', 'file.degrees-or-radians']); // prettier-ignore
const NAMED = new Set([...RULES.map(({ id }) => id), ...VERBS.map(({ name }) => name)]);
const CASES = ROWS.flatMap(([words, targets]) =>
  words.split(', ').map((word) => [word, targets.split(', ')] as const),
);
const isBuilt = (target: string): boolean => NAMED.has(target) || !SOON.has(target);

describe('what people look for', () => {
  test.each(CASES.filter(([, targets]) => targets.some(isBuilt)))(
    '%s lands on one of %j',
    (word, targets) => {
      const found = explainWord(word).entries.map(({ name }) => name);
      expect(targets.filter((target) => found.includes(target))).not.toEqual([]);
    },
  );

  test('every rule and verb that the table names is built, or is known to be missing', () => {
    const names = ROWS.flatMap(([, targets]) => targets.split(', '));
    const missing = names.filter((name) => explainWord(name).entries.every((entry) => entry.name !== name));
    expect(missing.filter((name) => !SOON.has(name))).toEqual([]);
  });
});
