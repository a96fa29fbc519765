import type { RowBands } from '../chart/chart-row.js';
import type { FoldRow } from '../chart/fold.js';
import type { SpeedScale } from '../chart/scale.js';
import type { Place } from './hand.js';

/** A piece of paper with a trace on it: a row of the chart, or the close-up. CSS pixels from its left and top. */
export interface Paper {
  readonly row: FoldRow;
  readonly width: number;
  readonly bands: RowBands;
  readonly scale: SpeedScale;
}

export function xOf({ row, width }: Paper, time: number): number {
  return ((time - row.from) / (row.to - row.from)) * width;
}

/** Where a speed stands; above the paper's top it stands at the top. */
export function yOf({ bands, scale }: Paper, speed: number): number {
  return bands.base - scale.share(speed) * (bands.base - bands.top);
}

/** What stands at a point. Above the top of an even scale speeds go on, so that a hand can leave the paper. */
export function placeAt({ row, width, bands, scale }: Paper, x: number, y: number): Place {
  return {
    time: row.from + (x / width) * (row.to - row.from),
    speed: scale.speed((bands.base - y) / (bands.base - bands.top)),
  };
}

/** What one pixel stands for in the middle of the paper. */
export function pixelOf(paper: Paper): Place {
  const middle = (paper.bands.base + paper.bands.top) / 2;
  const [a, b] = [placeAt(paper, 0, middle), placeAt(paper, 1, middle - 1)];
  return { time: b.time - a.time, speed: b.speed - a.speed };
}
