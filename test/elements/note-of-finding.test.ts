import { noteOfFinding, remedyButton } from '@slewcurve/elements/plot';
import type { Finding } from '@slewcurve/survey';
import { describe, expect, test } from 'vitest';

const FINDING: Finding = {
  rule: 'jump.lone-key',
  level: 'warning',
  clip: 'Walk',
  track: 'Hips/Spine/Neck',
  keys: [19],
  span: [0.6, 0.667],
  time: 0.633,
  value: 12.4,
  unit: 'deg',
  limit: 1,
  playback: 'as-written',
  owner: 'Hips/Spine/Neck',
  count: 1,
  occurrences: [
    {
      keys: [19],
      time: 0.633,
      span: [0.6, 0.667],
      value: 12.4,
      level: 'warning',
      message: 'key 19 stands 12.4° off its neighbours for one frame',
      fingerprint: 'place',
    },
  ],
  remedy: { verb: 'lift out', clip: 'Walk', track: 'Hips/Spine/Neck', keys: [19] },
  message: 'Key 19 at 0.633 s stands 12.4° off its neighbours for one frame.',
  fingerprint: 'whole',
};

describe('a finding in the margin', () => {
  test('keeps its words, place and fingerprint, and names its remedy on the button', () => {
    expect(noteOfFinding(FINDING)).toMatchObject({
      id: 'whole',
      level: 'warning',
      time: 0.633,
      places: [{ time: 0.633, span: [0.6, 0.667], level: 'warning' }],
      status: 'open',
      remedy: { sentence: 'Lift out key 19 of Hips/Spine/Neck in Walk.', button: 'Lift out key 19' },
    });
  });

  test('has no button where there is no remedy', () => {
    const { remedy: _, ...bare } = FINDING;
    expect(noteOfFinding(bare).remedy).toBeUndefined();
  });

  test('names the keys of every verb, whatever its opening', () => {
    const step = { clip: 'Walk', track: 'Hips', keys: [3] };
    expect(remedyButton({ ...step, verb: 'choose side', axis: [0, 1, 0] })).toBe('Choose the side of key 3');
    expect(remedyButton({ verb: 'same side', clip: 'Walk', track: 'Hips' })).toBe(
      'Bring to one side all keys',
    );
  });

  test('counts keys where there are too many to name', () => {
    const step = { verb: 'lift out', clip: 'Walk', track: 'Hips' };
    expect(remedyButton({ ...step, keys: [3, 5, 7] })).toBe('Lift out keys 3, 5 and 7');
    expect(remedyButton({ ...step, keys: [3, 5, 7, 9, 11] })).toBe('Lift out 5 keys');
  });
});
