import { type RotationTrack, SlewcurveError } from '@slewcurve/core';
import { pairTracks } from '../changed-tracks.js';
import type { PatchPlan } from '../patch-plan.js';
import type { Source } from '../source.js';
import { type CellChange, cellRanges, planOfRanges } from '../text/cell-change.js';
import { textLines, type TextLine } from '../text/text-lines.js';
import { encodeUtf8 } from '../utf8.js';
import { type AxisMap, axisMap, restatedHead, restatedSequence } from './restated-axes.js';
import { findWords } from './row-words.js';

/** A track as it was read, with the columns that hold its angles. */
export interface ReadJoint {
  readonly track: RotationTrack;
  readonly columns: readonly number[];
  /** Most decimal places that any of its numbers was written to. */
  readonly decimals: number;
}

const DEGREES = 180 / Math.PI;

/**
 * Plans how to write changed tracks into a file. See `AnimationFile.plan`; also throws `bvh.fixed-grid`. All joints on another even grid together are another
 * `Frame Time`; changed axes are new OFFSETs, CHANNELS and signs, every digit kept.
 */
export async function writePlan(
  source: Source,
  file: string,
  motionAt: number,
  joints: readonly ReadJoint[],
  changed: readonly RotationTrack[],
  axes: readonly string[] = [],
): Promise<PatchPlan> {
  const rows = new Map<number, CellChange[]>();
  const map = axes.length > 0 ? axisMap(axes) : undefined;
  const pairs = pairTracks(file, joints, changed);
  const frameTime = newFrameTime(pairs, joints.length);
  for (const { read, track } of pairs) {
    checkHolds(file, read, track, { map, anyTimes: frameTime !== undefined });
    for (let row = 0; row < track.times.length; row++)
      for (const [part, column] of read.columns.entries())
        addChange(rows, row, column, read, track.values[3 * row + part], read.track.values[3 * row + part]);
  }
  const head = map && (await restatedHead(source, file, motionAt, map));
  const order = { rows, negated: head?.negated ?? [], frameTime };
  if (rows.size === 0 && !head && frameTime === undefined) return planOfRanges([], source.size);
  const ranges = [...(head?.ranges ?? []), ...(await rangesOf(source, file, motionAt, order))];
  return planOfRanges(ranges, source.size);
}

/** Seconds from row to row where all joints went to one other grid that is even from 0 on; undefined where their times stay or are no such grid. */
function newFrameTime(
  pairs: readonly { readonly read: ReadJoint; readonly track: RotationTrack }[],
  count: number,
): number | undefined {
  const [first] = pairs;
  if (!first || pairs.length !== count || first.track.times.length < 2) return undefined;
  const { times } = first.track;
  const frame = times[1] ?? NaN;
  const isEven = times.every((time, row) => Math.abs(time - row * frame) <= 1e-9 * Math.max(1, time));
  const isShared = pairs.every(
    ({ read, track }) =>
      track.times.length === read.track.times.length && track.times.every((time, row) => time === times[row]),
  );
  return isEven && isShared && !sameTimes(first.read.track, first.track) ? frame : undefined;
}

function sameTimes(a: RotationTrack, b: RotationTrack): boolean {
  return (
    a.times === b.times ||
    (a.times.length === b.times.length && a.times.every((time, key) => time === b.times[key]))
  );
}

/** What is to be written after MOTION. */
interface MotionOrder {
  readonly rows: ReadonlyMap<number, readonly CellChange[]>;
  /** Columns whose numbers change their sign in every row. */
  readonly negated: readonly number[];
  readonly frameTime: number | undefined;
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
  const negated = value === -was;
  changes.push({ cell: column, value: value * DEGREES, negated, decimals, what: `${track.id}, row ${row}` });
}

async function rangesOf(
  source: Source,
  file: string,
  motionAt: number,
  { rows, negated, frameTime }: MotionOrder,
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
      if (!inRows) {
        if (frameTime !== undefined) ranges.push(...frameTimeRange(line, frameTime));
        continue;
      }
      const changes = [...(rows.get(++row) ?? []), ...negated.map((cell) => negation(cell, row))];
      if (changes.length === 0) continue;
      const words = findWords(found, line.text);
      const cells = Array.from({ length: words }, (_, i) => ({
        start: found[2 * i] ?? 0,
        end: found[2 * i + 1] ?? 0,
      }));
      ranges.push(...cellRanges(line, cells, changes));
    }
  return ranges;
}

function frameTimeRange({ text, at }: TextLine, frameTime: number): PatchPlan['ranges'] {
  const [, before, old] = /^(\s*frame\s*time\s*:\s*)(\S+)/i.exec(text) ?? [];
  if (before === undefined || old === undefined) return [];
  return [
    { at: at + before.length, length: old.length, bytes: encodeUtf8(String(frameTime)), what: 'Frame Time' },
  ];
}

function negation(cell: number, row: number): CellChange {
  return { cell, value: NaN, negated: true, decimals: 0, what: `position, row ${row}` };
}

function checkHolds(
  file: string,
  read: ReadJoint,
  track: RotationTrack,
  { map, anyTimes }: { readonly map: AxisMap | undefined; readonly anyTimes: boolean },
): void {
  const place = { file, clip: track.clip, track: track.id };
  const sequence = map ? restatedSequence(read.track.sequence, map) : read.track.sequence;
  if (track.interpolation !== 'EULER' || track.sequence !== sequence)
    throw new SlewcurveError(
      'plan.cannot-write',
      `${track.id} is ${track.interpolation} ${track.sequence ?? ''}; the file holds angles in the order ${sequence ?? ''}. Convert it to those first.`,
      place,
    );
  if (!anyTimes && !sameTimes(track, read.track))
    throw new SlewcurveError(
      'bvh.fixed-grid',
      `${track.id} would have ${track.times.length} keys at times of its own; a BVH file has one row for all joints every Frame Time, ${read.track.times.length} rows here. Re-grid the track to them, re-time all joints to one even grid, or write another format.`,
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
