import { describe, expect, test } from 'vitest';
import type { Clip } from '@slewcurve/core';
import { eventAt, gatherEvents, surveyClip } from '@slewcurve/survey';
import { grid, keyed, turned } from '../support/smooth-track.js';

const smooth = keyed({ spin: [0, 20, 0], swing: [0, 0, 0], hertz: 0.4, phase: 1 }, grid(90), 'LINEAR');
const RATES = new Map([['Wave', 30]]);

function clipOf(popped: Readonly<Record<string, readonly number[]>>): Clip {
  const tracks = Object.entries(popped).map(([id, keys]) => ({ ...turned(smooth, keys, [0, 0, 12]), id }));
  return {
    name: 'Wave',
    index: 0,
    tracks,
    start: 0,
    end: 89 / 30,
    frameRate: 30,
    loop: false,
    marks: [],
  };
}

const gathered = (popped: Readonly<Record<string, readonly number[]>>) =>
  gatherEvents(surveyClip(clipOf(popped), []), RATES);

describe('events', () => {
  test('a place knows its event by clip, family, track and instant', () => {
    const { events } = gathered({ Root: [30], 'Root/Spine': [30], 'Root/Arm': [60] });
    const place = { rule: 'jump.lone-key', clip: 'Wave', track: 'Root/Spine' };
    expect(eventAt(events, place, 1, 30)?.owner).toBe('Root');
    // A frame later is the same instant, two are not; before the first place there is nothing.
    expect(eventAt(events, place, 1 + 1 / 30, 30)).toBe(events[0]);
    expect(eventAt(events, place, 1 + 2 / 30, 30)).toBeUndefined();
    expect(eventAt(events, place, 1 - 1 / 30, 30)).toBeUndefined();
    expect(eventAt(events, { ...place, track: 'Root/Arm' }, 1, 30)).toBeUndefined();
    expect(eventAt(events, { ...place, rule: 'turn.half' }, 1, 30)).toBeUndefined();
    expect(eventAt(events, { ...place, clip: 'Walk' }, 1, 30)).toBeUndefined();
  });

  test('80 joints that pop at once are one event, and its owner is the one nearest to the root', () => {
    const joints = Object.fromEntries(
      Array.from({ length: 80 }, (_, i) => [`Root/${'Spine/'.repeat(i)}Joint`, [30]]),
    );
    const { events, findings } = gathered({ ...joints, Root: [30] });
    expect(findings).toHaveLength(81);
    expect(events).toHaveLength(1);
    expect(events[0]).toMatchObject({
      clip: 'Wave',
      family: 'jump',
      time: 1,
      level: 'warning',
      owner: 'Root',
      tracks: 81,
    });
    expect(events[0].places).toHaveLength(81);
  });

  test('a frame apart is one event, two frames are two things', () => {
    expect(gathered({ A: [30], B: [31] }).events).toHaveLength(1);
    expect(gathered({ A: [30], B: [32] }).events).toEqual([]);
  });

  test('one track alone makes no event', () => {
    expect(gathered({ A: [30, 31, 60], B: [] }).events).toEqual([]);
  });

  test('a jump below another one belongs to the highest that jumps with it', () => {
    const { findings } = gathered({ Root: [], 'Root/Hip': [30], 'Root/Hip/Knee': [30], Other: [30] });
    expect(findings.map(({ track, owner }) => [track, owner])).toEqual([
      ['Root/Hip', 'Root/Hip'],
      ['Root/Hip/Knee', 'Root/Hip'],
      ['Other', 'Other'],
    ]);
  });
});
