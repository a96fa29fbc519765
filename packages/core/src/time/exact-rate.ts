/** Rates that are written short: 24, 30 and 60 frames in 1.001 s. */
const SHORT: readonly (readonly [written: number, nominal: number])[] = [
  [23.976, 24],
  [29.97, 30],
  [59.94, 60],
  [119.88, 120],
];

/**
 * Frames per second in full: 29.97 is 30000/1001 (SMPTE ST 170, from memory), so that frame numbers stay right for hours. Any other rate comes back as it
 * is.
 */
export function exactRate(fps: number): number {
  const found = SHORT.find(([written]) => Math.abs(fps / written - 1) < 5e-5);
  return found ? (found[1] * 1000) / 1001 : fps;
}
