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

/** Writes into a data URI as splices of its base64: whole groups of four letters. */
export function spliceDataUri(editor: JsonEditor, buffer: OpenBuffer, writes: readonly BufferWrite[]): void {
  const { dataUri } = buffer;
  const index = writes[0]?.buffer ?? 0;
  const span = editor.find(`/buffers/${index}/uri`);
  if (!dataUri || !span)
    throw new SlewcurveError('plan.cannot-write', `/buffers/${index}/uri is no data URI.`);
  const data = dataUri.bytes.slice();
  const groups = new Map<number, string>();
  for (const { offset, bytes, what } of writes) {
    data.set(bytes, offset);
    for (let group = Math.floor(offset / 3); group * 3 < offset + bytes.byteLength; group++)
      groups.set(group, what);
  }
  const payload = span.start + 1 + dataUri.head.length;
  const ascending = [...groups.keys()];
  // oxlint-disable-next-line unicorn/no-array-sort -- our own list; toSorted is newer than ES2022
  ascending.sort((a, b) => a - b);
  for (let i = 0; i < ascending.length; i++) {
    const first = ascending[i] ?? 0;
    const what = groups.get(first);
    let last = first;
    while (ascending[i + 1] === last + 1 && groups.get(last + 1) === what) {
      last++;
      i++;
    }
    const text = encodeBase64(data.subarray(first * 3, Math.min((last + 1) * 3, data.byteLength)));
    editor.overwrite(
      payload + first * 4,
      Uint8Array.from(text, (c) => c.charCodeAt(0)),
      what ?? '',
    );
  }
}
