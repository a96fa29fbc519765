import {
  angleFloor,
  dot,
  keyOrientation,
  logMap,
  relative,
  segmentAngle,
  type RotationTrack,
} from '@slewcurve/core';
import type { Level, Way } from '../../finding.js';
import { everyRole, type Limits, type Place, type Remedy, type Rule, type TrackContext } from '../../rule.js';
import { sayDegrees } from '../../say-number.js';

const DEGREES = 180 / Math.PI;
/** Times the noise floor within which rounding alone decides the way. */
const ROUNDING = 10;
/** From half a turn, degrees: within it a change of sign belongs to this finding too. */
const SIGN_NEAR = 6;

/** Keys so far apart that the way round is arbitrary or nearly so. */
export const half: Rule = Object.freeze({
  id: 'turn.half',
  family: 'turn',
  level: 'warning',
  unit: 'deg',
  alsoCalled: [
    'flip',
    '180',
    'half turn',
    'long way',
    'shortest path',
    'spinning',
    'wrong way round',
    'ambiguous direction',
  ],
  summary: 'Two neighbouring keys lie about half a turn apart, so that both ways round are nearly as short.',
  limits: Object.freeze({
    ...everyRole({ note: 150, warning: 165, error: 175 }),
    machine: { note: 120, warning: 150, error: 170 },
  }),
  reads: 'track',
  untouched: 'the keys at both ends, byte for byte',
  find(context: TrackContext, limits: Limits): readonly Place[] {
    const { track } = context;
    const playback = context.played.find((played) => !played.holds)?.playback.id;
    if (playback === undefined || track.interpolation === 'EULER') return [];
    const { note = 150 } = limits;
    const margin = ROUNDING * angleFloor(track.storage, track.interpolation) * DEGREES;
    const breaks = new Set(track.breaks);
    const places: Place[] = [];
    for (let key = 1; key < track.times.length; key++) {
      if (breaks.has(key - 1)) continue;
      const value = segmentAngle(track, key - 1) * DEGREES;
      if (value < note && !(180 - value < margin)) continue;
      places.push({
        keys: [key],
        time: track.times[key] ?? 0,
        span: [track.times[key - 1] ?? 0, track.times[key] ?? 0],
        value,
        limit: Math.min(note, 180 - margin),
        level: 180 - value < margin ? 'error' : levelOf(value, limits),
        playback,
        ways: waysBetween(track, key),
        facts: { signChange: Number(180 - value <= SIGN_NEAR && changesSign(track, key)) },
      });
    }
    return places;
  },
  remedy({ track }: TrackContext, { keys, ways }: Place): Remedy | undefined {
    const [now, other] = ways ?? [];
    if (now === undefined || other === undefined) return undefined;
    const step = { verb: 'choose side', clip: track.clip, track: track.id, keys };
    return { step: { ...step, axis: now.axis }, price: 0, alternatives: [{ ...step, axis: other.axis }] };
  },
  message(place: Place): string {
    const [key = 0] = place.keys;
    const [now, other] = place.ways ?? [];
    const sign = place.facts?.['signChange'] === 1 ? ', which are stored with opposite signs,' : '';
    return `keys ${key - 1} and ${key}${sign} lie ${sayTurn(place.value)} apart (limit ${sayDegrees(place.limit)}): ${sayWay(now)} the short way, or ${sayWay(other)}; which one is meant has to be decided`;
  },
  page: {
    what: 'Half a turn has no shorter way. Near it a rounding, a re-export or a hair of noise decides which way a thing turns, and two programs may decide differently. The keys are too far apart.',
    trace: 'A plausible plateau of about 180° over the key interval; the way it goes is arbitrary.',
    standard:
      'glTF 2.0 has LINEAR rotations go the shorter way; at half a turn it leaves the choice to the program.',
    programs: 'Each goes by the last bit of its own dot product.',
    people:
      'A turn that goes the wrong way round, perhaps only in one viewer or only after the next export. On a motorised head it winds up cables or hits a stop, and in a headset it turns the wearer’s world: settle it before it runs.',
    test: 'The angle between neighbouring keys: a note from 150°, a warning from 165°, an error from 175° (machines: 120°, 150°, 170°), and an error wherever 180° is nearer than ten times the noise floor. Both ways are shown, axis in the own frame of the earlier key.',
    source:
      'Common practice for the limits, no source. With normal noise of 1° in the angle the way is reversed in 2 % of cases at 178°, in 16 % at 179°, in 31 % at 179.5° (the normal distribution beyond 2, 1 and ½ σ).',
    spares: 'STEP tracks and declared cuts.',
    remedy:
      '`choose side` puts a key in the middle of the way that is meant; both ends stay. The way proposed is the one that a sign-safe slerp takes now. Whether that is the way that was meant only a person can say; the other way is offered beside it.',
  },
});

function levelOf(value: number, { warning = 165, error = 175 }: Limits): Level {
  if (value >= error) return 'error';
  return value >= warning ? 'warning' : 'note';
}

/** The way slerp takes now, then the other; own axes of the earlier key. */
function waysBetween(track: RotationTrack, key: number): readonly Way[] {
  const before = keyOrientation(new Float64Array(4), track, key - 1);
  const after = keyOrientation(new Float64Array(4), track, key);
  const turn = logMap(new Float64Array(3), relative(after, before, after));
  const angle = Math.hypot(...turn);
  // Six decimals are far more than it takes to tell the two ways apart, and can be read.
  const [x = 0, y = 0, z = 0] = turn.map((component) => Number((component / (angle || 1)).toFixed(6)) + 0);
  return [
    { axis: [x, y, z], angle: angle * DEGREES },
    { axis: [0 - x, 0 - y, 0 - z], angle: 360 - angle * DEGREES },
  ];
}

function changesSign(track: RotationTrack, key: number): boolean {
  const before = keyOrientation(new Float64Array(4), track, key - 1);
  return dot(before, keyOrientation(new Float64Array(4), track, key)) < 0;
}

/** Near half a turn the decimals matter. */
function sayTurn(degrees: number): string {
  return `${degrees.toFixed(Math.abs(180 - degrees) < 0.1 ? 4 : 1)}°`;
}

function sayWay(way: Way | undefined): string {
  if (way === undefined) return 'no way';
  return `${sayTurn(way.angle)} about ${sayAxis(way.axis)}`;
}

/** An own axis by its name where it is one; its three components elsewhere. */
function sayAxis(axis: readonly number[]): string {
  const along = axis.findIndex((component) => Math.abs(component) > 0.9999);
  if (along >= 0) return `${(axis[along] ?? 0) < 0 ? 'minus own' : 'own'} ${'xyz'.charAt(along)}`;
  return `own (${axis.map((component) => component.toFixed(2).replace(/^-(0\.00)$/, '$1')).join(', ')})`;
}
