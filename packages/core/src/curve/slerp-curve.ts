import { logMap } from '../quaternion/log-map.js';
import { relative } from '../quaternion/relative.js';
import { slerp } from '../quaternion/slerp.js';
import { playableTrack } from '../track/playable-track.js';
import type { RotationTrack } from '../track/rotation-track.js';
import type { Curve } from './curve.js';
import { durations, segmentedCurve, still } from './segmented-curve.js';
import { copyKey, unitKeys } from './unit-keys.js';

/**
 * Great arcs between the keys, the short way, each at constant angular rate: what glTF 2.0 calls LINEAR of a rotation. The
 * interpolation that the track states is not looked at. Keys that cannot be played are left out (`playableTrack`).
 *
 * Rate φ/h with φ = Log(q₀⁻¹q₁), the same in own axes at every time of the segment; acceleration inside is zero.
 */
export function slerpCurve(track: RotationTrack): Curve {
  const played = playableTrack(track);
  const { times, breaks } = played;
  const keys = unitKeys(played);
  const gaps = durations(times);
  const from = new Float64Array(4);
  const to = new Float64Array(4);
  let turns: Float64Array | undefined;

  /** Rotation vector of every segment, worked out when the first is asked for. */
  const turnVectors = (): Float64Array => (turns ??= segmentTurns(keys));

  return segmentedCurve({
    times,
    breaks,
    continuity: 0,
    key: (out, key) => copyKey(out, keys, key),
    motion: {
      orientation(out, i, u) {
        copyKey(from, keys, i);
        copyKey(to, keys, i + 1);
        slerp(out, from, to, u);
      },
      rate(out, i) {
        const phi = turnVectors();
        for (let axis = 0; axis < 3; axis++) out[axis] = phi[3 * i + axis] / gaps[i];
      },
      acceleration: still,
      length(i, u0, u1) {
        const phi = turnVectors();
        return (u1 - u0) * Math.sqrt(phi[3 * i] ** 2 + phi[3 * i + 1] ** 2 + phi[3 * i + 2] ** 2);
      },
      peakAt: (_, u0) => u0,
    },
  });
}

/** φ_i = Log(q_i⁻¹ q_{i+1}), three numbers a segment, the short way. */
export function segmentTurns(keys: Float64Array): Float64Array {
  const count = Math.max(0, keys.length / 4 - 1);
  const turns = new Float64Array(3 * count);
  const a = new Float64Array(4);
  const b = new Float64Array(4);
  for (let i = 0; i < count; i++) {
    copyKey(a, keys, i);
    copyKey(b, keys, i + 1);
    logMap(b, relative(b, a, b));
    turns.set(b.subarray(0, 3), 3 * i);
  }
  return turns;
}
