import type { SpeedColumns } from './motion.js';

/** Stretches, in columns (`to` not counted in), where the speed never passes the noise floor, `least` columns long or longer. */
export function holdStretches(
  columns: SpeedColumns,
  noiseFloor: number,
  least: number,
): { readonly from: number; readonly to: number }[] {
  const stretches = [];
  let from = -1;
  for (let i = 0; i <= columns.greatest.length; i++) {
    // NaN (no motion there) and the end both close a stretch.
    const still = i < columns.greatest.length && columns.greatest[i] <= noiseFloor;
    if (still && from < 0) from = i;
    if (still || from < 0) continue;
    if (i - from >= least) stretches.push({ from, to: i });
    from = -1;
  }
  return stretches;
}
