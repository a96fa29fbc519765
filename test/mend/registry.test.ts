import { VERBS, verbNamed } from '@slewcurve/mend';
import { describe, expect, it } from 'vitest';
import { codeOf } from '../support/edit-acceptance.js';

describe('VERBS', () => {
  it('holds the edits that are built, each with a name, an opening and words of the trade of its own', () => {
    expect(VERBS.map(({ name }) => name)).toEqual([
      'same side',
      'choose side',
      'lift out',
      'bridge',
      're-seat',
      'normalise',
      'take out hum',
      'smooth',
      'take out drift',
      'close loop',
      'lay over',
      'ease in/out',
      'even out',
      'cap',
      'shape',
      'copy pace',
      'match',
      'hold',
      'set marks',
      'stretch',
      'shrink',
      'reverse',
      'there and back',
      'ease through',
      'whole turns',
      'trim',
      'sort times',
      're-time to grid',
      're-grid',
      'convert',
      'set tangents',
      'unwrap',
      'restate',
      'change space',
      'mirror',
    ]);
    expect(new Set(VERBS.map(({ opening }) => opening)).size).toBe(VERBS.length);
    for (const verb of VERBS) {
      expect(verb.summary).toMatch(/^[A-Z].*\.$/);
      expect(verb.alsoCalled.length).toBeGreaterThan(2);
      expect(verbNamed(verb.name)).toBe(verb);
    }
    // `--proposed` never re-seats, chooses a way round or changes a pace unless allowed by name: that is somebody's decision.
    expect(VERBS.filter(({ needsAllowing }) => !needsAllowing).map(({ name }) => name)).toEqual([
      'same side',
      'lift out',
      'bridge',
      'normalise',
      'take out hum',
      'smooth',
      'take out drift',
      'close loop',
      'sort times',
      're-time to grid',
      'unwrap',
    ]);
  });

  it.each([
    ['same sid', 'same side'],
    ['normalize', 'normalise'],
    ['outlier', 'lift out'],
    ['Re-Seat', 're-seat'],
    ['half turn', 'choose side'],
    ['fill gap', 'bridge'],
    ['constant speed', 'even out'],
    ['easing', 'ease in/out'],
    ['pause', 'hold'],
    ['speed limit', 'cap'],
    ['elbow', 'ease through'],
    ['denoise', 'smooth'],
    ['vibration', 'take out hum'],
    ['gyro drift', 'take out drift'],
    ['walk cycle', 'close loop'],
    ['duplicate keys', 'sort times'],
    ['resample', 're-grid'],
    ['local', 'change space'],
    ['Z up', 'restate'],
  ])('asks of %j whether %j is meant', (name, meant) => {
    expect(codeOf(() => verbNamed(name))).toBe('card.unknown-verb');
    expect(() => verbNamed(name)).toThrow(`Did you mean "${meant}"?`);
  });

  it('lists all edits where none is near', () => {
    expect(() => verbNamed('xylophone')).toThrow('There are: same side, choose side,');
  });
});
