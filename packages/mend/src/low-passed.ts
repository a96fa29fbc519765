import {
  type Curve,
  type NumberStore,
  type RotationTrack,
  expMap,
  logMap,
  multiply,
  relative,
} from '@slewcurve/core';

/** Places that are averaged on either side. */
const PLACES = 12;

/**
 * A curve averaged around every time: q·exp(Σ wⱼ log(q⁻¹qⱼ)), w a raised cosine that reaches `half` seconds to each side (filter masks in the tangent space:
 * Lee and Shin, IEEE TVCG 8 (2002), abstract seen). Its frequency response is ½ at 1/(2·half) and zero at 1/half, and steady turns stay as they are. Near
 * the ends and near cuts it reaches only as far as there is motion on both sides, so both stay exact.
 */
export function lowPassed(
  curve: Curve,
  track: RotationTrack,
  half: number,
): Pick<Curve, 'orientation' | 'rate' | 'knots'> {
  const walls = wallsOf(track);
  const orientation = <T extends NumberStore>(out: T, t: number): T => {
    const reach = Math.min(half, reachOf(walls, t));
    const q = curve.orientation(new Float64Array(4), t);
    const sum = new Float64Array(3);
    const beside = new Float64Array(4);
    const turn = new Float64Array(3);
    let weights = 1;
    if (!(reach > 0)) return curve.orientation(out, t);
    for (let place = 1; place < PLACES; place++) {
      const weight = 0.5 * (1 + Math.cos((Math.PI * place) / PLACES));
      for (const side of [-1, 1]) {
        curve.orientation(beside, t + (side * reach * place) / PLACES);
        logMap(turn, relative(beside, q, beside));
        for (let i = 0; i < 3; i++) sum[i] += weight * turn[i];
        weights += weight;
      }
    }
    return multiply(
      out,
      q,
      expMap(
        beside,
        sum.map((part) => part / weights),
      ),
    );
  };
  const step = half / 64;
  return {
    knots: curve.knots,
    orientation,
    rate(out, t, frame) {
      const [before, after] = [t - step, t + step].map((at) => orientation(new Float64Array(4), at));
      const turn = relative(new Float64Array(4), before, after);
      logMap(turn, turn);
      // The turn between two places keeps its axis in both; at the middle, to second order, that is the rate's.
      if (frame === 'parent')
        multiply(turn, multiply(turn, before, [turn[0], turn[1], turn[2], 0]), inverse(before));
      for (let i = 0; i < 3; i++) out[i] = turn[i] / (2 * step);
      return out;
    },
  };
}

function inverse([x, y, z, w]: Float64Array): readonly number[] {
  return [-x, -y, -z, w];
}

/** Times that nothing may be averaged across: both ends and both keys of every cut. */
function wallsOf({ times, breaks }: RotationTrack): number[] {
  return [
    times[0],
    ...breaks.flatMap((key) => [times[key], times[key + 1] ?? times[key]]),
    times[times.length - 1],
  ];
}

function reachOf(walls: readonly number[], t: number): number {
  return Math.min(...walls.map((wall) => Math.abs(t - wall)));
}
