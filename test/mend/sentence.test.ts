import { type Step, VERBS, parseSentence, sayStep } from '@slewcurve/mend';
import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { codeOf } from '../support/edit-acceptance.js';

fc.configureGlobal({ ...fc.readConfigureGlobal(), seed: 2 });

const names = fc.oneof(
  fc.string({ unit: 'binary', maxLength: 20 }),
  fc.constantFrom(
    '*',
    'Hips/Spine/Neck',
    'lowerleg.l',
    'key 3 of',
    'a in b',
    'Walk.',
    '"',
    '',
    '\\',
    '~1',
    '[2]',
    '#7',
  ),
);
const keyList = fc.array(fc.nat(), { minLength: 1, maxLength: 5 });
const number = fc.double({ noNaN: true, noDefaultInfinity: true });
const seconds = fc.double({ min: 0, noNaN: true, noDefaultInfinity: true });

/** Steps of every verb, with any of the keys that it reads. */
const steps: fc.Arbitrary<Step> = fc.constantFrom(...VERBS).chain((verb) => {
  const optional = {
    keys: keyList,
    steps: fc.nat(),
    axis: fc.tuple(number, number, number),
    turn: fc.tuple(number, number, number),
    about: fc.constantFrom('own' as const, 'parent' as const, 'world' as const),
    side: fc.constantFrom('own' as const, 'parent' as const),
    fade: seconds,
    at: number,
    by: number,
    reach: seconds,
    speeds: fc.array(fc.tuple(number, seconds), { minLength: 2, maxLength: 4 }),
    marks: fc.array(fc.tuple(number, number), { minLength: 1, maxLength: 3 }),
    turns: fc.integer(),
    sigma: seconds,
    grain: seconds,
    guard: seconds,
    guards: fc.array(fc.tuple(number, number), { minLength: 1, maxLength: 3 }),
    hertz: seconds,
    spread: fc.constantFrom('tail' as const, 'evenly' as const),
    anchor: fc.constantFrom('start' as const, 'end' as const, 'both' as const),
    rate: seconds,
    acceleration: seconds,
    corners: fc.constantFrom('round' as const, 'stop' as const),
    which: fc.constantFrom('in' as const, 'out' as const),
    ease: fc.oneof(fc.string(), fc.constantFrom('cubic-bezier(0.42, 0, 0.58, 1)', 'minimum-jerk')),
    seconds,
    ends: fc.constantFrom('same' as const, 'run' as const, 'go' as const),
    fromTrack: names,
    fromClip: names,
    fromSpan: fc.tuple(number, number),
    meet: seconds,
    with: fc.constantFrom('node' as const, 'track' as const, 'clip' as const),
    store: fc.constantFrom('move' as const, 'frames' as const, 'cubic' as const),
    axes: fc.constantFrom('x z -y', '-z -x y', 'x y -z'),
    components: fc.constantFrom('wxyz', 'zyxw'),
    angles: fc.constantFrom('degrees' as const, 'radians' as const),
    space: fc.constantFrom('world' as const, 'parent' as const),
    normal: fc.constantFrom('x' as const, 'y' as const, 'z' as const),
    pairs: fc.array(fc.tuple(fc.string({ minLength: 1 }), fc.string({ minLength: 1 })), {
      minLength: 1,
      maxLength: 3,
    }),
    interpolation: fc.constantFrom('LINEAR' as const, 'CUBICSPLINE' as const),
    within: seconds,
    fps: seconds,
    source: seconds,
    playback: fc.constantFrom('as-written' as const, 'raw-chord' as const, 'chord' as const),
    tangents: fc.constantFrom('in' as const, 'out' as const),
  };
  const read = Object.entries(optional).filter(([key]) => verb.reads.some((name) => name === key));
  return fc.record(
    {
      verb: fc.constant(verb.name),
      clip: names,
      track: names,
      span: fc.tuple(number, number),
      shoulders: seconds,
      keep: keyList,
      ...Object.fromEntries(read),
    },
    { requiredKeys: ['verb', 'clip', 'track'] },
  );
});

function atThirty(text: string): Step {
  return parseSentence(text, 30);
}

describe('sentence', () => {
  it('says a step as people read it', () => {
    const place = { clip: 'Walk', track: 'Hips/Spine/Neck' };
    expect(sayStep({ verb: 'lift out', ...place, keys: [19] })).toBe(
      'Lift out key 19 of Hips/Spine/Neck in Walk.',
    );
    expect(sayStep({ verb: 'bridge', ...place, keys: [20], steps: 4 })).toBe(
      'Bridge key 20 of Hips/Spine/Neck in Walk, over 4 steps.',
    );
    expect(sayStep({ verb: 're-seat', ...place, keys: [20], side: 'parent', fade: 0.5 })).toBe(
      "Re-seat from key 20 of Hips/Spine/Neck in Walk, on the parent's side, fading away over 0.5 s.",
    );
    expect(sayStep({ verb: 'same side', clip: '*', track: 'upper arm', keep: [0, 3, 36] })).toBe(
      'Bring to one side all keys of "upper arm" in *, keeping keys 0, 3 and 36.',
    );
    expect(sayStep({ verb: 'choose side', ...place, keys: [1], axis: [0, -1, 0] })).toBe(
      'Choose the side of key 1 of Hips/Spine/Neck in Walk, turning about (0, -1, 0) in its own frame.',
    );
    expect(sayStep({ verb: 'normalise', ...place, span: [0.5, 1.25], shoulders: 0.1 })).toBe(
      'Normalise all keys of Hips/Spine/Neck in Walk, between 0.5 s and 1.25 s, with shoulders of 0.1 s.',
    );
  });

  it('says paces as people read them', () => {
    const place = { clip: 'Flight', track: 'camera' };
    expect(sayStep({ verb: 'cap', ...place, rate: 20, acceleration: 40, with: 'clip' })).toBe(
      'Cap the speed of all keys of camera in Flight, to at most 20 deg/s, to at most 40 deg/s², taking its clip along.',
    );
    expect(sayStep({ verb: 'ease in/out', ...place, shoulders: 0.5, which: 'out', ends: 'run' })).toBe(
      'Ease in and out all keys of camera in Flight, at its end alone, letting time run, with shoulders of 0.5 s.',
    );
    expect(sayStep({ verb: 'hold', ...place, at: 4, seconds: 1, store: 'frames' })).toBe(
      'Hold all keys of camera in Flight, at 4 s, lasting 1 s, at the frames.',
    );
  });

  it('says what is smoothed away as people read it', () => {
    const place = { clip: 'Take', track: 'head' };
    expect(
      sayStep({ verb: 'smooth', ...place, sigma: 0.1, within: 0.4, guard: 60, guards: [[5, 5.5]] }),
    ).toBe(
      'Smooth all keys of head in Take, within 0.4 degrees, averaging with a sigma of 0.1 s, guarding what turns faster than 60 deg/s, guarding 5 s to 5.5 s.',
    );
    expect(sayStep({ verb: 'smooth', ...place, grain: 0.02 })).toBe(
      'Smooth all keys of head in Take, down to a grain of 0.02°.',
    );
    expect(sayStep({ verb: 'take out hum', ...place, hertz: 11, span: [26, 31] })).toBe(
      'Take the hum out of all keys of head in Take, at 11 Hz, between 26 s and 31 s.',
    );
    expect(sayStep({ verb: 'take out drift', ...place, anchor: 'both' })).toBe(
      'Take the drift out of all keys of head in Take, holding both its ends.',
    );
    expect(sayStep({ verb: 'close loop', ...place, spread: 'evenly' })).toBe(
      'Close the loop of all keys of head in Take, spread evenly.',
    );
  });

  it('reads back what it says, whatever the names and numbers', () => {
    fc.assert(
      fc.property(steps, (step) => {
        expect(parseSentence(sayStep(step))).toEqual(step);
      }),
      { numRuns: 500 },
    );
  });

  it('reads a sentence without its full stop and with a small first letter', () => {
    expect(parseSentence(' lift out keys 3 and 5 of Neck in Walk ')).toEqual({
      verb: 'lift out',
      clip: 'Walk',
      track: 'Neck',
      keys: [3, 5],
    });
  });

  it('reads times as frames and timecode on the clip’s grid, and leaves names and rates alone', () => {
    expect(atThirty('Hold all keys of camera in Flight, at 00:00:04:00, lasting 15 frames.')).toMatchObject({
      at: 4,
      seconds: 0.5,
    });
    expect(
      atThirty('Normalise all keys of "frame 3" in Walk, between frame 15 and 00:00:01:15.'),
    ).toMatchObject({
      track: 'frame 3',
      span: [0.5, 1.5],
    });
    expect(atThirty('Re-grid all keys of camera in Flight, to 24 frames a second.').fps).toBe(24);
    expect(codeOf(() => parseSentence('Hold all keys of camera in Flight, at frame 30, lasting 1 s.'))).toBe(
      'time.needs-grid',
    );
    expect(
      parseSentence('Hold all keys of camera in Flight, at 00:01:00;02, lasting 1 s.', 29.97).at,
    ).toBeCloseTo(60.06, 9);
  });

  it('says where a sentence stops making sense', () => {
    expect(codeOf(() => parseSentence('Lift up key 3 of Neck in Walk.'))).toBe('sentence.unknown-opening');
    expect(codeOf(() => parseSentence('Lift out key three of Neck in Walk.'))).toBe('sentence.unreadable');
    expect(codeOf(() => parseSentence('Lift out key 3 of Neck.'))).toBe('sentence.unreadable');
    expect(codeOf(() => parseSentence('Lift out key 3 of "Neck in Walk.'))).toBe('sentence.unreadable');
    expect(codeOf(() => parseSentence('Lift out key 3 of "\\q" in Walk.'))).toBe('sentence.unreadable');
    expect(codeOf(() => parseSentence('Lift out key 3 of Neck in Walk, slowly.'))).toBe(
      'sentence.unreadable',
    );
    expect(codeOf(() => parseSentence(''))).toBe('sentence.unknown-opening');
  });
});
