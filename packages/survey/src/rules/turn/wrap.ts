import { everyRole, type Limits, type Place, type Remedy, type Rule, type TrackContext } from '../../rule.js';
import { sayDegrees } from '../../say-number.js';
import { placesOf } from './angle-faults.js';

/** An angle that jumps by a whole turn and is played as a number. */
export const wrap: Rule = Object.freeze({
  id: 'turn.wrap',
  family: 'turn',
  level: 'warning',
  unit: 'deg',
  alsoCalled: ['360', 'angle wrap', '359 to 1', 'wraparound', 'unwrap', 'modulo 360', 'discontinuous angle'],
  summary: 'An angle channel jumps by about a whole turn between two keys, and is joined as a number.',
  limits: everyRole({ channel: 180 }),
  reads: 'track',
  untouched: 'the orientation of every key',
  find: (context: TrackContext, { channel = 0 }: Limits): readonly Place[] =>
    placesOf(context, 'wrap', (step) => ({ value: step.channel, limit: channel, level: 'warning' })),
  remedy({ track }: TrackContext, { keys }: Place): Remedy {
    return { step: { verb: 'unwrap', clip: track.clip, track: track.id, keys }, price: 0 };
  },
  message({ keys: [key = 0], value, limit, facts }: Place): string {
    const { travelled = 0, direct = 0 } = facts ?? {};
    return `from key ${key - 1} to key ${key} an angle steps by ${sayDegrees(value)} (limit ${sayDegrees(limit)}): played as numbers it turns ${sayDegrees(travelled)} for a true ${sayDegrees(direct)}`;
  },
  page: {
    what: 'Angles kept between −180° and 180°, or 0° and 360°, step by a whole turn at the border: 359° and then 1°.',
    trace: 'A block of almost 360° within one key gap.',
    standard:
      'glTF 2.0 stores quaternions and has no such border. BVH and other angle files join the numbers as they stand.',
    programs:
      'Those that join the angles whirl round once; those that convert each key to a quaternion first show nothing.',
    people: 'A joint that whirls round between two frames: a blur at dense keys, a full spin at sparse ones.',
    test: 'A channel steps by more than 180° while the orientation turns by less than half of that, in an angle track that a chosen playback joins as numbers.',
    source:
      'Geometry: a step beyond half a turn is never the shorter way. Half is common practice, no source.',
    spares:
      'Declared spins, whose whole turns are meant; quaternion tracks; playbacks that go by quaternions.',
    remedy:
      '`unwrap` adds whole turns at the key that jumps, and to all that follow it; no orientation changes.',
  },
});
