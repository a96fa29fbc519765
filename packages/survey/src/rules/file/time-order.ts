import { VALUES_PER_KEY, medianGap, type RotationTrack } from '@slewcurve/core';
import { everyRole, type Limits, type Place, type Remedy, type Rule, type TrackContext } from '../../rule.js';
import { saySeconds } from '../../say-number.js';
import { isTime } from './is-time.js';

/** A key that is not later than the key before it, or hardly. */
export const timeOrder: Rule = Object.freeze({
  id: 'file.time-order',
  family: 'file',
  level: 'error',
  unit: 's',
  alsoCalled: [
    'duplicate time',
    'duplicate keys',
    'unsorted keys',
    'times not increasing',
    'near-duplicate time',
    'negative time step',
  ],
  summary: 'A key is not later than the key before it, or by less than can be meant.',
  limits: everyRole({ gap: 1e-4, share: 0.01 }),
  reads: 'stored',
  untouched: 'every orientation',
  find({ stored, track }: TrackContext, { gap: least = 0, share = 0 }: Limits): readonly Place[] {
    const { times } = stored;
    const limit = Math.max(least, share * medianGap(track));
    const places: Place[] = [];
    // Against the latest time so far, so that every key that can't be played is named, not the first alone.
    let latest = -Infinity;
    for (let key = 0; key < times.length; key++) {
      const time = times[key] ?? Number.NaN;
      if (!isTime(time)) continue;
      const value = time - latest;
      if (latest > -Infinity && value < limit)
        places.push({
          keys: [key],
          time,
          span: [Math.min(time, latest), Math.max(time, latest)],
          value,
          limit,
          level: value > 0 ? 'warning' : 'error',
          facts: { twin: Number(value === 0 && key > 0 && sameValues(stored, key)) },
        });
      latest = Math.max(latest, time);
    }
    return places;
  },
  remedy({ stored }: TrackContext, { value, facts }: Place): Remedy | undefined {
    // Sorting helps neither keys that nearly meet nor two values at one time: which is meant is for people to say.
    const sortable = value < 0 || facts?.['twin'] === 1;
    if (!sortable || !stored.times.every(Number.isFinite)) return undefined;
    return { step: { verb: 'sort times', clip: stored.clip, track: stored.id }, price: 0 };
  },
  message({ keys, time, value, limit, facts }: Place): string {
    const [key = 0] = keys;
    if (value > 0)
      return `key ${key} comes ${saySeconds(value)} after the key before it (limit ${saySeconds(limit)})`;
    if (value < 0)
      return `key ${key} at ${saySeconds(time)} is ${saySeconds(-value)} earlier than a key before it`;
    return facts?.['twin'] === 1
      ? `key ${key} repeats the key before it, time and values`
      : `key ${key} has the time of a key before it and other values; if a cut is meant, declare it`;
  },
  page: {
    what: 'Times out of order, twice the same, or nearly so: merged tracks, times rounded as text, a cut stored as two keys of one time.',
    trace: 'An infinite or negative spike; the keys that can’t be played are left out.',
    standard:
      'glTF 2.0 (“Animations”) wants strictly increasing times. A validator catches equal and falling times; 1e-6 s apart passes.',
    programs: 'Some skip, some divide by zero, some take the wrong segment.',
    people: 'A flash of one frame. 10° within 1e-6 s is 10 million deg/s.',
    test: 'A time that is not later than the latest before it: error. A gap under 1e-4 s or under 1 % of the track’s median gap: warning.',
    source: 'glTF 2.0 for the order; common practice, no source, for the least gap.',
    spares: 'Times that are not finite: those are `file.not-finite`.',
    remedy:
      '`sort times` puts keys in order and drops exact repeats; it lists every drop and changes no number of a key that stays. Two values at one time may be a cut that is meant: declare it in the house rules, or drop one.',
  },
});

function sameValues({ values, interpolation }: RotationTrack, key: number): boolean {
  const size = VALUES_PER_KEY[interpolation];
  const at = key * size;
  return values.subarray(at, at + size).every((value, i) => Object.is(value, values[at - size + i]));
}
