import type { ReadonlyNumberStore } from '../number-store.js';
import { slerpTurns } from '../quaternion/slerp-turns.js';
import { playableTrack } from '../track/playable-track.js';
import type { RotationTrack } from '../track/rotation-track.js';
import type { Curve } from './curve.js';
import { durations, segmentedCurve } from './segmented-curve.js';
import { segmentTurns } from './slerp-curve.js';
import { copyKey, unitKeys } from './unit-keys.js';

/**
 * Great arcs between the keys with whole turns added, each at constant angular rate (see `slerpTurns`): `wholeTurns` is one number
 * for all segments, or one for each segment between playable keys. They count along the short way's axis; −1 is the long way round.
 * Between equal keys, which have no axis, nothing turns. Signs do not matter. Keys that cannot be played are left out
 * (`playableTrack`).
 */
export function turnsCurve(track: RotationTrack, wholeTurns: number | ReadonlyNumberStore): Curve {
  const played = playableTrack(track);
  const { times, breaks } = played;
  const keys = unitKeys(played);
  const gaps = durations(times);
  const short = segmentTurns(keys);
  const from = new Float64Array(4);
  const to = new Float64Array(4);
  const count = (i: number): number => (typeof wholeTurns === 'number' ? wholeTurns : wholeTurns[i]);
  const shortAngle = (i: number): number => Math.hypot(short[3 * i], short[3 * i + 1], short[3 * i + 2]);

  return segmentedCurve({
    times,
    breaks,
    continuity: 0,
    key: (out, key) => copyKey(out, keys, key),
    motion: {
      orientation(out, i, u) {
        copyKey(from, keys, i);
        copyKey(to, keys, i + 1);
        slerpTurns(out, from, to, u, count(i));
      },
      rate(out, i) {
        const angle = shortAngle(i);
        const speed = (angle + 2 * Math.PI * count(i)) / gaps[i];
        // The axis first: whole turns over an angle next to nothing would leave float64.
        for (let k = 0; k < 3; k++) out[k] = angle > 0 ? (short[3 * i + k] / angle) * speed : 0;
      },
      acceleration(out) {
        out[0] = 0;
        out[1] = 0;
        out[2] = 0;
      },
      length(i, u0, u1) {
        const angle = shortAngle(i);
        return angle > 0 ? (u1 - u0) * Math.abs(angle + 2 * Math.PI * count(i)) : 0;
      },
      peakAt: (_, u0) => u0,
    },
  });
}
