import { VALUES_PER_KEY } from '@slewcurve/core';
import { everyRole, type Place, type Remedy, type Rule, type TrackContext } from '../../rule.js';
import { isTime } from './is-time.js';

/** NaN or infinity among a key's stored numbers. */
export const notFinite: Rule = Object.freeze({
  id: 'file.not-finite',
  family: 'file',
  level: 'error',
  unit: 'numbers',
  alsoCalled: ['NaN', 'infinity', 'invalid number', 'missing key', 'division by zero'],
  summary: 'A key holds a number that is not finite, so that nothing can play it.',
  limits: everyRole({ numbers: 0 }),
  reads: 'stored',
  untouched: 'all other keys of the track, byte for byte',
  find({ stored }: TrackContext): readonly Place[] {
    const size = VALUES_PER_KEY[stored.interpolation];
    const places: Place[] = [];
    // A report holds no NaN: a key without a time is told by the last time before it, the first of all where there is none.
    let near = stored.times.find(isTime) ?? 0;
    for (let key = 0; key < stored.times.length; key++) {
      const time = stored.times[key] ?? 0;
      if (isTime(time)) near = time;
      let values = 0;
      let pose = 0;
      for (let i = 0; i < size; i++) {
        if (Number.isFinite(stored.values[key * size + i])) continue;
        values++;
        // Under CUBICSPLINE the value stands between its tangents.
        if (size === 4 || (i >= 4 && i < 8)) pose++;
      }
      const times = isTime(time) ? 0 : 1;
      if (values + times === 0) continue;
      places.push({
        keys: [key],
        time: near,
        span: [near, near],
        value: values + times,
        limit: 0,
        level: 'error',
        facts: { times, pose },
      });
    }
    return places;
  },
  remedy({ stored }: TrackContext, { keys, facts }: Place): Remedy | undefined {
    // A lost time has no verb, and lost tangents beside a good value have none yet.
    if (facts?.['times'] === 1 || facts?.['pose'] === 0 || stored.interpolation === 'EULER') return undefined;
    return { step: { verb: 'bridge', clip: stored.clip, track: stored.id, keys } };
  },
  message(place: Place): string {
    const what = place.facts?.['times'] === 1 ? 'whose time is' : place.value === 1 ? 'that is' : 'that are';
    return `key ${place.keys[0]} holds ${place.value} ${place.value === 1 ? 'number' : 'numbers'} ${what} not finite, so the key can't be played`;
  },
  page: {
    what: 'NaN or infinity in the file: a division by zero at export, as at an exact half turn or an axis of no length.',
    trace: 'A gap; the key is left out and the motion goes on from its neighbours.',
    standard: 'glTF 2.0 (“Binary Data Storage”) forbids NaN and infinities in accessors.',
    programs: 'Some drop the node, some the mesh, some every frame from there on.',
    people: 'A limb or the whole figure disappears.',
    test: 'Any stored number of a key, its time or a tangent included, that is not finite. A time beyond ±1e300 s counts as such. Always an error.',
    source: 'glTF 2.0.',
    spares: 'Nothing.',
    remedy:
      '`bridge` lays the lost keys anew between the nearest sound ones. A lost time has to be set at the source.',
  },
});
