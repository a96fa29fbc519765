import { type RotationTrack, regime } from '@slewcurve/core';
import { alignedKeys, turnBetween } from './key-turns.js';
import { polynomialWeights } from './polynomial-weights.js';
import { isJoined } from './stored-key.js';
import { tangentRate } from './tangent-rate.js';

/** Keys whose parabola says the rate at an end. */
const NODES = 3;

/** Own-axes rates, rad/s, with which a loop's motion leaves its first key and reaches its last one. */
export interface EndRates {
  readonly start: Float64Array;
  readonly end: Float64Array;
}

/**
 * The rates at both ends of a closed loop, to be compared as they are, since both poses are one. Under CUBICSPLINE those of the tangents that are played; on dense
 * LINEAR keys the slopes of the parabolas through three keys; undefined for sparse LINEAR keys, which have no rate but their segments'.
 */
export function endRates(track: RotationTrack): EndRates | undefined {
  const last = track.times.length - 1;
  if (track.interpolation === 'CUBICSPLINE')
    return { start: tangentRate(track, 0, 'out'), end: tangentRate(track, last, 'in') };
  if (regime(track) === 'sparse') return undefined;
  const nodes = Array.from({ length: NODES }, (_, i) => i);
  if (last < NODES || !nodes.slice(1).every((i) => isJoined(track, i - 1) && isJoined(track, last - i)))
    return undefined;
  return {
    start: slopeAt(track, 0, nodes),
    end: slopeAt(
      track,
      last,
      nodes.map((i) => last - i),
    ),
  };
}

function slopeAt(track: RotationTrack, key: number, nodes: readonly number[]): Float64Array {
  const { slope } = polynomialWeights(
    nodes.map((node) => track.times[node]),
    track.times[key],
  );
  const keys = alignedKeys(track);
  const rate = new Float64Array(3);
  const turn = new Float64Array(3);
  nodes.forEach((node, i) => {
    turnBetween(turn, keys, key, node);
    for (let axis = 0; axis < 3; axis++) rate[axis] += slope[i] * turn[axis];
  });
  return rate;
}
