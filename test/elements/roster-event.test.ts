import { countWords, rankEvents, type RosterEvent, type RosterRow } from '@slewcurve/elements/plot';
import { expect, test } from 'vitest';

const event = (id: string, level: RosterEvent['level'], tracks: number): RosterEvent => ({
  id,
  says: id,
  level,
  owner: 'row-0',
  rows: Array.from({ length: tracks }, (_, i) => ({ id: `row-${i}`, track: `joint-${i}` })),
});

test('events stand by level, then by how many tracks they are on', () => {
  const events = [
    event('a', 'note', 9),
    event('b', 'warning', 3),
    event('c', 'error', 3),
    event('d', 'warning', 4),
  ];
  expect(rankEvents(events).map(({ id }) => id)).toEqual(['c', 'd', 'b', 'a']);
});

test('a row tells what is seen of its worst finding beside the number, and what is accepted', () => {
  const row: RosterRow = {
    id: 'row',
    file: 'walk.glb',
    clip: 'Walk',
    track: 'Hips',
    seconds: 1,
    ink: { density: new Float32Array(1), darkest: 0 },
    counts: { error: 0, warning: 2, note: 0 },
    places: 7,
    rules: ['jump.lone-key'],
    families: { jump: 2 },
    marks: [],
    effect: { value: 18.2, unit: 'mm' },
    accepted: 3,
    peak: 0,
    travel: 0,
  };
  expect(countWords(row)).toBe('2 warnings, 18 mm at 7 places, 3 accepted');
  expect(countWords({ ...row, counts: { error: 0, warning: 0, note: 0 }, places: 0 })).toBe('3 accepted');
});
