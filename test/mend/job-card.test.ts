import { type RotationTrack, SlewcurveError, rotationTrack } from '@slewcurve/core';
import { applySteps, parseJobCard } from '@slewcurve/mend';
import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { codeOf, numbersOf } from '../support/edit-acceptance.js';
import { grid, keyed, turned } from '../support/smooth-track.js';

fc.configureGlobal({ ...fc.readConfigureGlobal(), seed: 2 });

const WAVE = { spin: [20, 35, -10], swing: [25, 10, 15], hertz: 0.4, phase: 1 } as const;
const STEP = { verb: 'lift out', clip: 'Walk', track: 'Neck', keys: [6] };

function card(step: object): unknown {
  return { schemaVersion: 1, steps: [STEP, { ...STEP, ...step }] };
}

/** Code and JSON pointer of what a card is refused for. */
function refusal(json: unknown): [string, string | undefined] | undefined {
  try {
    parseJobCard(json);
  } catch (error) {
    if (error instanceof SlewcurveError) return [error.code, error.place.pointer];
    throw error;
  }
  return undefined;
}

function named(clip: string, id: string, off = 0): RotationTrack {
  return rotationTrack({ ...turned(keyed(WAVE, grid(14), 'LINEAR'), [6], [off, 0, 0]), clip, id });
}

describe('parseJobCard', () => {
  it('reads a card as REPORT writes it, and passes over keys of the card that it does not know', () => {
    const json = {
      schemaVersion: 1,
      for: { file: 'walk.glb', sha256: 'ab' },
      steps: [
        STEP,
        {
          verb: 'bridge',
          clip: '*',
          track: 'Hips/*',
          keys: [20],
          steps: 4,
          keep: [0, 36],
          span: [0, 1.2],
          shoulders: 0.1,
        },
        { verb: 're-seat', clip: '*', track: '*', keys: [20], side: 'own', fade: 0.5 },
        { verb: 'choose side', clip: '*', track: '*', keys: [1], axis: [0, -1, 0] },
      ],
      later: true,
    };
    const { later, ...known } = json;
    expect(later).toBe(true);
    expect(parseJobCard(JSON.parse(JSON.stringify(json)))).toEqual(known);
  });

  it.each([
    [null, ['card.bad-shape', undefined]],
    [[], ['card.bad-shape', undefined]],
    ['card', ['card.bad-shape', undefined]],
    [{ steps: [] }, ['card.bad-version', '/schemaVersion']],
    [{ schemaVersion: 2, steps: [] }, ['card.bad-version', '/schemaVersion']],
    [{ schemaVersion: '1', steps: [] }, ['card.bad-version', '/schemaVersion']],
    [{ schemaVersion: 1 }, ['card.bad-shape', '/steps']],
    [{ schemaVersion: 1, steps: [7] }, ['card.bad-shape', '/steps/0']],
    [{ schemaVersion: 1, steps: [], for: 'walk.glb' }, ['card.bad-shape', '/for']],
    [{ schemaVersion: 1, steps: [], for: { file: 3 } }, ['card.bad-text', '/for']],
    [card({ verb: 'lift' }), ['card.unknown-verb', '/steps/1/verb']],
    [card({ verb: 3 }), ['card.bad-text', '/steps/1/verb']],
    [card({ clip: undefined }), ['card.bad-text', '/steps/1/clip']],
    [card({ track: 4 }), ['card.bad-text', '/steps/1/track']],
    [card({ keys: 6 }), ['card.bad-number', '/steps/1/keys']],
    [card({ keys: [] }), ['card.bad-number', '/steps/1/keys']],
    [card({ keys: [1.5] }), ['card.bad-number', '/steps/1/keys']],
    [card({ keys: [-1] }), ['card.bad-number', '/steps/1/keys']],
    [card({ keys: ['6'] }), ['card.bad-number', '/steps/1/keys']],
    [card({ keep: [NaN] }), ['card.bad-number', '/steps/1/keep']],
    [card({ span: [1] }), ['card.bad-number', '/steps/1/span']],
    [card({ span: [2, 1] }), ['card.bad-number', '/steps/1/span']],
    [card({ span: [0, Infinity] }), ['card.bad-number', '/steps/1/span']],
    [card({ shoulders: -1 }), ['card.bad-number', '/steps/1/shoulders']],
    [card({ speed: 3 }), ['card.unknown-key', '/steps/1/speed']],
    [card({ 'a/b~': 3 }), ['card.unknown-key', '/steps/1/a~1b~0']],
    [card({ axis: [0, 1, 0] }), ['card.unknown-key', '/steps/1/axis']],
    [card({ verb: 'choose side', axis: [0, 0, 0] }), ['card.bad-number', '/steps/1/axis']],
    [card({ verb: 'choose side', axis: [0, 1] }), ['card.bad-number', '/steps/1/axis']],
    [card({ verb: 're-seat', side: 'left' }), ['card.bad-text', '/steps/1/side']],
    [card({ verb: 're-seat', fade: '1' }), ['card.bad-number', '/steps/1/fade']],
    [card({ verb: 'bridge', steps: 1 }), ['card.bad-number', '/steps/1/steps']],
  ])('refuses %j with %j', (json, expected) => {
    expect(refusal(json)).toEqual(expected);
  });

  it('names the step and the key in its message, and the edit that may be meant', () => {
    expect(() => parseJobCard(card({ span: [0] }))).toThrow(
      'Step 2: "span" must be a list of 2 finite numbers; it is [0].',
    );
    expect(() => parseJobCard(card({ verb: 'lift-out' }))).toThrow('Did you mean "lift out"?');
    expect(() => parseJobCard(card({ verb: 'hemisphere' }))).toThrow('Did you mean "same side"?');
  });

  it('takes any JSON at all without throwing anything but a coded error', () => {
    const anyStep = fc.oneof(
      fc.jsonValue(),
      fc.record({
        verb: fc.constantFrom('lift out', 'bridge', 're-seat'),
        clip: fc.string(),
        track: fc.string(),
        keys: fc.jsonValue(),
        span: fc.jsonValue(),
      }),
    );
    fc.assert(
      fc.property(
        fc.oneof(
          fc.jsonValue(),
          anyStep.map((step) => ({ schemaVersion: 1, steps: [step] })),
        ),
        (json) => {
          const code = codeOf(() => parseJobCard(json));
          expect(code === undefined || code.startsWith('card.')).toBe(true);
        },
      ),
    );
  });
});

describe('applySteps', () => {
  it('runs each step on the tracks that its patterns fit; all others stay the very objects', () => {
    const tracks = [
      named('Walk', 'Hips/Neck', 20),
      named('Walk', 'Hips/Arm', 20),
      named('Run', 'Hips/Neck', 20),
    ];
    const lift = { ...STEP, clip: 'Walk', track: 'Hips/*' };
    const { tracks: after, results } = applySteps(tracks, [
      lift,
      { ...lift, clip: '*', track: '*Neck', keys: [7] },
    ]);
    expect(results.map(({ number, index }) => [number, index])).toEqual([
      [0, 0],
      [0, 1],
      [1, 0],
      [1, 2],
    ]);
    expect(results[2].before).toBe(results[0].result.track);
    expect(after[0]).toBe(results[2].result.track);
    expect(numbersOf(after[2], 6)).toEqual(numbersOf(tracks[2], 6));
    const { tracks: same } = applySteps(tracks, [{ ...lift, track: 'Hips/Neck' }]);
    expect([same[1], same[2]]).toEqual([tracks[1], tracks[2]]);
    expect(same[1]).toBe(tracks[1]);
  });

  it('takes a pattern that a track has as its very name as that name alone', () => {
    const tracks = [named('A', 'arm*'), named('A', 'arm*left')];
    const step = { verb: 'normalise', clip: 'A', track: 'arm*' };
    expect(applySteps(tracks, [step]).results.map(({ index }) => index)).toEqual([0]);
    expect(applySteps([named('A', '*'), ...tracks], [{ ...step, track: '*' }]).results).toHaveLength(3);
  });

  it('refuses a step that fits nothing and one that cannot be applied, with the step number; nothing is half done', () => {
    const tracks = [named('Walk', 'Neck', 20)];
    const run = (step: object) => (): unknown => applySteps(tracks, [{ ...STEP }, { ...STEP, ...step }]);
    expect(codeOf(run({ track: 'Nick' }))).toBe('step.no-match');
    expect(run({ track: 'Nick' })).toThrow('Step 2 (lift out): no track of clip "Walk" fits "Nick".');
    expect(codeOf(run({ clip: 'walk' }))).toBe('step.no-match');
    expect(codeOf(run({ keys: [99] }))).toBe('step.bad-key');
    expect(run({ keys: [99] })).toThrow(/^Step 2 \(lift out\) on Neck: There is no key 99/);
    expect(numbersOf(tracks[0], 6)).toEqual(numbersOf(named('Walk', 'Neck', 20), 6));
  });
});
