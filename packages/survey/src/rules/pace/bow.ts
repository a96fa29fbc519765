import { dot, keyOrientation, segmentAngle } from '@slewcurve/core';
import type { Limits, Place, Remedy, Rule, TrackContext } from '../../rule.js';
import { sayDegrees } from '../../say-number.js';

const DEGREES = 180 / Math.PI;

/** Straight chords between keys that lie far apart. */
export const bow: Rule = Object.freeze({
  id: 'pace.bow',
  family: 'pace',
  level: 'warning',
  unit: 'times',
  alsoCalled: ['nlerp', 'lerp', 'chord', 'uneven speed', 'arch', 'normalised lerp', 'normalized lerp'],
  summary: 'A playback by chords swells in the middle of a wide segment, where arcs keep their speed.',
  limits: Object.freeze({
    joint: { ratio: 1.25 },
    prop: { ratio: 1.1 },
    'camera-screen': { ratio: 1.1 },
    'camera-headset': { ratio: 1.05 },
    eye: 'off',
    machine: { ratio: 1.05 },
  }),
  reads: 'track',
  untouched: 'every key',
  excusedBy: ['whips'] as const,
  find({ track, played }: TrackContext, { ratio: limit = 0 }: Limits): readonly Place[] {
    const chord = played.find(({ playback: { id } }) => id === 'chord' || id === 'raw-chord');
    if (chord === undefined || chord.holds) return [];
    const { times } = track;
    const breaks = new Set(track.breaks);
    const places: Place[] = [];
    for (let k = 0; k + 1 < times.length; k++) {
      const turn = segmentAngle(track, k);
      // q beside −q turns the long way under raw chords: that is `turn.sign-flip`’s to tell.
      if (breaks.has(k) || (chord.playback.id === 'raw-chord' && changesSign(track, k))) continue;
      const value = 1 / Math.cos(turn / 4) ** 2;
      if (!(value > limit)) continue;
      const span = [times[k] ?? 0, times[k + 1] ?? 0] as const;
      places.push({
        keys: [k + 1],
        time: (span[0] + span[1]) / 2,
        span,
        value,
        limit,
        level: 'warning',
        playback: chord.playback.id,
        facts: { turn: turn * DEGREES },
      });
    }
    return places;
  },
  // Keys closer together need `re-grid`, which has to be told where; arcs instead of chords are the player’s choice.
  remedy: (): Remedy | undefined => undefined,
  message({ keys: [key = 0], value, limit, facts }: Place): string {
    return `from key ${key - 1} to key ${key}, ${sayDegrees(facts?.['turn'] ?? 0)} apart, a playback by chords turns ${value.toFixed(2)} times as fast in the middle as at the keys (limit ${limit} times)`;
  },
  page: {
    what: 'Programs that blend the four numbers and make them unit (nlerp) go along the chord and not along the arc. Between keys that lie close together nobody sees it.',
    trace: 'A shallow arch over each wide segment, where there should be a plateau.',
    standard: 'glTF 2.0 asks for slerp under LINEAR and lets nlerp stand in where keys are close.',
    programs: 'Engines that blend many poses a frame use chords; viewers mostly use arcs.',
    people: 'A spin that pulses once a key.',
    test: 'Under a playback by chords, in a segment of θ: 1/cos²(θ/4), which is the greatest speed over the least, above 1.25 for joints, 1.1 for props and cameras on a screen, 1.05 in a headset and for machines.',
    source:
      'Geometry: 1.07 at 60°, 1.17 at 90°, 1.33 at 120°, 1.59 at 150°. The limits are common practice, no source.',
    spares:
      'Playbacks by arcs and by cubics, which ease as their keys say; changes of sign; STEP tracks, declared cuts and whips.',
    remedy: 'Play by slerp, or bake keys at most 30° apart.',
  },
});

function changesSign(track: TrackContext['track'], k: number): boolean {
  const before = keyOrientation(new Float64Array(4), track, k);
  return dot(before, keyOrientation(new Float64Array(4), track, k + 1)) < 0;
}
