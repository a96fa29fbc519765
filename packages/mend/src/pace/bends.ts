import { type RotationTrack, keyOrientation, logMap, relative } from '@slewcurve/core';
import { DEGREES } from '../edit-result.js';
import type { Bend } from '../verb.js';

/** A change of the rate below this many deg/s, or below this share of the slower side, is no bend to warn of. */
const LEAST_JUMP = 10;
const LEAST_SHARE = 0.2;

/** Places told, worst first. */
const MOST_TOLD = 20;

/** Where the chord rates before and after a key point different ways, though the speed be level: min(v₋, v₊)·|Δn|. */
export function bendsOf(track: RotationTrack): Bend[] {
  const { times } = track;
  const bends: Bend[] = [];
  const [a, b] = [new Float64Array(4), new Float64Array(4)];
  let before: Float64Array | undefined;
  for (let key = 0; key + 1 < times.length; key++) {
    keyOrientation(a, track, key);
    keyOrientation(b, track, key + 1);
    const rate = logMap(new Float64Array(3), relative(b, a, b)).map(
      (turn) => turn / (times[key + 1] - times[key]),
    );
    const jump = before ? turnOfRate(before, rate) * DEGREES : 0;
    const slower = Math.min(Math.hypot(...(before ?? rate)), Math.hypot(...rate)) * DEGREES;
    if (jump > LEAST_JUMP && jump > LEAST_SHARE * slower) bends.push({ time: times[key], jump });
    before = rate;
  }
  // oxlint-disable-next-line unicorn/no-array-sort -- our own list: sorted where it is, no copy
  return bends.sort((p, q) => q.jump - p.jump).slice(0, MOST_TOLD);
}

function turnOfRate(a: Float64Array, b: Float64Array): number {
  const [sizeA, sizeB] = [Math.hypot(...a), Math.hypot(...b)];
  if (!(sizeA > 0 && sizeB > 0)) return 0;
  return Math.min(sizeA, sizeB) * Math.hypot(...a.map((part, i) => part / sizeA - b[i] / sizeB));
}
