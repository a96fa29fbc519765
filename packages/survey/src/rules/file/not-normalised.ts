import { angleFloor, type RotationTrack } from '@slewcurve/core';
import { everyRole, type Limits, type Place, type Remedy, type Rule, type TrackContext } from '../../rule.js';
import { isTime } from './is-time.js';

/** Shorter than this a quaternion has no direction. */
const NOTHING = 1e-6;
/** Shorter than this it is no rounding any more: the orientation itself is in doubt. */
const DOUBTFUL = 0.5;
/** Angle floors below which an offset is rounding; a floor is two steps of the storage, and a normalised byte is off by up to one. */
const FLOORS = 2;

/** A stored quaternion that is not unit length. */
export const notNormalised: Rule = Object.freeze({
  id: 'file.not-normalised',
  family: 'file',
  level: 'warning',
  unit: 'length',
  alsoCalled: ['normalize', 'unit length', 'not unit', 'zero quaternion', 'scaled quaternion', 'shear'],
  summary: 'A stored quaternion is longer or shorter than unit length by more than its storage explains.',
  limits: everyRole({ warning: 1e-3, error: 1e-2 }),
  reads: 'stored',
  untouched: 'the angle of every key',
  find({ stored }: TrackContext, limits: Limits): readonly Place[] {
    if (stored.interpolation === 'EULER') return [];
    const least = FLOORS * angleFloor(stored.storage);
    const warning = Math.max(limits['warning'] ?? 1e-3, least);
    const error = Math.max(limits['error'] ?? 1e-2, least);
    const places: Place[] = [];
    for (let key = 0; key < stored.times.length; key++) {
      const length = lengthOf(stored, key);
      // What is not finite is another rule's; a length that overflows is this one's.
      if (Number.isNaN(length)) continue;
      const value = Math.min(Math.abs(length - 1), Number.MAX_VALUE);
      if (!(value > warning)) continue;
      const stamp = stored.times[key];
      const time = isTime(stamp) ? stamp : 0;
      places.push({
        keys: [key],
        time,
        span: [time, time],
        value,
        limit: warning,
        level: value > error ? 'error' : 'warning',
        facts: { length },
      });
    }
    return places;
  },
  remedy({ stored }: TrackContext, { keys, facts }: Place): Remedy {
    const verb = (facts?.['length'] ?? 0) < DOUBTFUL ? 'bridge' : 'normalise';
    return { step: { verb, clip: stored.clip, track: stored.id, keys } };
  },
  message({ keys, limit, facts }: Place): string {
    const length = facts?.['length'] ?? 0;
    if (length < NOTHING) return `key ${keys[0]} is a quaternion of no length, so the key can't be played`;
    return `key ${keys[0]} is a quaternion of length ${length.toPrecision(6)} (limit 1 ± ${Number(limit.toPrecision(2))})`;
  },
  page: {
    what: 'Lossy storage, averaged components, a scaled node. A quaternion of half unit length or less is no rounding any more, and one of no length has no direction at all.',
    trace: 'None where the playback makes quaternions unit; a ripple where it does not.',
    standard:
      'glTF 2.0 asks for unit quaternions; the tangents of CUBICSPLINE are free. A validator accepts lengths from 0.9923 to 1.0077 (measured with gltf-validator 2.0.0-dev.3.10).',
    programs: 'Most make them unit when they read or sample; those that do not scale or shear the mesh.',
    people: 'Usually nothing; else a limb that swells.',
    test: 'Length off by more than 1e-3: warning; by more than 1e-2: error; each at least four steps of the storage (a normalised byte is off by up to 7.4e-3 by design). Tangents are never looked at.',
    source: 'Common practice, no source.',
    spares: 'What the storage rounds anyway.',
    remedy:
      '`normalise` divides by the length, which keeps the angle. Shorter than 0.5: `bridge` lays the key anew between its neighbours.',
  },
});

/** Length of a key's quaternion; NaN where a number of it is not finite. */
function lengthOf({ interpolation, values }: RotationTrack, key: number): number {
  const at = interpolation === 'CUBICSPLINE' ? key * 12 + 4 : key * 4;
  const x = values[at] ?? 0;
  const y = values[at + 1] ?? 0;
  const z = values[at + 2] ?? 0;
  const w = values[at + 3] ?? 0;
  const finite = Number.isFinite(x) && Number.isFinite(y) && Number.isFinite(z) && Number.isFinite(w);
  return finite ? Math.hypot(x, y, z, w) : Number.NaN;
}
