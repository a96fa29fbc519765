import { FRAME_RATES, medianGap } from '@slewcurve/core';
import { everyRole, type Limits, type Place, type Remedy, type Rule, type TrackContext } from '../../rule.js';
import { saySeconds } from '../../say-number.js';
import { triedStep } from '../../tried-step.js';

/** Fewer keys say nothing of a grid. */
const LEAST_KEYS = 10;
/** Most decimals that count as rounding. */
const MOST_DECIMALS = 4;
/** How far a frame rate may lie from the mean gap, as a share: 0.033 s is 1.01 % off 30 a second. */
const NEAR = 0.0102;

/** Times that were rounded to a few decimals, so that frames come early and late, or the clip runs fast. */
export const timeGrid: Rule = Object.freeze({
  id: 'file.time-grid',
  family: 'file',
  level: 'warning',
  unit: 's',
  alsoCalled: ['frame rate', 'frame time', 'rounded times', 'time drift', 'saw-tooth', 'fps mismatch'],
  summary: 'Key times were rounded off the frames that they belong to.',
  limits: everyRole({ warning: 0.01, error: 0.1, drift: 0.5 }),
  reads: 'track',
  untouched: 'every orientation, byte for byte',
  find(context: TrackContext, limits: Limits): readonly Place[] {
    const { times } = context.track;
    if (times.length < LEAST_KEYS || context.regime !== 'dense') return [];
    const decimals = decimalsOf(times);
    const frame = meanFrame(times, medianGap(context.track));
    const rate = FRAME_RATES.filter((one) => Math.abs(1 / one - frame) <= NEAR * frame).toSorted(
      (a, b) => Math.abs(1 / a - frame) - Math.abs(1 / b - frame),
    )[0];
    if (decimals === undefined || rate === undefined) return [];
    return offFrames(times, frame, rate, limits) ?? drifted(times, frame, decimals, limits) ?? [];
  },
  remedy: ({ track }: TrackContext, { facts }: Place): Remedy | undefined =>
    triedStep(track, { verb: 're-time to grid', fps: facts?.['rate'] ?? 0 }),
  message({ keys: [key = 0], value, limit, facts }: Place): string {
    const rate = facts?.['rate'] ?? 0;
    if (facts?.['drift'] === 1)
      return `the gap of ${saySeconds(facts['frame'] ?? 0)} between keys is a rounded frame of ${rate} a second: by key ${key} the clip is ${saySeconds(value)} off (limit ${saySeconds(limit)})`;
    return `key times are rounded: the step into key ${key} is ${saySeconds(value)} longer or shorter than a frame (limit ${saySeconds(limit)}), which speeds show as a saw-tooth`;
  },
  page: {
    what: 'Times written with two or three decimals, or a frame time rounded before it is counted up.',
    trace:
      'A saw-tooth with a period of a few keys; from a rounded frame time nothing at all, but the clip drifts off its sound.',
    standard:
      'glTF 2.0 stores times as numbers of seconds and knows no frame rate; BVH has one `Frame Time`.',
    programs: 'All believe the times.',
    people: 'A fine tremble of speed; sound that comes late.',
    test: 'In a dense track of ten keys or more whose times are all whole multiples of a decimal of at most four places, the mean gap within 1 % of a usual frame: a gap that differs from whole frames by more than 1 % of a frame is a warning, by more than 10 % an error. Else, where one usual frame rounded to those decimals is the gap, a total drift of over half a frame is a warning.',
    source:
      'Common practice, no source. Three decimals at 60 frames a second read −2.0 to +4.2 % of the speed, two −17 to +67 %; a frame time of 0.0333 drifts by 180 ms in 3 minutes (measured).',
    spares: 'Uneven times that no rounding explains: hand-set keys, true stamps of a capture.',
    remedy:
      '`re-time to grid` sets each time to the frame that it belongs to, counted gap by gap; values stay to the bit, and what else moves the node goes along.',
  },
});

/** Fewest decimals, up to four, that all times are written with; undefined where they have more. */
function decimalsOf(times: Float64Array): number | undefined {
  for (let decimals = 1; decimals <= MOST_DECIMALS; decimals++) {
    const units = 10 ** decimals;
    const isWhole = (time: number): boolean => {
      const slack = 1e-6 + Math.abs(time) * units * 2 ** -22;
      return Math.abs(time * units - Math.round(time * units)) <= slack;
    };
    if (times.every(isWhole)) return decimals;
  }
  return undefined;
}

/** Mean gap, gaps of more than one and three quarters of the usual one left out: frames may be missing. */
function meanFrame(times: Float64Array, usual: number): number {
  let sum = 0;
  let count = 0;
  for (let key = 1; key < times.length; key++) {
    const gap = (times[key] ?? 0) - (times[key - 1] ?? 0);
    if (gap > 1.75 * usual) continue;
    sum += gap;
    count++;
  }
  return sum / count;
}

function offFrames(
  times: Float64Array,
  frame: number,
  rate: number,
  limits: Limits,
): readonly Place[] | undefined {
  const { warning = 0, error = 0 } = limits;
  let value = 0;
  let worst = 0;
  for (let key = 1; key < times.length; key++) {
    const gap = (times[key] ?? 0) - (times[key - 1] ?? 0);
    // float32 rounds long times by itself.
    const rounding = Math.abs(times[key] ?? 0) * 2 ** -23;
    const off = Math.abs(gap - frame * Math.max(1, Math.round(gap / frame))) - rounding;
    if (off > value) [value, worst] = [off, key];
  }
  if (!(value > warning * frame)) return undefined;
  const span = [times[worst - 1] ?? 0, times[worst] ?? 0] as const;
  const level = value > error * frame ? 'error' : 'warning';
  return [{ keys: [worst], time: span[1], span, value, limit: warning * frame, level, facts: { rate } }];
}

function drifted(
  times: Float64Array,
  frame: number,
  decimals: number,
  { drift = 0 }: Limits,
): readonly Place[] | undefined {
  const unit = 10 ** -decimals;
  // Half a unit, and a hair for the mean of float32 times.
  const rate = FRAME_RATES.filter((one) => Math.abs(1 / one - frame) <= 0.5001 * unit).toSorted(
    (a, b) => Math.abs(1 / a - frame) - Math.abs(1 / b - frame),
  )[0];
  if (rate === undefined) return undefined;
  const last = times.length - 1;
  const value = Math.abs(frame - 1 / rate) * last;
  const limit = drift / rate;
  if (!(value > limit)) return undefined;
  const [start, end] = [times[0] ?? 0, times[last] ?? 0];
  const facts = { drift: 1, rate, frame };
  return [{ keys: [last], time: end, span: [start, end], value, limit, level: 'warning', facts }];
}
