import type { RosterRow } from './roster-row.js';
import { rowColumns } from './roster-row.js';

/** Pixels as a canvas holds them: four bytes each, row by row. */
export interface InkSheet {
  readonly width: number;
  readonly height: number;
  readonly data: Uint8ClampedArray;
}

/** Ink for usual speeds: fast but usual stays pale. */
const PALE = 0.3;
/** Speeds this many times the habit are as black as ink gets. */
const BLACK_AT = 6;

/**
 * How dark a speed is, 0 to 1, against what is usual for its track: nothing at the noise floor, pale up to the habit (by its
 * square root, so that slow motion is seen), then darker by the logarithm.
 */
export function inkDensity(speed: number, habit: number, noiseFloor: number): number {
  if (!(speed > noiseFloor)) return 0;
  const usual = Math.max(habit, noiseFloor);
  if (!(usual > 0)) return 1;
  if (speed <= usual) return PALE * Math.sqrt(speed / usual);
  return Math.min(1, PALE + ((1 - PALE) * Math.log(speed / usual)) / Math.log(BLACK_AT));
}

/**
 * Writes one row's ink straight into the sheet: a column a pixel, the greatest speed within it, never the mean, so that a pop of
 * one frame among millions stands out. Column height follows density too, so that the row reads in grey and on paper.
 *
 * @param ink red, green, blue, 0 to 255
 */
export function inkRow(
  sheet: InkSheet,
  row: RosterRow,
  top: number,
  height: number,
  ink: readonly [number, number, number],
): void {
  const columns = rowColumns(row, new Float32Array(sheet.width));
  for (let x = 0; x < sheet.width; x++) {
    const density = inkDensity(columns[x], row.habit, row.noiseFloor);
    if (density === 0) continue;
    const tall = Math.max(1, Math.round(height * (0.35 + 0.65 * density)));
    const first = top + height - tall;
    const alpha = Math.round(255 * (0.22 + 0.78 * density));
    for (let y = Math.max(0, first); y < Math.min(sheet.height, top + height); y++) {
      const at = (y * sheet.width + x) * 4;
      sheet.data[at] = ink[0];
      sheet.data[at + 1] = ink[1];
      sheet.data[at + 2] = ink[2];
      sheet.data[at + 3] = alpha;
    }
  }
}
