/** How much angle is turned by when, over one stretch: radians, seconds, both from 0 at its start. */
export interface AngleProfile {
  readonly seconds: number;
  /** Ascending, 0 first and `seconds` last: smooth in between. */
  readonly knots: readonly number[];
  readonly continuity: 0 | 1 | 2;
  /** Never falls; at `seconds` the whole angle. */
  angleAt(t: number): number;
  /** First time by which an angle is turned. */
  timeOf(angle: number): number;
  /** rad/s; at a knot where it jumps, as in the later piece. */
  speedAt(t: number): number;
  /** rad/s². */
  accelerationAt(t: number): number;
}
