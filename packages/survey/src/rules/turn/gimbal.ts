import { everyRole, type Limits, type Place, type Remedy, type Rule, type TrackContext } from '../../rule.js';
import { sayDegrees } from '../../say-number.js';
import { placesOf } from './angle-faults.js';

/** Degrees: a detour that is seen. */
const SEEN = 5;

/** Angles that race because the middle one is near its pole. */
export const gimbal: Rule = Object.freeze({
  id: 'turn.gimbal',
  family: 'turn',
  level: 'warning',
  unit: 'times',
  alsoCalled: ['gimbal lock', 'pole', 'singularity', 'rotation order', 'locked axis'],
  summary: 'Near the pole of the middle angle the outer ones turn many times as far as the thing itself.',
  limits: everyRole({ times: 5 }),
  reads: 'track',
  untouched: 'the orientation of every key',
  find: (context: TrackContext, { times = 0 }: Limits): readonly Place[] =>
    placesOf(context, 'gimbal', ({ channels, direct, travelled }) => ({
      value: channels / Math.max(direct, 1e-3),
      limit: times,
      level: travelled > direct + SEEN ? 'warning' : 'note',
    })),
  remedy: (): Remedy | undefined => undefined,
  message({ keys: [key = 0], value, limit, facts }: Place): string {
    const { travelled = 0, direct = 0 } = facts ?? {};
    return `into key ${key} the angles turn ${value.toFixed(1)} times as far as the thing itself (limit ${limit}), near the pole of the middle one: ${sayDegrees(travelled)} travelled for a true ${sayDegrees(direct)}`;
  },
  page: {
    what: 'At ±90° of the middle angle (0° and 180° for orders like ZXZ) both outer angles turn about one line, and near it small turns need large angles.',
    trace: 'A bump under playbacks that join angles; nothing under those of quaternions.',
    standard: 'glTF 2.0 stores quaternions, which have no pole.',
    programs: 'Those that join angles leave the short arc between keys.',
    people:
      'A wobble beside the way. A real pan and tilt head must race there whatever the file says: slow down, or give it a third axis.',
    test: 'The middle angle is within 5° of its pole at one of two keys, and the angles step more than five times as far, as one length, as the orientation turns. A warning where the way travelled is over 5° longer than the shortest, a note elsewhere.',
    source:
      'Geometry; the limits are common practice, no source. Keys (0°, 80°, 0°) and (180°, 80°, 180°): 31° travelled for a true 20° (measured).',
    spares: 'Quaternion tracks, playbacks that go by quaternions.',
    remedy: 'Another order of angles, or quaternions. No verb does that yet.',
  },
});
