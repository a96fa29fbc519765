import type { RotationTrack } from '@slewcurve/core';
import { everyRole, type Limits, type Place, type Remedy, type Rule, type TrackContext } from '../../rule.js';
import { isFirstOfClip, restated } from './whole-clip.js';

const DEGREES = 180 / Math.PI;
/** Fewer tracks than this may truly be that calm, or that fast. */
const SURE = 5;
/** Turned so little in all, in degrees as read, it says nothing. */
const STILL = 1;

/** Angles read by the wrong unit. */
export const degreesOrRadians: Rule = Object.freeze({
  id: 'file.degrees-or-radians',
  family: 'file',
  level: 'warning',
  unit: 'deg',
  alsoCalled: ['degrees', 'radians', 'unit mix-up', '57.3', 'wrong unit', 'angle unit'],
  summary: 'The angles of a whole clip look like radians read as degrees, or the other way round.',
  limits: everyRole({ most: 6.3, rate: 5000, share: 30 }),
  reads: 'stored',
  untouched: 'the sequence of the angles',
  find(context: TrackContext, { most = 0, rate = 0, share = 0 }: Limits): readonly Place[] {
    const { clip } = context;
    if (!isFirstOfClip(context)) return [];
    const tracks = clip.tracks.filter((track) => track.interpolation === 'EULER' && track.times.length > 2);
    if (tracks.length === 0) return [];
    const sizes = tracks.map(largestAngle);
    const size = Math.max(...sizes);
    const moving = tracks.filter((track) => widestStep(track) > 0).length;
    const fast = (100 * tracks.filter((track) => fastestChannel(track) > rate).length) / tracks.length;
    const at = (value: number, limit: number, radians: number): Place => ({
      keys: [],
      time: clip.start,
      span: [clip.start, clip.end],
      value,
      limit,
      level: tracks.length >= SURE ? 'warning' : 'note',
      facts: { radians, tracks: tracks.length },
    });
    if (moving > 0 && size > STILL && size <= most && hasFineSteps(tracks)) return [at(size, most, 1)];
    return fast > share ? [at(size, most, 0)] : [];
  },
  remedy: (_: TrackContext, { facts }: Place): Remedy | undefined =>
    restated({ angles: facts?.['radians'] === 1 ? 'radians' : 'degrees' }),
  message({ value, limit, facts }: Place): string {
    return facts?.['radians'] === 1
      ? `no angle of the clip’s ${facts['tracks']} tracks is larger than ${value.toFixed(2)}° (limit ${limit}): they look like radians that are read as degrees`
      : `most of the clip’s ${facts?.['tracks']} tracks race, with angles up to ${value.toFixed(0)}° (limit ${limit}): they look like degrees that are read as radians`;
  },
  page: {
    what: 'Angles carry no unit in most text; a column of radians taken for degrees is 57.3 times too small, and the other way round too large.',
    trace: 'Speeds 57.3 times too low or too high, all of them.',
    standard:
      'BVH’s channels are degrees by common practice; delimited text says it in its head or not at all.',
    programs: 'Each takes its own unit for granted.',
    people: 'A figure that hardly moves, or one that whirls.',
    test: 'Of a clip with tracks of angles: no angle is larger than 6.3 (a whole turn in radians), some are above 1, they move, and they have steps finer than a hundredth; or over 30 % of the tracks turn faster than 5,000 deg/s. A note with fewer than five tracks. Told once a clip, on its first track.',
    source: 'Arithmetic; the limits are common practice, no source.',
    spares:
      'Very still clips, quaternions. A head that truly moves by 6° at most looks the same: hence the note.',
    remedy: '`restate` with the unit named, for the whole file.',
  },
});

/** Degrees, as read. */
function largestAngle({ values }: RotationTrack): number {
  let most = 0;
  for (const value of values) if (Math.abs(value) > most) most = Math.abs(value);
  return most * DEGREES;
}

function widestStep({ values }: RotationTrack): number {
  let most = 0;
  for (let i = 3; i < values.length; i++)
    most = Math.max(most, Math.abs((values[i] ?? 0) - (values[i - 3] ?? 0)));
  return most * DEGREES;
}

/** Fastest of the three angles, deg/s. */
function fastestChannel({ values, times }: RotationTrack): number {
  let most = 0;
  for (let i = 3; i < values.length; i++) {
    const key = Math.floor(i / 3);
    const rate =
      Math.abs((values[i] ?? 0) - (values[i - 3] ?? 0)) / ((times[key] ?? 0) - (times[key - 1] ?? 0));
    if (rate > most) most = rate;
  }
  return most * DEGREES;
}

/** Whether some angle, as written, has more than two decimals. */
function hasFineSteps(tracks: readonly RotationTrack[]): boolean {
  return tracks.some(({ values }) =>
    values.some((value) => {
      const hundredths = value * DEGREES * 100;
      return Math.abs(hundredths - Math.round(hundredths)) > 1e-3;
    }),
  );
}
