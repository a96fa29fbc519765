import { everyRole, type Place, type Remedy, type Rule, type TrackContext } from '../../rule.js';
import { sayDegrees } from '../../say-number.js';
import { placesOf } from './angle-faults.js';

/** The other triple of angles for the same orientation. */
export const eulerFlip: Rule = Object.freeze({
  id: 'turn.euler-flip',
  family: 'turn',
  level: 'warning',
  unit: 'deg',
  alsoCalled: ['Euler flip', 'flip', 'angle flip', 'other solution', 'Euler filter'],
  summary: 'Two neighbouring keys write nearly one orientation with the two different triples of angles.',
  limits: everyRole({ share: 0.1 }),
  reads: 'track',
  untouched: 'the orientation of every key',
  find: (context: TrackContext): readonly Place[] =>
    placesOf(context, 'flip', ({ travelled, direct }) => ({
      value: travelled,
      limit: direct,
      level: 'warning',
    })),
  remedy({ track }: TrackContext, { keys }: Place): Remedy {
    return { step: { verb: 'unwrap', clip: track.clip, track: track.id, keys }, price: 0 };
  },
  message({ keys: [key = 0], value, limit }: Place): string {
    return `keys ${key - 1} and ${key} write nearly one orientation with different angles: played as numbers it turns ${sayDegrees(value)} for a true ${sayDegrees(limit)}`;
  },
  page: {
    what: 'Every orientation has two triples of angles: (a, b, c) and (a + 180°, 180° − b, c + 180°). A program that converts key by key may hop from one to the other.',
    trace:
      'A tall block within one key gap under playbacks that join angles; nothing under those of quaternions.',
    standard:
      'glTF 2.0 stores quaternions and has no such pair. BVH and other angle files join the numbers as they stand.',
    programs:
      'Those that join angles tumble through a detour; those that convert each key first show nothing.',
    people: 'A joint that tumbles and comes back within a frame or a few.',
    test: 'Both outer channels step by 90° to 270° while the orientation turns by less than a tenth of the length of all three steps, in an angle track that a chosen playback joins as numbers.',
    source:
      'Geometry of the two triples; the tenth is common practice, no source. Up to 157° travelled for none (measured).',
    spares: 'Real tumbling, quaternion tracks, playbacks that go by quaternions.',
    remedy:
      '`unwrap` takes the other triple from the key that jumps on, where that lies nearer to the key before; no orientation changes.',
  },
});
