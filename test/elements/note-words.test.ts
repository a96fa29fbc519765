import { acceptedWords, effectWords, eventWords, sayEffect } from '@slewcurve/elements/plot';
import { expect, test } from 'vitest';

test('what is seen of a finding is said in millimetres at the farthest joint, or in pixels of a picture', () => {
  expect(effectWords({ effect: { value: 18.4, unit: 'mm' } })).toBe('18 mm at the farthest joint');
  expect(effectWords({ effect: { value: 0.0123, unit: 'mm' } })).toBe('0.012 mm at the farthest joint');
  expect(effectWords({ effect: { value: 1234, unit: 'px' } })).toBe('1,234 px in a picture of 1,080 rows');
  expect(effectWords({})).toBeUndefined();
  // Two digits, whatever their place: nobody measures a picture finer.
  expect([9.96, 10, 1.25].map((value) => sayEffect({ value, unit: 'px' }))).toEqual([
    '10 px',
    '10 px',
    '1.3 px',
  ]);
});

test('an event is said with its tracks, its instant and its owner', () => {
  const event = { tracks: 20, time: 1.2, owner: 'Armature/Hips' };
  expect(eventWords({ event })).toBe('one of 20 tracks at 1.20 s; owner Hips');
  expect(eventWords({})).toBeUndefined();
});

test('what is accepted is said with its reasons, and in part by count', () => {
  const accepted = { places: 2, reasons: ['a hit (Ada, 2026-05-17)', 'a fall (Bo, 2026-05-18)'] };
  expect(acceptedWords({ accepted, count: 5, status: 'open' })).toBe(
    '2 of 5 places accepted: a hit (Ada, 2026-05-17); a fall (Bo, 2026-05-18)',
  );
  expect(acceptedWords({ accepted, count: 2, status: 'stamped' })).toBe(
    'Accepted: a hit (Ada, 2026-05-17); a fall (Bo, 2026-05-18)',
  );
  expect(acceptedWords({ count: 5, status: 'open' })).toBeUndefined();
});
