import { describe, expect, test } from 'vitest';
import type { Clip, RotationTrack } from '@slewcurve/core';
import { NO_HOUSE_RULES, guessLoop } from '@slewcurve/survey';
import { turningTrack } from '../support/turning-track.js';

const cycle = turningTrack((key) => 20 * Math.sin((2 * Math.PI * key) / 30), 31);
const shot = turningTrack((key) => 20 * Math.sin((2 * Math.PI * key) / 40), 31);
const still = turningTrack(() => 10, 31);

function clip(tracks: readonly RotationTrack[], loop = false): Clip {
  return { name: 'Wave', index: 0, tracks, start: 0, end: 1, frameRate: 30, loop, marks: [] };
}

describe('guessing loops', () => {
  test('nine of ten moving tracks that end where they start look like a loop', () => {
    const tracks = [...Array<RotationTrack>(9).fill(cycle), shot, still, still];
    expect(guessLoop(clip(tracks), [])).toEqual({ closed: 9, moving: 10 });
  });

  test('eight of ten do not, and neither do tracks that stand still', () => {
    expect(guessLoop(clip([...Array<RotationTrack>(8).fill(cycle), shot, shot]), [])).toBeUndefined();
    expect(guessLoop(clip([still, still]), [])).toBeUndefined();
  });

  test('of a clip that is declared to repeat nothing is guessed', () => {
    expect(guessLoop(clip([cycle], true), [])).toBeUndefined();
    expect(guessLoop(clip([cycle]), [], { ...NO_HOUSE_RULES, loops: ['W*'] })).toBeUndefined();
  });
});
