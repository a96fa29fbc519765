import { everyRole, type Limits, type Place, type Remedy, type Rule, type TrackContext } from '../../rule.js';
import { sayDegrees } from '../../say-number.js';
import { placesOf } from './angle-faults.js';

/** Angles that say one way round while quaternions would go another. */
export const longWay: Rule = Object.freeze({
  id: 'turn.long-way',
  family: 'turn',
  level: 'warning',
  unit: 'deg',
  alsoCalled: ['long way', 'spinning', 'wrong way round', 'lost turns', 'whole turns', 'shortest path'],
  summary:
    'The angles of two keys lead another way round than the shortest, which is lost once they are quaternions.',
  limits: everyRole({ longer: 5 }),
  reads: 'track',
  untouched: 'both keys',
  find: (context: TrackContext, { longer = 0 }: Limits): readonly Place[] =>
    placesOf(context, 'long-way', ({ travelled, direct }) => ({
      value: travelled,
      limit: direct + longer,
      level: 'warning',
    })),
  // The verb `convert` is not built yet.
  remedy: (): Remedy | undefined => undefined,
  message({ keys: [key = 0], value, facts }: Place): string {
    return `from key ${key - 1} to key ${key} the angles lead ${sayDegrees(value)} round, the short way is ${sayDegrees(facts?.['direct'] ?? 0)}: whichever is meant, programs will differ`;
  },
  page: {
    what: 'Angles can say 270° or three whole turns; a pair of quaternions knows the short way alone.',
    trace: 'A mirror image: slow where it should be fast, or the other way round.',
    standard: 'glTF 2.0 has LINEAR rotations go the shorter way.',
    programs: 'Those that join angles take the long way, those that go by quaternions the short one.',
    people: 'A turn that goes backwards, or a spin that is gone.',
    test: 'The way travelled through the angles is over 5° longer than the shortest turn, and neither a wrap, nor another triple, nor the pole explains it.',
    source: 'Common practice, no source.',
    spares: 'Declared spins, quaternion tracks, playbacks that go by quaternions.',
    remedy:
      'Before conversion put in keys at most 120° apart along the way that is meant; `subdivideAngles` of the library does it. No verb does yet.',
  },
});
