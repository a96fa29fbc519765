import type { ReadonlyNumberStore } from '../number-store.js';

/** The part of a camera's rate, rad/s in its own axes, that sweeps the picture: all but the roll about the view (own z). */
export function sweepRate(ownRate: ReadonlyNumberStore): number {
  return Math.hypot(ownRate[0], ownRate[1]);
}

/**
 * Picture widths a second by which the middle of a rectilinear picture moves where the camera sweeps at `rate` rad/s:
 * ω/(2 tan(view/2)), `horizontalView` the full horizontal view angle, radians, above 0 and below π. At the picture's edge it moves
 * 1 + tan²(view/2) times as fast. One width in 7 s is the film maker's limit at 24 frames a second (rule of thumb).
 */
export function panWidthsPerSecond(rate: number, horizontalView: number): number {
  return rate / (2 * Math.tan(horizontalView / 2));
}

/** Pixels a frame by which the middle of a picture `width` pixels wide moves at `frameRate` frames a second; see `panWidthsPerSecond`. */
export function panPixelsPerFrame(
  rate: number,
  horizontalView: number,
  width: number,
  frameRate: number,
): number {
  return (panWidthsPerSecond(rate, horizontalView) * width) / frameRate;
}
