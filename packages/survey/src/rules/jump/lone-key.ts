import type { Limits, Place, Remedy, Rule, TrackContext } from '../../rule.js';
import { sayDegrees } from '../../say-number.js';
import { jumpsOf } from './measure.js';
import { tryLiftOut } from './try-remedy.js';

/** One key that stands beside its neighbours' motion. */
export const loneKey: Rule = Object.freeze({
  id: 'jump.lone-key',
  family: 'jump',
  level: 'warning',
  unit: 'deg',
  alsoCalled: ['pop', 'spike', 'glitch', 'outlier', 'one-frame pop', 'stray key', 'bad frame', 'blip'],
  summary: 'One key stands off its neighbours for a single frame: there and back.',
  limits: Object.freeze({
    joint: { size: 1 },
    prop: { size: 1 },
    'camera-screen': { size: 0.25 },
    'camera-headset': { size: 0.25 },
    eye: { size: 2, leastRate: 60 },
    machine: { size: 0.25 },
  }),
  reads: 'track',
  untouched: 'all other keys of the track, byte for byte',
  excusedBy: ['whips'] as const,
  find(context: TrackContext, { size = 0 }: Limits): readonly Place[] {
    const { times } = context.track;
    return jumpsOf(context)
      .filter((jump) => jump.kind === 'lone-key')
      .map((jump) => ({
        keys: [jump.key],
        time: times[jump.key] ?? 0,
        span: [times[Math.max(0, jump.key - 1)] ?? 0, times[jump.key + 1] ?? 0],
        value: jump.size,
        limit: size,
        level: 'warning',
        confidence: 1 - 1 / jump.gain,
      }));
  },
  remedy(context: TrackContext, place: Place): Remedy | undefined {
    return tryLiftOut(context, place.keys[0] ?? 0);
  },
  message(place: Place): string {
    return `key ${place.keys[0]} stands ${sayDegrees(place.value)} off its neighbours for one frame (limit ${sayDegrees(place.limit)})`;
  },
  page: {
    what: 'A single orientation that does not belong: an outlier of a capture, a solver glitch, a slipped hand. The keys before and after it agree with each other and not with it.',
    trace: 'Two tall steps side by side, there and back. One step alone is a shelf.',
    standard: 'glTF 2.0 says nothing about it: the file is valid, and a validator is silent.',
    programs: 'Every program plays it as it stands.',
    people: 'A pop of one frame, most visible where a camera or a long limb hangs on the joint.',
    test: 'Around each key the fourth differences of the motion are explained by a lone key, by a shelf and by a corner. The lone key must explain best within three keys, lower the roughness at least 16 times, explain half as much again as any rival within one key, and be larger than the limit and twice the noise floor. At least seven positions of the window of nine must be usable, so the first and last four keys are never named.',
    source:
      'Limits are common practice, no source. The least gain: in exact arithmetic lifting out a key at a dead stop lowers the roughness 13.5 times by itself. Tested here on 300 smooth tracks with one outlier of 2° to 120° each, at 30 and 60 keys a second: all named, and nothing on the same tracks without it.',
    spares:
      'Sparse tracks (each of their keys is a decision), STEP tracks, declared cuts, whips, impacts and dead stops. Eyes below 60 frames a second, whose real jumps look the same. Violent shakes of a head may still be named.',
    remedy:
      '`lift out` replaces this one key by what its neighbours say. The price is how far the key turns.',
  },
});
