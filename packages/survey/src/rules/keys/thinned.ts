import { angleFloor } from '@slewcurve/core';
import type { Limits, TrackContext } from '../../rule.js';
import { segmentsOf, type Segments } from '../../segments.js';

const DEGREES = 180 / Math.PI;
/** Keys that one straight turn may take the place of, at most: it keeps the work in proportion to the keys. */
const FARTHEST = 256;

/**
 * Keys that a track can do without under slerp: from each key that stays, the farthest one is sought, by doubling and halving, to which one straight turn
 * keeps every pose in between within `angle` degrees and every speed within `rate` deg/s. A greedy pass, so that fewer keys may do; no more are claimed.
 *
 * Between keys two slerps are at most sec(θ/4) as far apart as at the worse of their ends, θ the turn from key to key: geodesics on the sphere of unit
 * quaternions, half as long there, are widest apart in their middle.
 */
export function spareKeys(context: TrackContext, { angle = 0, rate = 0 }: Limits): number {
  const { track } = context;
  const segments = segmentsOf(context);
  const nearest = Math.max(angle, 2 * angleFloor(track.storage, track.interpolation) * DEGREES);
  const last = track.times.length - 1;
  const fits = (from: number, to: number): boolean =>
    to <= last && isStraight(segments, track.times, from, to, nearest, rate);
  let spare = 0;
  for (let key = 0; key < last;) {
    const next = farthest(key, fits);
    spare += next - key - 1;
    key = next;
  }
  return spare;
}

/** The farthest key that a straight turn from this one was found to reach; the next one where there is none. */
function farthest(key: number, fits: (from: number, to: number) => boolean): number {
  let reach = 1;
  while (2 * reach <= FARTHEST && fits(key, key + 2 * reach)) reach *= 2;
  for (let more = reach / 2; more >= 1; more /= 2)
    if (reach + more <= FARTHEST && fits(key, key + reach + more)) reach += more;
  return key + reach;
}

function isStraight(
  { orientations, turns, speeds }: Segments,
  times: Float64Array,
  from: number,
  to: number,
  angle: number,
  rate: number,
): boolean {
  const [a, b] = [4 * from, 4 * to];
  let [along, apart] = [0, 0];
  for (let i = 0; i < 4; i++) {
    const [x = 0, y = 0] = [orientations[a + i], orientations[b + i]];
    along += x * y;
    apart += (x - y) * (x - y);
  }
  // Over half a turn on the way: one slerp would go round the other side.
  if (!(along > 0)) return false;
  const half = 2 * Math.asin(Math.min(1, Math.sqrt(apart) / 2));
  const [start = 0, end = 0] = [times[from], times[to]];
  const speed = (2 * half * DEGREES) / (end - start);
  for (let key = from; key < to; key++) {
    if (!(Math.abs((speeds[key] ?? NaN) - speed) <= rate)) return false;
    if (key === from) continue;
    const share = ((times[key] ?? NaN) - start) / (end - start);
    const step = Math.max(turns[key - 1] ?? NaN, turns[key] ?? NaN) / DEGREES;
    if (!(awayFrom(orientations, [from, to, key], half, share) <= angle * Math.cos(step / 4))) return false;
  }
  return true;
}

/** Degrees from a key's pose to where a slerp between two others, `2 * half` radians apart, is at a share of its time. */
function awayFrom(
  orientations: Float64Array,
  [from, to, key]: readonly [number, number, number],
  half: number,
  share: number,
): number {
  const sine = Math.sin(half);
  const isShort = sine < 1e-9;
  const u = isShort ? 1 - share : Math.sin((1 - share) * half) / sine;
  const v = isShort ? share : Math.sin(share * half) / sine;
  let off = 0;
  for (let i = 0; i < 4; i++) {
    const line = u * (orientations[4 * from + i] ?? 0) + v * (orientations[4 * to + i] ?? 0);
    off += (line - (orientations[4 * key + i] ?? 0)) ** 2;
  }
  // The chord between two unit quaternions is twice the sine of a quarter of the angle that they turn apart.
  return 4 * Math.asin(Math.min(1, Math.sqrt(off) / 2)) * DEGREES;
}
