import { type RotationTrack, SlewcurveError } from '@slewcurve/core';
import { pairTracks } from '../changed-tracks.js';
import type { PatchPlan } from '../patch-plan.js';
import type { Source } from '../source.js';
import { type CellChange, cellRanges, planOfRanges } from '../text/cell-change.js';
import { textLines } from '../text/text-lines.js';
import type { ReadBody } from './body-track.js';
import { cellsOf, splitRows } from './split-rows.js';
import { isComment, type TableHead } from './table-head.js';

/** Plans how to write changed tracks into a table. See `AnimationFile.plan`; also throws `delimited.fixed-rows`. */
export async function writePlan(
  source: Source,
  file: string,
  head: TableHead,
  bodies: readonly ReadBody[],
  changed: readonly RotationTrack[],
): Promise<PatchPlan> {
  const rows = new Map<number, CellChange[]>();
  for (const { read, track } of pairTracks(file, bodies, changed)) {
    checkHolds(file, read, track);
    for (let key = 0; key < track.times.length; key++) addChanges(rows, file, read, track, key);
  }
  if (rows.size === 0) return planOfRanges([], source.size);
  return planOfRanges(await rangesOf(source, file, head, rows), source.size);
}

function addChanges(
  rows: Map<number, CellChange[]>,
  file: string,
  read: ReadBody,
  track: RotationTrack,
  key: number,
): void {
  const { perKey } = read.form;
  const numbers = track.values.subarray(perKey * key, perKey * (key + 1));
  const old = read.track.values.subarray(perKey * key, perKey * (key + 1));
  if (numbers.every((value, i) => Object.is(value, old[i]))) return;
  const row = read.rows[key] ?? 0;
  const place = { file, clip: track.clip, track: track.id, key };
  if (!numbers.every(Number.isFinite))
    throw new SlewcurveError(
      'plan.cannot-write',
      `${track.id}, key ${key}: a number that is not finite can't be written.`,
      place,
    );
  const { form } = read.body;
  const alone = form.kind === 'angles' && numbers.some((x, i) => !form.parts.includes(i) && x !== 0);
  if (alone)
    throw new SlewcurveError(
      'delimited.fixed-columns',
      `${track.id}, key ${key} would turn about an axis that has no column.`,
      place,
    );
  const changes = rows.get(row) ?? [];
  rows.set(row, changes);
  const was = read.text(row);
  const unchanged = old.every(Number.isFinite) ? read.form.write([...old], was) : [];
  read.form.write([...numbers], was).forEach((value, i) => {
    if (Object.is(value, unchanged[i])) return;
    const cell = read.body.columns[i] ?? 0;
    changes.push({ cell, value, decimals: read.decimals[i] ?? 0, what: `${track.id}, row ${row}` });
  });
}

async function rangesOf(
  source: Source,
  file: string,
  head: TableHead,
  rows: ReadonlyMap<number, readonly CellChange[]>,
): Promise<PatchPlan['ranges']> {
  const ranges: PatchPlan['ranges'][number][] = [];
  let number = -1;
  for await (const lines of textLines(source, file))
    for (const line of lines) {
      if (line.number < head.firstRow.number || isComment(line) || line.text.trim() === '') continue;
      const changes = rows.get(++number);
      if (!changes) continue;
      for (const row of splitRows(file, [line], head.separator))
        ranges.push(...cellRanges(line, cellsOf(row, head.separator), changes));
    }
  return ranges;
}

function checkHolds(file: string, read: ReadBody, track: RotationTrack): void {
  const place = { file, clip: track.clip, track: track.id };
  const { interpolation, sequence, times } = read.track;
  if (track.interpolation !== interpolation || track.sequence !== sequence)
    throw new SlewcurveError(
      'plan.cannot-write',
      `${track.id} is ${track.interpolation} ${track.sequence ?? ''}; the table holds ${interpolation} ${sequence ?? ''}. Convert it to that first.`,
      place,
    );
  if (
    track.times !== times &&
    (track.times.length !== times.length || track.times.some((time, key) => !Object.is(time, times[key])))
  )
    throw new SlewcurveError(
      'delimited.fixed-rows',
      `${track.id} would have ${track.times.length} keys at times of its own; the table has ${times.length} rows for it, whose times are not rewritten. Write another file.`,
      place,
    );
}
