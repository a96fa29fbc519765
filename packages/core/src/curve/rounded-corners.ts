import type { NumberStore } from '../number-store.js';
import { expMap } from '../quaternion/exp-map.js';
import { logMap } from '../quaternion/log-map.js';
import { multiply } from '../quaternion/multiply.js';
import { relative } from '../quaternion/relative.js';
import { keyOrientation } from '../track/key-orientation.js';
import type { RotationTrack } from '../track/rotation-track.js';
import { chartToRate, chartTwist } from './chart-rate.js';
import type { Curve } from './curve.js';
import { integrate } from './integrate.js';
import { durations, segmentedCurve } from './segmented-curve.js';

/** A key at which a path of great arcs changes its direction. */
export interface Corner {
  readonly key: number;
  /** How far the rounded path stays off that key, radians. */
  readonly off: number;
}

/** A path of great arcs with its corners rounded. */
export interface RoundedCurve extends Curve {
  /** Those that were rounded, in the order of keys. */
  readonly corners: readonly Corner[];
}

/** A change of direction below this, radians, is rounding. */
const STRAIGHT = 1e-9;

/** ∫₀^½ of the minimum-jerk step. */
const HALF_STEP = 5 / 64;

/**
 * The path of great arcs through the keys of a track with its corners rounded, never more than `within` radians off. Around key k, on arcs of length δ on
 * either side, q = q_k·Exp(p): both arcs are straight there, and p′ turns from the one direction to the other by the minimum-jerk step, so that the
 * direction and its bend never jump: |p| at the key is 5/32·|Δn|·δ. δ is at most half of either arc. Times stay; the speed may jump where it did.
 *
 * @param mayRound keys whose corner may be rounded; default all
 */
export function roundedCorners(
  track: RotationTrack,
  within: number,
  mayRound: (key: number) => boolean = () => true,
): RoundedCurve {
  const arcs = arcsOf(track);
  const bends = bendsOf(track, arcs, within).filter(({ key }) => mayRound(key));
  const { times, parts } = partsOf(track, arcs, bends);
  const curve = segmentedCurve({
    times,
    continuity: 0,
    breaks: parts.flatMap(({ kind }, i) => (kind === 'held' ? [i] : [])),
    key: (out, key) =>
      poseAt(out, key < parts.length ? parts[key] : parts[key - 1], key < parts.length ? 0 : 1),
    motion: motionOf(times, parts),
  });
  return { ...curve, corners: bends.map(({ key, off }) => ({ key, off })) };
}

/** From key to key: the direction of turn in own axes, how far, for how long. */
interface Arc {
  readonly direction: Float64Array;
  readonly angle: number;
  readonly seconds: number;
  readonly held: boolean;
}

interface RoundedKey extends Corner {
  readonly reach: number;
}

function arcsOf(track: RotationTrack): Arc[] {
  const { times, breaks } = track;
  const [a, b] = [new Float64Array(4), new Float64Array(4)];
  return Array.from({ length: Math.max(0, times.length - 1) }, (_, key) => {
    keyOrientation(a, track, key);
    keyOrientation(b, track, key + 1);
    const turn = logMap(new Float64Array(3), relative(b, a, b));
    const angle = Math.hypot(turn[0], turn[1], turn[2]);
    return {
      direction: turn.map((part) => (angle > 0 ? part / angle : 0)),
      angle,
      seconds: times[key + 1] - times[key],
      held: breaks.includes(key),
    };
  });
}

function bendsOf(track: RotationTrack, arcs: readonly Arc[], within: number): RoundedKey[] {
  const bends: RoundedKey[] = [];
  for (let key = 1; key + 1 < track.times.length; key++) {
    const [before, after] = [arcs[key - 1], arcs[key]];
    const moves = before.angle > 0 && after.angle > 0 && !before.held && !after.held;
    const change = Math.hypot(...before.direction.map((part, k) => part - after.direction[k]));
    if (!moves || change < STRAIGHT) continue;
    const share = 2 * HALF_STEP * change;
    const reach = Math.min(within / share, before.angle / 2, after.angle / 2);
    bends.push({ key, off: share * reach, reach });
  }
  return bends;
}

/** A stretch between two times: held, along a great arc, or half of a rounded corner. */
type Part =
  | { readonly kind: 'held'; readonly origin: Float64Array }
  | {
      readonly kind: 'arc';
      /** Pose of the key before, and the angles from it at both ends. */
      readonly origin: Float64Array;
      readonly direction: Float64Array;
      readonly from: number;
      readonly to: number;
    }
  | {
      readonly kind: 'corner';
      /** Pose of the key. */
      readonly origin: Float64Array;
      readonly before: Float64Array;
      readonly after: Float64Array;
      readonly reach: number;
      /** Whether it is the half after the key. */
      readonly late: boolean;
    };

function partsOf(
  track: RotationTrack,
  arcs: readonly Arc[],
  bends: readonly RoundedKey[],
): { readonly times: Float64Array; readonly parts: readonly Part[] } {
  const reaches = new Map(bends.map(({ key, reach }) => [key, reach]));
  const times: number[] = [track.times[0] ?? 0];
  const parts: Part[] = [];
  const add = (part: Part, end: number): void => {
    if (!(end > times[times.length - 1])) return;
    parts.push(part);
    times.push(end);
  };
  arcs.forEach(({ direction, angle, seconds, held }, key) => {
    const origin = keyOrientation(new Float64Array(4), track, key);
    const [start, end] = [track.times[key], track.times[key + 1]];
    if (held) {
      add({ kind: 'held', origin }, end);
      return;
    }
    const [from, upTo] = [reaches.get(key) ?? 0, reaches.get(key + 1) ?? 0];
    const slower = angle > 0 ? seconds / angle : 0;
    if (from > 0)
      add(
        {
          kind: 'corner',
          origin,
          before: arcs[key - 1].direction,
          after: direction,
          reach: from,
          late: true,
        },
        start + from * slower,
      );
    const arcEnd = upTo > 0 ? end - upTo * slower : end;
    add({ kind: 'arc', origin, direction, from, to: angle - upTo }, arcEnd);
    if (upTo > 0)
      add(
        {
          kind: 'corner',
          origin: keyOrientation(new Float64Array(4), track, key + 1),
          before: direction,
          after: arcs[key + 1].direction,
          reach: upTo,
          late: false,
        },
        end,
      );
  });
  return { times: Float64Array.from(times), parts };
}

const CHART = new Float64Array(3);
const VELOCITY = new Float64Array(3);
const BENDING = new Float64Array(3);
const TURN = new Float64Array(4);

/** Writes p, dp/du and d²p/du² into the chart's stores, u the fraction of the part. */
function chartAt(part: Exclude<Part, { kind: 'held' }>, u: number): void {
  if (part.kind === 'arc') {
    for (let k = 0; k < 3; k++) {
      CHART[k] = part.direction[k] * (part.from + u * (part.to - part.from));
      VELOCITY[k] = part.direction[k] * (part.to - part.from);
      BENDING[k] = 0;
    }
    return;
  }
  const { before, after, reach, late } = part;
  const x = (late ? 1 + u : u) / 2;
  const place = x ** 4 * (2.5 - 3 * x + x * x);
  const share = x ** 3 * (10 - 15 * x + 6 * x * x);
  const slope = 30 * (x * (1 - x)) ** 2;
  for (let k = 0; k < 3; k++) {
    const change = after[k] - before[k];
    CHART[k] = reach * (before[k] * (2 * x - 1) + 2 * change * place);
    VELOCITY[k] = reach * (before[k] + change * share);
    BENDING[k] = (reach * change * slope) / 2;
  }
}

function poseAt(out: NumberStore, part: Part, u: number): void {
  if (part.kind === 'held') {
    for (let k = 0; k < 4; k++) out[k] = part.origin[k];
    return;
  }
  chartAt(part, u);
  multiply(out, part.origin, expMap(TURN, CHART));
}

function motionOf(
  times: Float64Array,
  parts: readonly Part[],
): Parameters<typeof segmentedCurve>[0]['motion'] {
  const gaps = durations(times);
  const rate = (out: NumberStore, i: number, u: number): void => {
    const part = parts[i];
    out[0] = out[1] = out[2] = 0;
    if (part.kind === 'held') return;
    chartAt(part, u);
    chartToRate(out, CHART, VELOCITY);
    for (let k = 0; k < 3; k++) out[k] /= gaps[i];
  };
  const now = new Float64Array(3);
  const speed =
    (i: number) =>
    (u: number): number => {
      rate(now, i, u);
      return gaps[i] * Math.hypot(now[0], now[1], now[2]);
    };
  return {
    orientation: (out, i, u) => poseAt(out, parts[i], u),
    rate,
    acceleration(out, i, u) {
      const part = parts[i];
      out[0] = out[1] = out[2] = 0;
      if (part.kind === 'held') return;
      chartAt(part, u);
      chartTwist(now, CHART, VELOCITY);
      chartToRate(out, CHART, BENDING);
      for (let k = 0; k < 3; k++) out[k] = (out[k] + now[k]) / gaps[i] ** 2;
    },
    length(i, u0, u1) {
      const part = parts[i];
      return part.kind === 'arc' ? (part.to - part.from) * (u1 - u0) : integrate(speed(i), u0, u1);
    },
    // Along a corner the speed dips towards the key and is the arc's at its far end.
    peakAt: (i, u0, u1) => (speed(i)(u0) >= speed(i)(u1) ? u0 : u1),
  };
}
