import { segmentAngle } from '@slewcurve/core';
import type { Limits, Place, Remedy, Rule, TrackContext } from '../../rule.js';
import { sayDegrees, saySeconds } from '../../say-number.js';
import { jumpsOf } from './measure.js';
import { tryReSeat } from './try-re-seat.js';
import { tryBridge } from './try-remedy.js';

const DEGREES = 180 / Math.PI;
/** A side slower than this, deg/s, stands still: what looks like a shelf may be the start or the end of a fast move. */
const STILL = 2;
/** A side slower than this share of the step is calm: no fast move starts or ends there. */
const CALM = 0.25;

/** A step between two keys after which the motion goes on from the new place. */
export const shelf: Rule = Object.freeze({
  id: 'jump.shelf',
  family: 'jump',
  level: 'warning',
  unit: 'deg',
  alsoCalled: ['pop', 'spike', 'glitch', 'outlier', 'snap', 'step', 'offset', 'knee pop', 'sensor slip'],
  summary: 'The orientation steps from one key to the next and stays there.',
  limits: Object.freeze({
    joint: { size: 2, seam: 0.5 },
    prop: { size: 2, seam: 0.25 },
    'camera-screen': { size: 0.5, seam: 0.1 },
    'camera-headset': { size: 0.5, seam: 0.1 },
    eye: 'off',
    machine: { size: 0.5, seam: 0.02 },
  }),
  reads: 'track',
  untouched: 'the keys at both ends of the bridge and all outside it, byte for byte',
  excusedBy: ['whips'] as const,
  find(context: TrackContext, { size = 0 }: Limits): readonly Place[] {
    const { times } = context.track;
    return jumpsOf(context)
      .filter((jump) => jump.kind === 'shelf')
      .map(({ key, size: value, gain }) => {
        const still = sidesAt(context, key);
        return {
          keys: [key],
          time: times[key] ?? 0,
          span: spanInto(times, key),
          value,
          limit: size,
          level: still === 'explains' ? 'note' : 'warning',
          confidence: 1 - 1 / gain,
          facts: { still: Number(still !== 'no'), before: keyBefore(times, key) },
        };
      });
  },
  remedy(context: TrackContext, place: Place, limits: Limits): Remedy | undefined {
    const key = place.keys[0] ?? 0;
    const bridge = tryBridge(context, key);
    const reSeat = tryReSeat(context, key, limits);
    if (reSeat === undefined) return bridge;
    return {
      ...reSeat,
      alternatives: [...(reSeat.alternatives ?? []), ...(bridge === undefined ? [] : [bridge.step])],
    };
  },
  message(place: Place, remedy?: Remedy): string {
    const [key = 0] = place.keys;
    const { before = key - 1 } = place.facts ?? {};
    const seam = key === 0 ? ', over the seam of the loop,' : '';
    const still = place.facts?.['still'] === 1 ? ', starting from or ending in standing still' : '';
    const price =
      remedy?.price === undefined
        ? ''
        : `; ${remedy.step.verb === 'bridge' ? `a bridge over ${remedy.step.steps} steps` : 'seating the rest anew'} turns a key by up to ${sayDegrees(remedy.price)}`;
    return `from key ${before} to key ${key}${seam} it steps by ${sayDegrees(place.value)} in ${saySeconds(place.span[1] - place.span[0])} and stays there${still} (limit ${sayDegrees(place.limit)})${price}`;
  },
  page: {
    what: 'A sudden offset: a contact seated anew, two halves of a clip edited apart, a sensor that slipped, a knee that pops out of full stretch. The motion before and the motion after are each sound.',
    trace: 'One tall step of a single frame, the same level before and after it.',
    standard: 'glTF 2.0 says nothing about it: the file is valid, and a validator is silent.',
    programs: 'Every program plays it as it stands.',
    people: 'A snap. A real hit is at least two frames wide and is not named.',
    test: 'As for a lone key, but the shelf must explain best within three keys, lower the roughness at least 8 times, explain half as much again as any rival within one key, and its fitted offset must be larger than the limit and twice the noise floor. Where one side turns slower than 2 deg/s the finding says so, and it is a note, as the start or the stop of a fast move and a held pose look alike; but not where the other side moves, and at less than a quarter of the step’s speed: then no fast move starts or stops there.',
    source:
      'Limits are common practice, no source. In a prototype of this rule, on synthetic gait and head shakes at 30 frames a second, shelves of 6° were all found; false alarms stay where a hinge reaches full stretch (17 to 29 % of such moments there).',
    spares: 'Sparse tracks, STEP tracks, declared cuts, hits two or more frames wide, eyes.',
    remedy:
      '`bridge` lays one smooth turn over the shortest run of four steps or more that raises no jump; the price is how far the most moved key turns. `re-seat` turns the whole rest of the track back instead. It is proposed only in a loop whose open seam it closes, and is never done unless allowed by name. A bridge is shorter than a person would move: before a motorised head or a headset plays it, look at its peak speed.',
  },
});

/**
 * Whether one side of a shelf stands still, and whether that may explain it: as the start or the stop of a fast move, or as one held
 * pose after another. A side that moves calmly explains nothing.
 */
function sidesAt(context: TrackContext, key: number): 'no' | 'beside' | 'explains' {
  const before = keyBefore(context.track.times, key);
  const sides = [speedOf(context, before - 1), speedOf(context, key)];
  const [slow, fast] = [Math.min(...sides), Math.max(...sides)];
  if (slow >= STILL) return 'no';
  return fast >= STILL && fast < CALM * speedOf(context, before) ? 'beside' : 'explains';
}

/** The key before; of a loop's first key the last but one, as its last is the first again. */
function keyBefore(times: Float64Array, key: number): number {
  return key > 0 ? key - 1 : times.length - 2;
}

/** The times that a step into a key takes. */
function spanInto(times: Float64Array, key: number): readonly [number, number] {
  const before = keyBefore(times, key);
  return [times[before] ?? 0, times[before + 1] ?? 0];
}

/** Mean speed from key to the next, deg/s; infinite where there is none. */
function speedOf({ track }: TrackContext, key: number): number {
  if (key < 0 || key + 1 >= track.times.length) return Infinity;
  return (segmentAngle(track, key) * DEGREES) / ((track.times[key + 1] ?? 0) - (track.times[key] ?? 0));
}
