import { describe, expect, test } from 'vitest';
import type { RotationTrack } from '@slewcurve/core';
import { surveyTrack } from '@slewcurve/survey';
import { turningTrack } from '../../../support/turning-track.js';

const whole = turningTrack((key) => key, 61);

function ragged(track: RotationTrack) {
  const clip = {
    name: 'Wave',
    index: 0,
    tracks: [whole, track],
    start: 0,
    end: 2,
    frameRate: 30,
    loop: false,
    marks: [],
  };
  return surveyTrack(track, { clip }).find(({ rule }) => rule === 'file.ragged');
}

describe('file.ragged', () => {
  test('a track that ends half a second early is a note at its last key', () => {
    expect(ragged(turningTrack((key) => key, 46))).toMatchObject({
      level: 'note',
      keys: [45],
      value: 0.5,
      span: [1.5, 2],
    });
  });

  test('a track as long as its clip, half a frame short of it, or of one key is not', () => {
    expect(ragged(whole)).toBeUndefined();
    const short = { ...whole, times: whole.times.map((time) => time * 0.995) };
    expect(ragged(short)).toBeUndefined();
    expect(ragged(turningTrack(() => 3, 1))).toBeUndefined();
  });
});
