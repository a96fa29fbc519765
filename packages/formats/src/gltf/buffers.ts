import { SlewcurveError } from '@slewcurve/core';
import { type Json, countMember, isObject, listMember, member, shown, textMember } from '../json-value.js';
import { readRange } from '../read-range.js';
import { type Source, bufferSource } from '../source.js';
import type { Container } from './container.js';
import { type DataUri, isDataUri, parseDataUri } from './data-uri.js';
import { siblingPath } from './sibling-uri.js';

/** Where a buffer's bytes stand. */
export interface OpenBuffer {
  readonly kind: 'bin' | 'sibling' | 'data';
  readonly source: Source;
  /** Byte of `source` where the buffer starts. */
  readonly at: number;
  /** `byteLength` of the buffer. */
  readonly length: number;
  readonly dataUri?: DataUri;
}

/** Opens the buffers of a file when they are asked for, each once. */
export interface Buffers {
  /**
   * The buffer; undefined where it has no bytes to read (no URI and no BIN chunk, as the fallback of a compressed one).
   *
   * @throws SlewcurveError `gltf.bad-buffer`, `gltf.buffer-short`, `gltf.refused-uri`, `gltf.no-sibling`, `gltf.bad-data-uri`
   */
  open(index: number): Promise<OpenBuffer | undefined>;
  /** Bytes that all opened buffers hold. */
  readonly opened: () => number;
}

export function fileBuffers(
  container: Container,
  sibling: ((uri: string) => Promise<Source>) | undefined,
): Buffers {
  const known = new Map<number, Promise<OpenBuffer | undefined>>();
  let opened = 0;
  const openOnce = async (index: number): Promise<OpenBuffer | undefined> => {
    const buffer = await openBuffer(container, index, sibling);
    opened += buffer?.length ?? 0;
    return buffer;
  };
  return {
    open: async (index) => {
      let buffer = known.get(index);
      if (!buffer) known.set(index, (buffer = openOnce(index)));
      return buffer;
    },
    opened: () => opened,
  };
}

async function openBuffer(
  container: Container,
  index: number,
  sibling: ((uri: string) => Promise<Source>) | undefined,
): Promise<OpenBuffer | undefined> {
  const { file } = container;
  const pointer = `/buffers/${index}`;
  const json = listMember(container.json, 'buffers')[index];
  const length = countMember(json, 'byteLength');
  if (!isObject(json) || length === undefined)
    throw new SlewcurveError(
      'gltf.bad-buffer',
      `${file}: ${pointer} must be an object with a whole byteLength; it has ${shown(member(json, 'byteLength'))}.`,
      { file, pointer },
    );
  const found = await bytesOf(container, index, json, sibling);
  if (!found) return undefined;
  const held = found.kind === 'bin' ? (container.bin?.length ?? 0) : found.source.size;
  if (held < length)
    throw new SlewcurveError(
      'gltf.buffer-short',
      `${file}: ${pointer} says ${length} bytes; ${WHERE[found.kind]} holds ${held}. The data was cut short; export the file again.`,
      { file, pointer },
    );
  return { ...found, length };
}

const WHERE = {
  bin: 'the BIN chunk',
  sibling: 'the file it names',
  data: 'its data URI',
} as const;

async function bytesOf(
  container: Container,
  index: number,
  json: Json,
  sibling: ((uri: string) => Promise<Source>) | undefined,
): Promise<Omit<OpenBuffer, 'length'> | undefined> {
  const { file } = container;
  const pointer = `/buffers/${index}/uri`;
  const uri = textMember(json, 'uri');
  if (uri === undefined) {
    if (index !== 0 || !container.bin) return undefined;
    return { kind: 'bin', source: container.source, at: container.bin.at };
  }
  if (isDataUri(uri)) {
    const dataUri = parseDataUri(uri);
    if (!dataUri)
      throw new SlewcurveError(
        'gltf.bad-data-uri',
        `${file}: ${pointer} is a data URI of ${uri.length} letters that is not sound base64. Export the file again.`,
        { file, pointer },
      );
    return { kind: 'data', source: bufferSource(dataUri.bytes), at: 0, dataUri };
  }
  const path = siblingPath(uri, file, pointer);
  if (!sibling)
    throw new SlewcurveError(
      'gltf.no-sibling',
      `${file}: ${pointer} names "${path}", and only this one file was given. Give both, or a .glb, which holds its own data.`,
      { file, pointer },
    );
  return { kind: 'sibling', source: await openSibling(sibling, path, file, pointer), at: 0 };
}

async function openSibling(
  sibling: (uri: string) => Promise<Source>,
  path: string,
  file: string,
  pointer: string,
): Promise<Source> {
  try {
    return await sibling(path);
  } catch (cause) {
    if (cause instanceof SlewcurveError) throw cause;
    const why = cause instanceof Error ? cause.message : String(cause);
    throw new SlewcurveError(
      'gltf.no-sibling',
      `${file}: ${pointer} names "${path}", which can't be opened: ${why}. Put it beside the asset.`,
      { file, pointer },
      { cause },
    );
  }
}

/** Bytes of a buffer, `offset` counted from its start. The caller has checked the range against `length`. */
export async function readBuffer(
  buffer: OpenBuffer,
  offset: number,
  length: number,
  file: string,
): Promise<Uint8Array> {
  return readRange(buffer.source, buffer.at + offset, length, file);
}
