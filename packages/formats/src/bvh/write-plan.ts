import { type RotationTrack, SlewcurveError } from '@slewcurve/core';
import { pairTracks } from '../changed-tracks.js';
import type { PatchPlan } from '../patch-plan.js';
import type { Source } from '../source.js';
import { type CellChange, cellRanges, planOfRanges } from '../text/cell-change.js';
import { textLines } from '../text/text-lines.js';
import { findWords } from './row-words.js';

/** A track as it was read, with the columns that hold its angles. */
export interface ReadJoint {
  readonly track: RotationTrack;
  readonly columns: readonly number[];
  /** Most decimal places that any of its numbers was written to. */
  readonly decimals: number;
}

const DEGREES = 180 / Math.PI;

/** Plans how to write changed tracks into a file. See `AnimationFile.plan`; also throws `bvh.fixed-grid`. */
export async function writePlan(
  source: Source,
  file: string,
  motionAt: number,
  joints: readonly ReadJoint[],
  changed: readonly RotationTrack[],
): Promise<PatchPlan> {
  const rows = new Map<number, CellChange[]>();
  for (const { read, track } of pairTracks(file, joints, changed)) {
    checkHolds(file, read, track);
    for (let row = 0; row < track.times.length; row++)
      for (const [part, column] of read.columns.entries())
        addChange(rows, row, column, read, track.values[3 * row + part], read.track.values[3 * row + part]);
  }
  if (rows.size === 0) return planOfRanges([], source.size);
  return planOfRanges(await rangesOf(source, file, motionAt, rows), source.size);
}

function addChange(
  rows: Map<number, CellChange[]>,
  row: number,
  column: number,
  { track, decimals }: ReadJoint,
  value = NaN,
  was = NaN,
): void {
  if (Object.is(value, was)) return;
  const changes = rows.get(row) ?? [];
  rows.set(row, changes);
  changes.push({ cell: column, value: value * DEGREES, decimals, what: `${track.id}, row ${row}` });
}

async function rangesOf(
  source: Source,
  file: string,
  motionAt: number,
  rows: ReadonlyMap<number, readonly CellChange[]>,
): Promise<PatchPlan['ranges']> {
  const ranges: PatchPlan['ranges'][number][] = [];
  const found: number[] = [];
  // Frames: and Frame Time: are no rows.
  let row = -1;
  let inRows = false;
  for await (const lines of textLines(source, file))
    for (const line of lines) {
      if (line.number <= motionAt || line.text.trim() === '') continue;
      inRows ||= !line.text.includes(':');
      if (!inRows) continue;
      const changes = rows.get(++row);
      if (!changes) continue;
      const words = findWords(found, line.text);
      const cells = Array.from({ length: words }, (_, i) => ({
        start: found[2 * i] ?? 0,
        end: found[2 * i + 1] ?? 0,
      }));
      ranges.push(...cellRanges(line, cells, changes));
    }
  return ranges;
}

function checkHolds(file: string, read: ReadJoint, track: RotationTrack): void {
  const place = { file, clip: track.clip, track: track.id };
  if (track.interpolation !== 'EULER' || track.sequence !== read.track.sequence)
    throw new SlewcurveError(
      'plan.cannot-write',
      `${track.id} is ${track.interpolation} ${track.sequence ?? ''}; the file holds angles in the order ${read.track.sequence ?? ''}. Convert it to those first.`,
      place,
    );
  if (
    track.times !== read.track.times &&
    (track.times.length !== read.track.times.length ||
      track.times.some((time, key) => time !== read.track.times[key]))
  )
    throw new SlewcurveError(
      'bvh.fixed-grid',
      `${track.id} would have ${track.times.length} keys at times of its own; a BVH file has one row for all joints every Frame Time, ${read.track.times.length} rows here. Re-grid the track to them, or write another format.`,
      place,
    );
  for (let i = 0; i < track.values.length; i++) {
    if (Object.is(track.values[i], read.track.values[i])) continue;
    const place3 = { ...place, key: Math.floor(i / 3) };
    if (!Number.isFinite(track.values[i]))
      throw new SlewcurveError(
        'plan.cannot-write',
        `${track.id}, key ${place3.key}: a number that is not finite can't be written.`,
        place3,
      );
    if (i % 3 >= read.columns.length && track.values[i] !== 0)
      throw new SlewcurveError(
        'bvh.fixed-channels',
        `${track.id}, key ${place3.key} would turn about ${track.sequence?.[i % 3] ?? ''}; the joint has ${read.columns.length} rotation channels.`,
        place3,
      );
  }
}
