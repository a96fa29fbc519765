import {
  SlewcurveError,
  angleBetween,
  angleFloor,
  keyOrientation,
  rateFloor,
  type Curve,
  type RotationTrack,
} from '@slewcurve/core';
import { median } from '../../median.js';
import type { Limits, Place, PlayedTrack, Remedy, Rule, TrackContext } from '../../rule.js';
import { sayDegrees, sayRate } from '../../say-number.js';
import { angleApart, differenceOf, rateOf, segmentsOf } from '../../segments.js';

const DEGREES = 180 / Math.PI;
/** Steps before the join, and how many of their usual changes of rate are still usual at it. */
const BESIDE = 4;
const USUAL = 3;
/** Degrees: no limit on the axis is below this. */
const LEAST_AXIS = 0.01;

/** Two clips that are declared to follow each other, and don't. */
export const clipJoin: Rule = Object.freeze({
  id: 'seam.join',
  family: 'seam',
  level: 'warning',
  unit: 'times',
  alsoCalled: ['transition', 'clip transition', 'concatenate', 'append', 'pop at the join', 'handover'],
  summary: 'A clip does not begin as the clip ends that runs on into it: in pose, in speed or in axis.',
  limits: Object.freeze({
    joint: { gap: 0.5, rate: 10, share: 0.1, axis: 10 },
    prop: { gap: 0.25, rate: 10, share: 0.1, axis: 10 },
    'camera-screen': { gap: 0.1, rate: 1, share: 0.1, axis: 10 },
    'camera-headset': { gap: 0.1, rate: 1, share: 0.1, axis: 10 },
    eye: 'off',
    machine: { gap: 0.02, rate: 1, share: 0.1, axis: 10 },
  }),
  reads: 'track',
  untouched: 'both clips',
  find(context: TrackContext, limits: Limits): readonly Place[] {
    const { track, declared } = context;
    if (track.times.length < 2) return [];
    return declared.joins.flatMap((next) => {
      const worst = next.times.length < 2 ? undefined : worstOf(context, next, limits);
      if (worst === undefined || !(worst.value > 1)) return [];
      const last = track.times.length - 1;
      const end = track.times[last] ?? 0;
      const span = [track.times[last - 1] ?? 0, end] as const;
      return [
        { ...worst, keys: [last], time: end, span, limit: 1, level: 'warning', other: next.clip } as const,
      ];
    });
  },
  // `join` is not built yet; `match` would bring the speeds together and leave the poses apart.
  remedy: (): Remedy | undefined => undefined,
  message({ value, other, facts = {} }: Place): string {
    const { gap = 0, before = 0, after = 0, axis = 0 } = facts;
    return `it runs on into ${other} ${sayDegrees(gap)} off, from ${sayRate(before)} to ${sayRate(after)}, axes ${sayDegrees(axis)} apart: ${value.toFixed(1)} times what passes`;
  },
  page: {
    what: 'Clips that are played one after the other without a transition have to fit in pose, in speed and in axis: cut at other frames, edited apart, or exported from other rigs they don’t.',
    trace:
      'A needle (pose), a step (speed) or nothing at all but in the axis lane, where the second clip begins. No file shows it: no segment joins the two.',
    standard: 'glTF 2.0 keeps clips apart and says nothing of what follows what.',
    programs:
      'Most switch from one frame to the next; many mix over some frames, which hides a gap and shows a change of speed.',
    people: 'A twitch as the clip changes. A motorised head gets it as a blow: mend the join before it runs.',
    test: 'For clips that the house rules declare under `joins`: the pose is more than 0.5° off for joints, 0.25° for props, 0.1° for cameras, 0.02° for machines; or the speeds differ by more than 10 % and 10 deg/s (1 deg/s for cameras and machines); or the axes by more than 10° at speeds above that. Speed and axis count only where the change of rate is above three times the usual one at the end of the clip, and above the noise floor. The value is how many times over its limit the worst of the three is.',
    source: 'Common practice, no source.',
    spares: 'Clips that are not declared to join; pairs that are meant to cut are not to be declared.',
    remedy:
      'The verb `join` is not built yet. `match` brings both speeds together within its shoulders; the pose has to be mended at the source.',
  },
});

type Worst = Pick<Place, 'value' | 'playback' | 'facts'>;

/** How far beyond its limit the worst of pose, speed and axis is, under the worst playback. */
function worstOf(context: TrackContext, next: RotationTrack, limits: Limits): Worst | undefined {
  const all = context.played.flatMap((played) => {
    const one = under(context, played, next, limits);
    return one === undefined ? [] : [one];
  });
  return all.toSorted((a, b) => b.value - a.value)[0];
}

function under(
  context: TrackContext,
  { playback, curve, holds }: PlayedTrack,
  next: RotationTrack,
  { gap: most = 0, rate = 0, share = 0, axis: turned = 0 }: Limits,
): Worst | undefined {
  const { track } = context;
  const other = curveOf(() => playback.play(next));
  if (other === undefined) return undefined;
  const [p, q] = [new Float64Array(4), new Float64Array(4)];
  const gap =
    angleBetween(keyOrientation(p, track, track.times.length - 1), keyOrientation(q, next, 0)) * DEGREES;
  const floor =
    (angleFloor(track.storage, track.interpolation) + angleFloor(next.storage, next.interpolation)) * DEGREES;
  const overGap = gap / Math.max(most, floor);
  if (holds) return { value: overGap, playback: playback.id, facts: { gap } };
  const out = curve.rate(new Float64Array(3), justBefore(curve.end), 'parent');
  const into = other.rate(new Float64Array(3), other.start, 'parent');
  const [before, after] = [Math.hypot(...out) * DEGREES, Math.hypot(...into) * DEGREES];
  const axis = before > 0 && after > 0 ? angleApart(asVector(out), asVector(into)) : 0;
  const noise = (rateFloor(track, track.times.length - 2) + rateFloor(next, 0)) * DEGREES;
  const isUnusual = differenceOf(out, into) * DEGREES > Math.max(noise, usualChange(context));
  const overRate = Math.abs(before - after) / Math.max(rate, share * Math.max(before, after), noise);
  const overAxis = Math.min(before, after) > rate ? axis / Math.max(turned, LEAST_AXIS) : 0;
  const value = Math.max(overGap, ...(isUnusual ? [overRate, overAxis] : []));
  return { value, playback: playback.id, facts: { gap, before, after, axis } };
}

function curveOf(play: () => Curve): Curve | undefined {
  try {
    return play();
  } catch (error) {
    if (error instanceof SlewcurveError) return undefined;
    throw error;
  }
}

/** The rate at a curve's very end is that of standing still after it. */
function justBefore(end: number): number {
  return end - Math.max(Math.abs(end), 1e-3) * 2 ** -50;
}

function usualChange(context: TrackContext): number {
  if (context.regime !== 'dense') return 0;
  const segments = segmentsOf(context);
  const last = segments.turns.length - 1;
  const count = Math.min(BESIDE, last);
  const changes = Array.from({ length: count }, (_, i) =>
    differenceOf(rateOf(segments, last - i), rateOf(segments, last - i - 1)),
  );
  return count > 0 ? USUAL * median(changes) : 0;
}

function asVector([x = 0, y = 0, z = 0]: Float64Array): [number, number, number] {
  return [x, y, z];
}
