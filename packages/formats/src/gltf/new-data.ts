import { SlewcurveError } from '@slewcurve/core';
import { encodeBase64 } from '../base64.js';
import type { JsonEditor } from '../json-text.js';
import { isObject, listMember, member, textMember } from '../json-value.js';
import type { OpenBuffer } from './buffers.js';
import type { Container } from './container.js';
import type { BufferWrite } from './in-place.js';

/** Where an added block of bytes stands, as a buffer view says it. */
export interface AddedBlock {
  readonly buffer: number;
  readonly byteOffset: number;
  readonly byteLength: number;
}

/** Bytes that a plan adds to a file. */
export interface NewData {
  /** Takes a block; it starts at a multiple of 4 of its buffer. */
  add(bytes: Uint8Array): AddedBlock;
  /** What goes behind the old bytes of a buffer, if anything; its new length, or a new buffer, goes into the JSON. */
  finish(editor: JsonEditor): BufferWrite | undefined;
}

/** A buffer that more can be added to: its number, and where what it holds ends. */
export interface Host {
  readonly buffer: number;
  readonly end: number;
}

/** A GLB word is 32 bits: no part of the file is longer. */
const LONGEST = 0xffff_ffff;

/**
 * Added data goes behind what the BIN chunk holds, or else behind a data URI that changed values stand in, or else into a
 * new buffer with a data URI. Files beside the asset are never written.
 */
export function newData(container: Container, host: Host | undefined): NewData {
  const blocks: Uint8Array[] = [];
  const buffer = host?.buffer ?? listMember(container.json, 'buffers').length;
  const start = roundedUp(host?.end ?? 0);
  let next = start;
  return {
    add: (bytes) => {
      const block = { buffer, byteOffset: next, byteLength: bytes.byteLength };
      blocks.push(bytes);
      next = roundedUp(next + bytes.byteLength);
      if (next > LONGEST)
        throw new SlewcurveError(
          'plan.cannot-write',
          `${container.file}: ${next} bytes would be needed; a GLB holds at most ${LONGEST}.`,
          { file: container.file },
        );
      return block;
    },
    finish: (editor) => {
      if (blocks.length === 0) return undefined;
      const data = joined(blocks, next - start);
      if (!host) {
        const uri = `data:application/octet-stream;base64,${encodeBase64(data)}`;
        editor.append('', 'buffers', JSON.stringify({ byteLength: data.byteLength, uri }));
        return undefined;
      }
      editor.setMember(`/buffers/${buffer}`, 'byteLength', String(next));
      const bytes = new Uint8Array(next - host.end);
      bytes.set(data, start - host.end);
      return { buffer, offset: host.end, bytes, what: 'appended data' };
    },
  };
}

/** The buffer that added data goes behind; none where a new one is needed. */
export function hostOf(
  { json, bin }: Container,
  open: ReadonlyMap<number, OpenBuffer>,
  writable: ReadonlySet<number>,
): Host | undefined {
  const first = listMember(json, 'buffers')[0];
  if (bin && isObject(first) && textMember(first, 'uri') === undefined) return { buffer: 0, end: bin.length };
  for (const [buffer, { dataUri }] of open)
    if (dataUri && writable.has(buffer)) return { buffer, end: dataUri.bytes.byteLength };
  return undefined;
}

/** Adds the view of a block to the JSON; its number. */
export function addView(editor: JsonEditor, block: AddedBlock): number {
  return editor.append('', 'bufferViews', JSON.stringify(block));
}

/** @throws SlewcurveError `plan.cannot-write` where a list that would grow is no list */
export function checkLists(container: Container): void {
  for (const name of ['buffers', 'bufferViews', 'accessors']) {
    const list = member(container.json, name);
    if (list !== undefined && !Array.isArray(list))
      throw new SlewcurveError(
        'plan.cannot-write',
        `${container.file}: /${name} is no list, so nothing can be added to it. Export the file again.`,
        { file: container.file, pointer: `/${name}` },
      );
  }
}

function roundedUp(length: number): number {
  return Math.ceil(length / 4) * 4;
}

function joined(blocks: readonly Uint8Array[], length: number): Uint8Array {
  const data = new Uint8Array(length);
  let at = 0;
  for (const block of blocks) {
    data.set(block, at);
    at = roundedUp(at + block.byteLength);
  }
  return data;
}
