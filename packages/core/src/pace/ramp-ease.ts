import { SlewcurveError } from '../errors.js';
import type { Ease } from './ease.js';

/** A steady middle between two ramps, as motor controllers move. Shares of the whole time. */
export interface Ramps {
  /** Time in which the speed rises, more than 0. */
  readonly rise: number;
  /** Time in which it falls. Default: as `rise`. Both together at most 1. */
  readonly fall?: number;
  /**
   * Time of each of a ramp's two rounded corners, as a share of the ramp: 0 (default) is the trapezoid, whose acceleration jumps; 0.5 the full
   * S-curve, which never holds an acceleration; between them the partial S-curve.
   */
  readonly corner?: number;
}

/**
 * Trapezoid and S-curve. The middle runs at V = 2/(2 − rise − fall); a ramp of length r peaks at V/(r(1 − corner)), and its jerk is that
 * over r·corner.
 *
 * @throws SlewcurveError `ease.bad-ramp`
 */
export function rampEase({ rise, fall = rise, corner = 0 }: Ramps): Ease {
  if (!(rise > 0) || !(fall > 0) || !(rise + fall <= 1 + 1e-12) || !(corner >= 0 && corner <= 0.5))
    throw new SlewcurveError(
      'ease.bad-ramp',
      `Ramps take shares of the time above 0, together at most 1, with corners of 0 to 0.5; got rise ${rise}, fall ${fall}, corner ${corner}.`,
    );
  const speed = 2 / (2 - rise - fall);
  const shortest = Math.min(rise, fall);
  const peakAcceleration = speed / (shortest * (1 - corner));
  const mirrored = <T>(u: number, early: (v: number, ramp: number) => T): T | undefined =>
    u < rise ? early(u, rise) : u > 1 - fall ? early(1 - u, fall) : undefined;
  return Object.freeze({
    name: corner === 0 ? 'trapezoid' : 's-curve',
    peakSpeed: speed,
    peakAcceleration,
    peakJerk: corner === 0 ? 0 : peakAcceleration / (shortest * corner),
    jumps: corner === 0 ? 'acceleration' : 'none',
    knots: Object.freeze(knotsOf(rise, fall, corner)),
    position(u) {
      const done = mirrored(u, (v, ramp) => speed * ramp * rampPosition(v / ramp, corner));
      if (done === undefined) return speed * (u - rise / 2);
      return u < rise ? done : 1 - done;
    },
    speed: (u) => mirrored(u, (v, ramp) => speed * rampSpeed(v / ramp, corner)) ?? speed,
    acceleration(u) {
      // A piece owns its start: at 1 − fall the falling ramp begins.
      const early = u < rise ? (speed / rise) * rampSlope(u / rise, corner) : 0;
      return u >= 1 - fall ? (-speed / fall) * rampSlope((1 - u) / fall, corner, true) : early;
    },
  } satisfies Ease);
}

function knotsOf(rise: number, fall: number, corner: number): number[] {
  const shares = corner === 0 ? [0, 1] : corner === 0.5 ? [0, 0.5, 1] : [0, corner, 1 - corner, 1];
  const knots = [...shares.map((share) => rise * share), ...shares.map((share) => 1 - fall * share)];
  knots.sort((a, b) => a - b);
  return knots.filter((knot, i) => i === 0 || knot - knots[i - 1] > 1e-12);
}

/** A ramp from speed 0 to 1 in a time of 1: constant jerk, constant acceleration, constant jerk. Point-symmetric about its middle. */
function rampSpeed(u: number, corner: number): number {
  if (u > 0.5) return 1 - rampSpeed(1 - u, corner);
  return (u < corner ? (u * u) / (2 * corner) : u - corner / 2) / (1 - corner);
}

function rampPosition(u: number, corner: number): number {
  if (u > 0.5) return u - 0.5 + rampPosition(1 - u, corner);
  return (
    (u < corner ? u ** 3 / (6 * corner) : (u * u) / 2 - (corner * u) / 2 + (corner * corner) / 6) /
    (1 - corner)
  );
}

/** `closed`: whether the ramp's end belongs to it. */
function rampSlope(u: number, corner: number, closed = false): number {
  if (corner === 0) return u < 1 || closed ? 1 : 0;
  return Math.max(0, Math.min(1, u / corner, (1 - u) / corner)) / (1 - corner);
}
