import { angleFloor } from '@slewcurve/core';
import { everyRole, type Limits, type Place, type Remedy, type Rule, type TrackContext } from '../../rule.js';
import { sayDegrees } from '../../say-number.js';
import { segmentsOf } from '../../segments.js';

const DEGREES = 180 / Math.PI;

/** Keys that say the same again and again. */
export const idle: Rule = Object.freeze({
  id: 'file.idle',
  family: 'file',
  level: 'note',
  unit: 'deg',
  alsoCalled: [
    'constant track',
    'static track',
    'redundant keys',
    'baked keys',
    'junk channel',
    'reduce keys',
  ],
  summary: 'A track of many keys never turns.',
  limits: everyRole({ keys: 2 }),
  reads: 'track',
  untouched: 'the orientation, at every time',
  find(context: TrackContext, { keys: most = 0 }: Limits): readonly Place[] {
    const { track } = context;
    if (track.times.length <= most || track.breaks.length > 0 || hasTangents(context)) return [];
    const limit = 2 * angleFloor(track.storage, track.interpolation) * DEGREES;
    let travelled = 0;
    for (const turn of segmentsOf(context).turns) {
      travelled += turn;
      if (travelled >= limit) return [];
    }
    const [start, end] = [track.times[0] ?? 0, track.times.at(-1) ?? 0];
    const facts = { keys: track.times.length };
    return [{ keys: [], time: start, span: [start, end], value: travelled, limit, level: 'note', facts }];
  },
  // `thin` is not built yet.
  remedy: (): Remedy | undefined => undefined,
  message({ value, limit, facts }: Place): string {
    return `its ${facts?.['keys']} keys turn by ${sayDegrees(value)} in all, which is nothing at this storage (below ${sayDegrees(limit)}): one key would do`;
  },
  page: {
    what: 'A bake writes a key a frame for every joint, whether it moves or not.',
    trace: 'A line at zero.',
    standard: 'glTF 2.0 holds the first and last value before and after the keys: one key is a whole track.',
    programs: 'All play it; it costs download and memory only.',
    people: 'Nothing.',
    test: 'More than two keys, and a total travel below twice the noise floor. Always a note.',
    source: 'Common practice, no source.',
    spares: 'Tracks of one or two keys, tracks with cuts, CUBICSPLINE tracks whose tangents are not zero.',
    remedy:
      'Thin it to one key. Leave it where the track is there to hold a joint against a layer below. The verb `thin` is not built yet.',
  },
});

/** Whether something turns between the keys all the same. */
function hasTangents({ track: { interpolation, values } }: TrackContext): boolean {
  if (interpolation !== 'CUBICSPLINE') return false;
  return values.some((value, i) => value !== 0 && (i % 12 < 4 || i % 12 >= 8));
}
