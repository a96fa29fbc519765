/**
 * How a turn of 1 is spread over a time of 1: position from 0 to 1, with its exact speed and acceleration. A turn of θ in T
 * seconds peaks at `peakSpeed`·θ/T, `peakAcceleration`·θ/T² and `peakJerk`·θ/T³.
 */
export interface Ease {
  readonly name: string;
  /** Greatest speed. Infinite where a curve stands upright. */
  readonly peakSpeed: number;
  /** Greatest acceleration inside the pieces between `knots`, either sign; a jump of the speed comes on top. */
  readonly peakAcceleration: number;
  /** Greatest jerk inside the pieces, either sign; a jump of the acceleration comes on top. */
  readonly peakJerk: number;
  /** The lowest of these that jumps anywhere, ends at rest included; `none`: not even the acceleration does. */
  readonly jumps: 'speed' | 'acceleration' | 'none';
  /** Fractions of the time between which it is smooth; the first 0, the last 1. */
  readonly knots: readonly number[];
  /** Share of the turn done at the share `u` of the time, 0 to 1. */
  position(u: number): number;
  /** At a knot where it jumps: that of the later piece. */
  speed(u: number): number;
  /** At a knot where it jumps: that of the later piece. */
  acceleration(u: number): number;
}
