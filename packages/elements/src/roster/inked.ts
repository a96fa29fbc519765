import { trackInk, type TrackInk } from './ink.js';

/** A track's speeds in equal bins of time from `start` to `end`. Seconds, deg/s. */
export interface BinnedSpeeds {
  readonly start: number;
  readonly end: number;
  /** Greatest speed in each bin. */
  readonly columns: Float32Array;
  readonly noiseFloor: number;
}

/** What is told of a track, with its ink instead of its speeds. */
export type Inked<Row extends BinnedSpeeds> = Omit<Row, 'columns'> & { readonly ink: TrackInk };

/** Works out the ink; needs no page, so that a worker can do it. */
export function inked<Row extends BinnedSpeeds>(row: Row): Inked<Row> {
  const { columns, ...rest } = row;
  return { ...rest, ink: trackInk(columns, (row.end - row.start) / columns.length, row.noiseFloor) };
}
