import { poleDistance } from '@slewcurve/core';
import type { Place, TrackContext } from '../../rule.js';
import { segmentsOf } from '../../segments.js';

const DEGREES = 180 / Math.PI;

/** What is wrong with a step of angle channels that are joined as numbers. One step, one fault. */
export type AngleFault = 'wrap' | 'flip' | 'gimbal' | 'long-way';

/** A step between two keys of angles. Degrees. */
export interface AngleStep {
  readonly fault: AngleFault;
  /** Later key. */
  readonly key: number;
  /** Largest step of a channel, and all three as one length. */
  readonly channel: number;
  readonly channels: number;
  /** Turned on the way, as played, and the shortest turn. */
  readonly travelled: number;
  readonly direct: number;
}

/** From the pole, degrees, and times the true turn: where a step of the channels is the pole's doing. */
const POLE = 5;
const POLE_RATIO = 5;
/** Degrees by which the way travelled must exceed the shortest for it to be another way. */
const OTHER_WAY = 5;
/** Degrees within which both outer channels of the other triple lie around half a turn. */
const HALF_TURN = 90;

const known = new WeakMap<TrackContext, readonly AngleStep[]>();

/** Faulty steps of an EULER track that a chosen playback joins as numbers, by ascending key; none of any other track. */
function angleFaults(context: TrackContext): readonly AngleStep[] {
  const before = known.get(context);
  if (before !== undefined) return before;
  const steps = context.track.interpolation === 'EULER' ? measured(context) : [];
  known.set(context, steps);
  return steps;
}

/** The places of one fault; `place` adds what the rule says of a step. */
export function placesOf(
  context: TrackContext,
  fault: AngleFault,
  place: (step: AngleStep) => Pick<Place, 'value' | 'limit' | 'level'>,
): readonly Place[] {
  const { times } = context.track;
  return angleFaults(context)
    .filter((step) => step.fault === fault)
    .map((step) => ({
      keys: [step.key],
      time: times[step.key] ?? 0,
      span: [times[step.key - 1] ?? 0, times[step.key] ?? 0],
      playback: 'as-written',
      facts: { travelled: step.travelled, direct: step.direct },
      ...place(step),
    }));
}

function measured(context: TrackContext): AngleStep[] {
  const { track } = context;
  const played = context.played.find(({ playback }) => /^(as-written|euler-linear)$/.test(playback.id));
  if (played === undefined || context.declared.spins.length > 0) return [];
  const { turns } = segmentsOf(context);
  const found: AngleStep[] = [];
  for (let key = 1; key < track.times.length; key++) {
    const direct = turns[key - 1] ?? Number.NaN;
    const steps = [0, 1, 2].map(
      (i) => ((track.values[3 * key + i] ?? 0) - (track.values[3 * key - 3 + i] ?? 0)) * DEGREES,
    );
    // No way through the angles is longer than all steps together, so that most keys need no more than this.
    const most = steps.reduce((sum, step) => sum + Math.abs(step), 0);
    if (!(most > Math.min(direct + OTHER_WAY, POLE_RATIO * direct + 1e-6))) continue;
    const [from, to] = [track.times[key - 1] ?? 0, track.times[key] ?? 0];
    const step = {
      key,
      channel: Math.max(...steps.map(Math.abs)),
      channels: Math.hypot(...steps),
      travelled: played.curve.length(from, to) * DEGREES,
      direct,
    };
    const fault = faultOf(step, steps, atPole(context, key));
    if (fault !== undefined) found.push({ ...step, fault });
  }
  return found;
}

function faultOf(
  { channel, channels, travelled, direct }: Omit<AngleStep, 'fault' | 'key'>,
  [first = 0, , third = 0]: readonly number[],
  isAtPole: boolean,
): AngleFault | undefined {
  if (isHalf(first) && isHalf(third) && direct < 0.1 * channels) return 'flip';
  if (channel > 180 && direct < 0.5 * channel) return 'wrap';
  if (isAtPole && channels > 1 && channels > POLE_RATIO * direct) return 'gimbal';
  return travelled > direct + OTHER_WAY ? 'long-way' : undefined;
}

function isHalf(step: number): boolean {
  return Math.abs(Math.abs(step) - 180) < HALF_TURN;
}

function atPole({ track }: TrackContext, key: number): boolean {
  const { values, sequence = 'XYZ' } = track;
  return [key - 1, key].some(
    (one) => poleDistance(values.subarray(3 * one, 3 * one + 3), sequence) * DEGREES < POLE,
  );
}
