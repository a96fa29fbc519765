import type { NumberStore } from '../number-store.js';

/** Axes that a rate or acceleration is written in: the turning thing's own, or its parent's. */
export type Frame = 'own' | 'parent';

/** The largest angular speed within a stretch of time. */
export interface Peak {
  /** rad/s, never negative. */
  rate: number;
  /** Seconds. */
  time: number;
}

/** The acceleration inside one segment; sizes, the same in every frame. */
export interface SegmentAcceleration {
  /** rad/s². */
  peak: number;
  /** Seconds. */
  time: number;
  /** Mean over the segment of its square, rad²/s⁴. */
  meanSquare: number;
}

/**
 * What plays a track: orientation, angular rate and angular acceleration at any time, exact and in closed form. Interpolations,
 * playbacks and re-timings are all curves. Outside `[start, end]` a curve holds its end orientation at rate 0, as glTF 2.0
 * ("Animations") says.
 */
export interface Curve {
  /** Seconds. */
  readonly start: number;
  readonly end: number;
  /** Derivatives that exist everywhere: -1 where the orientation itself jumps (STEP, a break), 0 continuous, 1, 2. */
  readonly continuity: -1 | 0 | 1 | 2;
  /** Times, ascending, first `start` and last `end`, between which the curve is smooth. Seconds. */
  readonly knots: Float64Array;
  /** Unit quaternion `[x, y, z, w]`, own to parent, at `t` seconds. Exact at keys. */
  orientation<T extends NumberStore>(out: T, t: number): T;
  /** Angular rate, rad/s. At a key where it jumps: that of the later segment. */
  rate<T extends NumberStore>(out: T, t: number, frame: Frame): T;
  /** Angular acceleration inside the segment, rad/s². At a key where it jumps: that of the later segment. */
  acceleration<T extends NumberStore>(out: T, t: number, frame: Frame): T;
  /** Angle turned between two times, radians, never negative. A jump adds nothing. */
  length(t0: number, t1: number): number;
  /** Greatest angular speed in `[t0, t1]`. */
  peak(t0: number, t1: number): Peak;
  /** The acceleration between knot `segment` and the next, which is not a held one, where the curve has a closed form for it. */
  readonly segmentAcceleration?: (segment: number) => SegmentAcceleration;
}
