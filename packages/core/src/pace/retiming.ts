/**
 * When, at a new time, the old time is: a map between two clocks that never runs back. Seconds. Before its start and after its end both run
 * alike.
 */
export interface Retiming {
  /** New seconds. */
  readonly start: number;
  readonly end: number;
  /** New times, ascending, first `start` and last `end`, between which it is smooth. */
  readonly knots: Float64Array;
  /** What never jumps: 0 the time alone, 1 the speed too, 2 the acceleration too. */
  readonly continuity: 0 | 1 | 2;
  /** The old time that plays at a new time. */
  oldTime(t: number): number;
  /** The first new time at which an old time plays. */
  newTime(old: number): number;
  /** How fast it runs at a new time; at a knot where that jumps, as in the later piece. One object, written again by every call. */
  paceAt(t: number): PaceAt;
}

/** How fast a retiming runs at one time. */
export interface PaceAt {
  /** `time`: by the old clock, old seconds a second and a second². `angle`: by the angle that is turned, rad/s and rad/s². */
  by: 'time' | 'angle';
  speed: number;
  acceleration: number;
}
