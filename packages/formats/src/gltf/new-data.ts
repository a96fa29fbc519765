import { SlewcurveError } from '@slewcurve/core';
import { encodeBase64 } from '../base64.js';
import type { JsonEditor } from '../json-text.js';
import { isObject, listMember, member, textMember } from '../json-value.js';
import type { Container } from './container.js';

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
  /** Bytes that go to the end of the BIN chunk; writes the buffer's new length, or the new buffer, into the JSON. */
  finish(editor: JsonEditor): Uint8Array;
}

/** A GLB word is 32 bits: no part of the file is longer. */
const LONGEST = 0xffff_ffff;

/**
 * Added data goes behind what the BIN chunk holds; where the file has none, or its first buffer stands elsewhere, into a new
 * buffer with a data URI. Files beside the asset are never written.
 */
export function newData(container: Container): NewData {
  const blocks: Uint8Array[] = [];
  const buffers = listMember(container.json, 'buffers');
  const bin = isObject(buffers[0]) && textMember(buffers[0], 'uri') === undefined ? container.bin : undefined;
  const buffer = bin ? 0 : buffers.length;
  const start = bin ? roundedUp(bin.length) : 0;
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
      if (blocks.length === 0) return new Uint8Array(0);
      const data = joined(blocks, next - start);
      if (!bin) {
        const uri = `data:application/octet-stream;base64,${encodeBase64(data)}`;
        editor.append('', 'buffers', JSON.stringify({ byteLength: data.byteLength, uri }));
        return new Uint8Array(0);
      }
      editor.setMember('/buffers/0', 'byteLength', String(next));
      const padding = start - bin.length;
      const tail = new Uint8Array(padding + data.byteLength);
      tail.set(data, padding);
      return tail;
    },
  };
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
