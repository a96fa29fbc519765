import { segmentAngle, signChanges } from '@slewcurve/core';
import { everyRole, type Place, type Remedy, type Rule, type TrackContext } from '../../rule.js';
import { sayDegrees } from '../../say-number.js';

const DEGREES = 180 / Math.PI;
/** Degrees: from here on `turn.half` names the change of sign. */
const HALF_TURN_TELLS = 174;

/** Neighbouring keys stored on opposite sides: q beside −q. */
export const signFlip: Rule = Object.freeze({
  id: 'turn.sign-flip',
  family: 'turn',
  level: 'note',
  unit: 'deg',
  alsoCalled: [
    'flip',
    'sign',
    'sign change',
    'hemisphere',
    'shortest path',
    'long way',
    'spinning',
    'quaternion continuity',
    'antipodal',
    'double cover',
    'alignSigns',
  ],
  summary:
    'Two neighbouring keys are stored with opposite signs, so that some programs turn the long way round.',
  // Beyond half a turn is the long way: any change of sign is.
  limits: everyRole({ angle: 180 }),
  reads: 'track',
  untouched: 'the orientation of every key, to the bit',
  find(context: TrackContext, { angle: limit = 180 }: { readonly angle?: number }): readonly Place[] {
    const turning = context.played.filter((played) => !played.holds);
    const [first] = turning;
    if (first === undefined) return [];
    const { track } = context;
    const unsafe = turning.find(({ playback }) => !playback.signSafe(track));
    const breaks = new Set(track.breaks);
    return signChanges(track)
      .filter((key) => !breaks.has(key - 1) && segmentAngle(track, key - 1) * DEGREES < HALF_TURN_TELLS)
      .map((key) => {
        const short = segmentAngle(track, key - 1) * DEGREES;
        return {
          keys: [key],
          time: track.times[key] ?? 0,
          span: [track.times[key - 1] ?? 0, track.times[key] ?? 0],
          value: 360 - short,
          limit,
          level: unsafe === undefined ? 'note' : 'error',
          playback: (unsafe ?? first).playback.id,
          facts: { short },
        };
      });
  },
  remedy({ track }: TrackContext): Remedy {
    return { step: { verb: 'same side', clip: track.clip, track: track.id }, price: 0 };
  },
  message(place: Place): string {
    const [key = 0] = place.keys;
    const short = place.facts?.['short'] ?? 0;
    const played =
      place.level === 'note' ? 'which the chosen playback does not mind' : `which ${place.playback} turns`;
    return `key ${key} is stored on the other side of key ${key - 1}: ${sayDegrees(short)} the short way, ${sayDegrees(place.value)} the long way, ${played}`;
  },
  page: {
    what: 'q and −q are one orientation, and a file may mix them freely: exporters that convert each key by itself do. Neighbouring keys then lie on opposite sides of the unit sphere.',
    trace:
      'Nothing under a playback that goes the short way. A needle of 360° less the step under one that blends the stored numbers.',
    standard:
      'glTF 2.0 has LINEAR rotations slerped the short way, so a change of sign is harmless there. For CUBICSPLINE its formula blends the stored numbers and has no sign care.',
    programs:
      'Players with a sign-safe slerp or nlerp show nothing. Those that blend components, fit cubics through them or difference them turn the long way.',
    people: 'A limb or a camera that spins once round within one key interval.',
    test: 'The dot product of two neighbouring stored quaternions is negative. A note while every chosen playback is sign-safe for the track, an error when one is not. The value is the angle the long way round.',
    source:
      'There is no threshold: the sign is what is tested. The level follows the glTF 2.0 text, Appendix C.',
    spares:
      'STEP tracks and declared cuts: nothing turns there. Within 6° of a half turn the sign says little; `turn.half` tells both ways there and names the change of sign too.',
    remedy:
      '`same side` negates whole keys, under CUBICSPLINE the value and both tangents. No orientation changes.',
  },
});
