import type { SpeedColumns } from './motion.js';
import type { SpeedScale } from './scale.js';

/** Where a trace is drawn, CSS pixels: columns from `left`, one `width` wide; the baseline at `base`, `height` above it the top. */
export interface TracePlace {
  readonly left: number;
  readonly width: number;
  readonly base: number;
  readonly height: number;
}

/** Extremes closer than this are one point, px: a third of a pixel is not seen. */
const ONE_POINT = 0.34;

/**
 * An SVG path through the greatest and least of every column, nearer end first, so that the line stays one line where a column
 * holds one speed and no spike is lost where it holds a thousand. Columns that are not numbers break it.
 */
export function tracePath(columns: SpeedColumns, scale: SpeedScale, place: TracePlace): string {
  let path = '';
  let previous = Number.NaN;
  let pen = false;
  const put = (x: number, y: number): void => {
    path += `${pen ? 'L' : 'M'}${round(x)} ${round(y)}`;
    pen = true;
    previous = y;
  };
  for (let i = 0; i < columns.greatest.length; i++) {
    if (!Number.isFinite(columns.greatest[i])) {
      pen = false;
      continue;
    }
    const x = place.left + (i + 0.5) * place.width;
    const top = place.base - scale.share(columns.greatest[i]) * place.height;
    const bottom = place.base - scale.share(columns.least[i]) * place.height;
    if (bottom - top < ONE_POINT) put(x, (top + bottom) / 2);
    else if (Math.abs(previous - top) < Math.abs(previous - bottom)) {
      put(x, top);
      put(x, bottom);
    } else {
      put(x, bottom);
      put(x, top);
    }
  }
  return path;
}

/** Where a trace leaves the paper at the top: the middle of the stretch and its greatest speed. */
export interface Overshoot {
  readonly x: number;
  readonly speed: number;
}

/** Stretches above the scale's top, at least `apart` px from one another (the faster one counts), left to right. */
export function overshoots(
  columns: SpeedColumns,
  scale: SpeedScale,
  place: TracePlace,
  apart: number,
): Overshoot[] {
  const found: Overshoot[] = [];
  for (let i = 0; i < columns.greatest.length; i++) {
    const speed = columns.greatest[i];
    if (!(speed > scale.high)) continue;
    const x = place.left + (i + 0.5) * place.width;
    const last = found[found.length - 1];
    if (!last || x - last.x >= apart) found.push({ x, speed });
    else if (speed > last.speed) found[found.length - 1] = { x, speed };
  }
  return found;
}

/** The part of columns that lies inside the motion: before its start and after its end there is no trace. */
export function withinMotion(
  columns: SpeedColumns,
  row: { readonly from: number; readonly to: number },
  motion: { readonly start: number; readonly end: number },
): SpeedColumns {
  const greatest = columns.greatest.slice();
  const step = (row.to - row.from) / greatest.length;
  for (let i = 0; i < greatest.length; i++) {
    const outside = row.from + (i + 1) * step <= motion.start || row.from + i * step > motion.end;
    if (outside) greatest[i] = Number.NaN;
  }
  return { greatest, least: columns.least };
}

function round(value: number): string {
  return String(Math.round(value * 10) / 10);
}
