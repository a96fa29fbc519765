import { type RotationTrack, playAs } from '@slewcurve/core';
import { DEGREES } from '../edit-result.js';
import type { Bend } from '../verb.js';

/** A change of the rate below this many deg/s, or below this share of the slower side, is no bend to warn of. */
const LEAST_JUMP = 10;
const LEAST_SHARE = 0.2;

/** Share of a gap by which the side before a key is looked at. */
const JUST = 1e-6;

/** Places told, worst first. */
const MOST_TOLD = 20;

/** Where the rates just before and just after a key, as written, point different ways, though the speed be level: min(v₋, v₊)·|Δn|. */
export function bendsOf(track: RotationTrack): Bend[] {
  const { times } = track;
  const curve = playAs(track, 'as-written');
  const bends: Bend[] = [];
  const [before, after] = [new Float64Array(3), new Float64Array(3)];
  for (let key = 1; key + 1 < times.length; key++) {
    curve.rate(before, times[key] - JUST * (times[key] - times[key - 1]), 'own');
    curve.rate(after, times[key], 'own');
    const jump = turnOfRate(before, after) * DEGREES;
    const slower = Math.min(sizeOf(before), sizeOf(after)) * DEGREES;
    if (jump > LEAST_JUMP && jump > LEAST_SHARE * slower) bends.push({ time: times[key], jump });
  }
  // oxlint-disable-next-line unicorn/no-array-sort -- our own list: sorted where it is, no copy
  return bends.sort((p, q) => q.jump - p.jump).slice(0, MOST_TOLD);
}

function turnOfRate(a: Float64Array, b: Float64Array): number {
  const [sizeA, sizeB] = [sizeOf(a), sizeOf(b)];
  if (!(sizeA > 0 && sizeB > 0)) return 0;
  let squared = 0;
  for (let k = 0; k < 3; k++) squared += (a[k] / sizeA - b[k] / sizeB) ** 2;
  return Math.min(sizeA, sizeB) * Math.sqrt(squared);
}

function sizeOf(rate: Float64Array): number {
  return Math.hypot(rate[0], rate[1], rate[2]);
}
