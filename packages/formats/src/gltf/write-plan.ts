import { type RotationTrack, SlewcurveError } from '@slewcurve/core';
import { type JsonEditor, type JsonSplice, jsonEditor } from '../json-text.js';
import type { PatchPlan, PatchRange } from '../patch-plan.js';
import type { Follower } from '../animation-file.js';
import { accessorReaders } from './accessor-readers.js';
import type { Buffers, OpenBuffer } from './buffers.js';
import { accessorsOnClaimedBytes, countViewUsers } from './claimed-bytes.js';
import type { Container } from './container.js';
import { followerChanges } from './follower-changes.js';
import { type BufferWrite, binRanges, isWritable, spliceDataUri } from './in-place.js';
import { checkLists, hostOf, newData } from './new-data.js';
import { placeColumns } from './place-columns.js';
import { countSamplerUsers, rewireSamplers } from './rewire-samplers.js';
import { samplerPointer } from './rotation-channel.js';
import { readRuns } from './run-reader.js';
import { type ColumnChange, type ReadTrack, type TrackChange, trackChanges } from './track-change.js';

/** Plans how to write changed tracks into a file. See `AnimationFile.plan`. */
export async function writePlan(
  container: Container,
  buffers: Buffers,
  tracks: readonly ReadTrack[],
  changed: readonly RotationTrack[],
  followers: readonly Follower[] = [],
): Promise<PatchPlan> {
  const changes = [
    ...trackChanges(container.file, tracks, changed),
    ...(await followerChanges(container, buffers, tracks, followers)),
  ];
  if (changes.length === 0) return { ranges: [], size: container.source.size };
  checkLists(container);
  const editor = jsonEditor(container.jsonBytes);
  const samplerUsers = countSamplerUsers(container);
  const columns = changes
    .flatMap(({ input, output }) => [input, output])
    .filter((column) => column !== undefined);
  const open = await openBuffers(columns, buffers);
  const canWrite = new Set([...open.keys()].filter((index) => writable(container, index, open, editor)));
  const data = newData(container, hostOf(container, open, canWrite));
  const writes: BufferWrite[] = [];
  const places = placeColumns(
    {
      container,
      editor,
      data,
      writes,
      readers: readersButLone(container, samplerUsers, changes),
      claimed: accessorsOnClaimedBytes(container),
      writable: canWrite,
      viewUsers: countViewUsers(container),
      bytesOf: await readRuns(
        columns.flatMap(({ layout }) => (layout.run ? [layout.run] : [])),
        buffers,
        container.file,
      ),
    },
    columns,
  );
  rewireSamplers(samplerUsers, editor, changes, places);
  const added = data.finish(editor);
  const ranges: PatchRange[] = [];
  for (const [index, buffer] of open) {
    const own = [...writes, ...(added ? [added] : [])].filter((write) => write.buffer === index);
    if (buffer.kind === 'data' && own.length > 0) spliceDataUri(editor, buffer, own);
  }
  const inBin = container.bin ? writes.filter(({ buffer }) => open.get(buffer)?.kind === 'bin') : [];
  ranges.push(...binRanges(container, inBin));
  const tail = added && open.get(added.buffer)?.kind !== 'data' ? added.bytes : undefined;
  ranges.push(...jsonAndTail(container, editor.splices(), tail));
  // oxlint-disable-next-line unicorn/no-array-sort -- our own list: sorted where it is, no copy
  ranges.sort((a, b) => a.at - b.at || a.length - b.length);
  return Object.freeze({
    ranges: Object.freeze(ranges),
    size: container.source.size + growth(ranges),
  });
}

async function openBuffers(
  columns: readonly ColumnChange[],
  buffers: Buffers,
): Promise<Map<number, OpenBuffer>> {
  const open = new Map<number, OpenBuffer>();
  for (const { layout } of columns) {
    if (!layout.run || open.has(layout.run.buffer)) continue;
    const buffer = await buffers.open(layout.run.buffer);
    if (buffer) open.set(layout.run.buffer, buffer);
  }
  return open;
}

function writable(
  container: Container,
  index: number,
  open: ReadonlyMap<number, OpenBuffer>,
  editor: JsonEditor,
): boolean {
  const buffer = open.get(index);
  return buffer !== undefined && isWritable(container, index, buffer, editor);
}

/**
 * Who reads each accessor. A sampler that channels beyond the changed ones read counts as a second reader, since those
 * channels need it as it is.
 */
function readersButLone(
  container: Container,
  samplerUsers: ReadonlyMap<string, number>,
  changes: readonly TrackChange[],
): ReadonlyMap<number, readonly string[]> {
  const readers = new Map<number, string[]>();
  for (const [accessor, pointers] of accessorReaders(container.json)) readers.set(accessor, [...pointers]);
  const counts = new Map<string, { change: TrackChange; inputs: number; outputs: number }>();
  for (const change of changes) {
    const { clipIndex, sampler } = change.read.channel;
    const key = samplerPointer(clipIndex, sampler);
    const count = counts.get(key) ?? { change, inputs: 0, outputs: 0 };
    counts.set(key, count);
    if (change.input) count.inputs++;
    if (change.output) count.outputs++;
  }
  for (const [sampler, { change, inputs, outputs }] of counts) {
    const { input, output } = change.read.channel;
    const users = samplerUsers.get(sampler) ?? 0;
    if (users > inputs) readers.get(input)?.push('another channel');
    if (users > outputs) readers.get(output)?.push('another channel');
  }
  return readers;
}

/** Splices of the JSON and the tail of the BIN chunk as ranges of the file, with the length fields that they change. */
function jsonAndTail(
  container: Container,
  splices: readonly JsonSplice[],
  tail: Uint8Array | undefined,
): PatchRange[] {
  const { jsonSpan, bin, declaredLength } = container;
  const ranges: PatchRange[] = splices.map((splice) => ({ ...splice, at: jsonSpan.at + splice.at }));
  if (declaredLength === undefined) return ranges;
  const jsonLength = jsonSpan.length + growth(splices);
  const padding = (4 - (jsonLength % 4)) % 4;
  if (padding > 0)
    ranges.push(
      rangeOf(jsonSpan.at + jsonSpan.length, 0, new Uint8Array(padding).fill(0x20), 'JSON padding'),
    );
  if (jsonLength + padding !== jsonSpan.length)
    ranges.push(rangeOf(12, 4, word(jsonLength + padding), 'length of the JSON chunk'));
  if (bin && tail) {
    ranges.push(rangeOf(bin.at - 8, 4, word(bin.length + tail.byteLength), 'length of the BIN chunk'));
    ranges.push(rangeOf(bin.at + bin.length, 0, tail, 'appended data'));
  }
  const grown = growth(ranges);
  if (declaredLength + grown > 0xffff_ffff)
    throw new SlewcurveError(
      'plan.cannot-write',
      `${container.file} would take ${declaredLength + grown} bytes; a GLB holds at most 4294967295.`,
      { file: container.file },
    );
  if (grown !== 0) ranges.push(rangeOf(8, 4, word(declaredLength + grown), 'length of the file'));
  return ranges;
}

function growth(ranges: readonly { readonly length: number; readonly bytes: Uint8Array }[]): number {
  return ranges.reduce((sum, { length, bytes }) => sum + bytes.byteLength - length, 0);
}

function rangeOf(at: number, length: number, bytes: Uint8Array, what: string): PatchRange {
  return { at, length, bytes, what };
}

function word(value: number): Uint8Array {
  const bytes = new Uint8Array(4);
  new DataView(bytes.buffer).setUint32(0, value, true);
  return bytes;
}
