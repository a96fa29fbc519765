import { SlewcurveError } from '@slewcurve/core';
import { encodeBase64 } from '../base64.js';
import type { JsonEditor } from '../json-text.js';
import { listMember, textMember } from '../json-value.js';
import type { PatchRange } from '../patch-plan.js';
import { type Run } from './accessor-layout.js';
import type { OpenBuffer } from './buffers.js';
import type { Container } from './container.js';

/** Bytes that stand in a buffer and are to be others. */
export interface BufferWrite {
  readonly buffer: number;
  readonly offset: number;
  readonly bytes: Uint8Array;
  readonly what: string;
}

/** Whether bytes of this buffer can be overwritten where they stand. */
export function isWritable(
  container: Container,
  index: number,
  buffer: OpenBuffer,
  editor: JsonEditor,
): boolean {
  if (buffer.kind !== 'data') return buffer.kind === 'bin';
  // Base64 can be changed in groups of four letters where the JSON spells it without escapes and pads it.
  const uri = textMember(listMember(container.json, 'buffers')[index], 'uri') ?? '';
  const span = editor.find(`/buffers/${index}/uri`);
  const { dataUri } = buffer;
  return (
    dataUri !== undefined &&
    dataUri.plain &&
    (uri.length - dataUri.head.length) % 4 === 0 &&
    span !== undefined &&
    span.end - span.start === uri.length + 2
  );
}

/**
 * The writes that turn a run's old bytes into new ones, one for each stretch of neighbouring keys that differ. A key is
 * `perKey` elements. Numbers that did not change keep their very bytes.
 */
export function changedKeys(
  run: Run,
  perKey: number,
  old: Uint8Array,
  stored: Uint8Array,
  what: (first: number, last: number) => string,
): BufferWrite[] {
  const writes: BufferWrite[] = [];
  const keys = run.count / perKey;
  const packed = run.stride === run.size;
  const differs = (key: number): boolean => {
    for (let element = key * perKey; element < (key + 1) * perKey; element++)
      for (let i = 0; i < run.size; i++)
        if (old[element * run.stride + i] !== stored[element * run.size + i]) return true;
    return false;
  };
  for (let first = 0; first < keys; first++) {
    if (!differs(first)) continue;
    let last = first;
    if (packed) while (last + 1 < keys && differs(last + 1)) last++;
    const elements = packed ? 1 : perKey;
    const length = packed ? (last + 1 - first) * perKey * run.size : run.size;
    for (let i = 0; i < elements; i++) {
      const element = first * perKey + i;
      writes.push({
        buffer: run.buffer,
        offset: run.offset + element * run.stride,
        bytes: stored.slice(element * run.size, element * run.size + length),
        what: what(first, last),
      });
    }
    first = last;
  }
  return writes;
}

/** Writes into the BIN chunk as ranges of the file. */
export function binRanges(container: Container, writes: readonly BufferWrite[]): PatchRange[] {
  const at = container.bin?.at ?? 0;
  return writes.map(({ offset, bytes, what }) => ({
    at: at + offset,
    length: bytes.byteLength,
    bytes,
    what,
  }));
}

/** Writes into a data URI, or behind its end, as splices of its base64: whole groups of four letters. */
export function spliceDataUri(editor: JsonEditor, buffer: OpenBuffer, writes: readonly BufferWrite[]): void {
  const { dataUri } = buffer;
  const span = editor.find(`/buffers/${writes[0]?.buffer ?? 0}/uri`);
  if (!dataUri || !span) throw new SlewcurveError('plan.cannot-write', 'The buffer is no data URI.');
  const ends = writes.map(({ offset, bytes }) => offset + bytes.byteLength);
  const data = new Uint8Array(ends.reduce((most, end) => Math.max(most, end), dataUri.bytes.byteLength));
  data.set(dataUri.bytes);
  const groups = new Map<number, string>();
  for (const { offset, bytes, what } of writes) {
    data.set(bytes, offset);
    for (let group = Math.floor(offset / 3); group * 3 < offset + bytes.byteLength; group++)
      groups.set(group, what);
  }
  const payload = span.start + 1 + dataUri.head.length;
  // The closing quote follows the last letter.
  const end = span.end - 1;
  for (const { first, last, what } of stretchesOf(groups)) {
    const text = encodeBase64(data.subarray(first * 3, Math.min((last + 1) * 3, data.byteLength)));
    const at = Math.min(payload + first * 4, end);
    const length = Math.min(payload + (last + 1) * 4, end) - at;
    editor.overwrite(
      at,
      length,
      Uint8Array.from(text, (letter) => letter.charCodeAt(0)),
      what,
    );
  }
}

/** Neighbouring groups of one meaning, together, ascending. */
function stretchesOf(groups: ReadonlyMap<number, string>): { first: number; last: number; what: string }[] {
  const ascending = [...groups];
  // oxlint-disable-next-line unicorn/no-array-sort -- our own list: sorted where it is, no copy
  ascending.sort(([a], [b]) => a - b);
  const stretches: { first: number; last: number; what: string }[] = [];
  for (const [group, what] of ascending) {
    const open = stretches.at(-1);
    if (open && open.last + 1 === group && open.what === what) open.last = group;
    else stretches.push({ first: group, last: group, what });
  }
  return stretches;
}
