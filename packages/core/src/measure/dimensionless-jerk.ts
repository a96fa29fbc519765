import type { ReadonlyNumberStore } from '../number-store.js';

/**
 * Dimensionless jerk of a speed profile: −(T³/v_p²)∫v̈²dt, v_p its peak, T its time, `rate` its samples a second. Not more than 0;
 * nearer to 0 is smoother; neither size nor duration matters. Second differences, and T = samples over rate, as the authors' code
 * has it. What lies outside the profile counts for nothing: a profile that begins or ends with a jerk scores too well. 0 where
 * nothing moves.
 *
 * N. Hogan and D. Sternad 2009; S. Balasubramanian et al., J. NeuroEng. Rehabil. 12:112, 2015 (authors' code seen).
 */
export function dimensionlessJerk(speeds: ReadonlyNumberStore, rate: number): number {
  let peak = 0;
  let squares = 0;
  for (let n = 0; n < speeds.length; n++) {
    peak = Math.max(peak, Math.abs(speeds[n]));
    if (n >= 2) squares += ((speeds[n] - 2 * speeds[n - 1] + speeds[n - 2]) * rate * rate) ** 2;
  }
  const duration = speeds.length / rate;
  return peak > 0 ? (-(duration ** 3) / peak ** 2) * (squares / rate) : 0;
}

/** −ln of the size of the dimensionless jerk: larger is smoother. Infinity where there is no jerk at all. */
export function logDimensionlessJerk(speeds: ReadonlyNumberStore, rate: number): number {
  return -Math.log(Math.abs(dimensionlessJerk(speeds, rate)));
}
