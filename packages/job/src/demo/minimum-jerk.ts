/**
 * Share of a move that is done at share `x` of its time: 0 before, 1 after, with rate and acceleration 0 at both ends. Peak rate
 * 15/8, peak acceleration 10/√3. The polynomial of least squared jerk (Flash and Hogan 1985, "The coordination of arm movements").
 */
function minimumJerk(x: number): number {
  const t = Math.min(1, Math.max(0, x));
  return t * t * t * (10 + t * (6 * t - 15));
}

/** Degrees turned at time `t` by a move of `degrees` between `start` and `end` seconds. */
export function moveAt(t: number, start: number, end: number, degrees: number): number {
  return degrees * minimumJerk((t - start) / (end - start));
}
