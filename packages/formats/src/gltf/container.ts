import { SlewcurveError } from '@slewcurve/core';
import { type Json, type JsonObject, isObject, parseJsonText } from '../json-value.js';
import { readRange } from '../read-range.js';
import type { Source } from '../source.js';
import { decodeUtf8 } from '../utf8.js';

/** Part of a file: `length` bytes at `at`. */
interface Span {
  readonly at: number;
  readonly length: number;
}

/** A glTF asset taken apart: where its JSON and its binary chunk stand, and the JSON itself. */
export interface Container {
  readonly format: 'glb' | 'gltf';
  readonly source: Source;
  readonly file: string;
  /** The JSON text in the file, with the padding of its chunk. */
  readonly jsonSpan: Span;
  readonly jsonBytes: Uint8Array;
  readonly json: JsonObject;
  /** Data of the BIN chunk, padding included. */
  readonly bin?: Span;
  /** What the header gives as the length of the whole GLB. */
  readonly declaredLength?: number;
}

/** `glTF` as a little-endian word (glTF 2.0, "GLB File Format"). */
const MAGIC = 0x46546c67;
const CHUNK_JSON = 0x4e4f534a;
const CHUNK_BIN = 0x004e4942;
const HEADER = 12;
const CHUNK_HEADER = 8;

/** Bytes before the JSON text of a GLB: header and chunk header. */
const GLB_JSON_AT: number = HEADER + CHUNK_HEADER;

export function isGlb(start: Uint8Array): boolean {
  return start.byteLength >= 4 && word(start, 0) === MAGIC;
}

/**
 * Takes a GLB apart. Every length is checked against the file before anything is read or allocated by it.
 *
 * @throws SlewcurveError `gltf.truncated`, `gltf.version`, `gltf.bad-chunk`, `gltf.not-json`, `gltf.encoding`
 */
export async function readGlb(source: Source, file: string): Promise<Container> {
  if (source.size < GLB_JSON_AT)
    throw truncated(file, source.size, `the header and the first chunk header take ${GLB_JSON_AT} bytes`);
  const header = await readRange(source, 0, GLB_JSON_AT, file);
  const version = word(header, 4);
  if (version !== 2)
    throw new SlewcurveError(
      'gltf.version',
      `${file}: GLB container version ${version}; version 2 is read. Export the file again as glTF 2.0.`,
      { file, byte: 4 },
    );
  const declaredLength = word(header, 8);
  if (declaredLength > source.size)
    throw truncated(file, source.size, `the header says ${declaredLength} bytes`);
  if (declaredLength < GLB_JSON_AT)
    throw new SlewcurveError(
      'gltf.bad-length',
      `${file}: the header says ${declaredLength} bytes in all; a GLB has at least ${GLB_JSON_AT}. The header is damaged; export the file again.`,
      { file, byte: 8 },
    );
  if (word(header, 16) !== CHUNK_JSON)
    throw badChunk(file, 16, `the first chunk must be JSON; its type is 0x${word(header, 16).toString(16)}`);
  const jsonSpan = { at: GLB_JSON_AT, length: word(header, HEADER) };
  const left = declaredLength - GLB_JSON_AT;
  if (jsonSpan.length > left)
    throw badChunk(
      file,
      HEADER,
      `the JSON chunk says ${jsonSpan.length} bytes; ${left} are left in the file`,
    );
  const bin = await binChunk(source, file, jsonSpan.at + jsonSpan.length, declaredLength);
  const jsonBytes = await readRange(source, jsonSpan.at, jsonSpan.length, file);
  const json = parseJson(jsonBytes, file, jsonSpan.at);
  return { format: 'glb', source, file, jsonSpan, jsonBytes, json, declaredLength, ...(bin && { bin }) };
}

/** The BIN chunk, which can only be the second; anything else there or after it is left alone. */
async function binChunk(source: Source, file: string, at: number, end: number): Promise<Span | undefined> {
  if (at === end) return undefined;
  if (end - at < CHUNK_HEADER)
    throw badChunk(file, at, `${end - at} bytes stand where a chunk header of ${CHUNK_HEADER} should`);
  const header = await readRange(source, at, CHUNK_HEADER, file);
  const length = word(header, 0);
  const left = end - at - CHUNK_HEADER;
  if (length > left) throw badChunk(file, at, `the second chunk says ${length} bytes; ${left} are left`);
  return word(header, 4) === CHUNK_BIN ? { at: at + CHUNK_HEADER, length } : undefined;
}

/**
 * Reads a `.gltf`: JSON from the first byte to the last.
 *
 * @throws SlewcurveError `gltf.not-json`, `gltf.encoding`
 */
export async function readGltf(source: Source, file: string): Promise<Container> {
  const jsonBytes = await readRange(source, 0, source.size, file);
  const json = parseJson(jsonBytes, file, 0);
  return { format: 'gltf', source, file, jsonSpan: { at: 0, length: source.size }, jsonBytes, json };
}

function parseJson(bytes: Uint8Array, file: string, at: number): JsonObject {
  const place = { file, byte: at };
  let text: string;
  try {
    text = decodeUtf8(bytes);
  } catch (cause) {
    throw new SlewcurveError(
      'gltf.encoding',
      `${file}: the JSON (${bytes.byteLength} bytes at ${at}) is not UTF-8. Save it as UTF-8.`,
      place,
      { cause },
    );
  }
  let json: Json;
  try {
    json = parseJsonText(text);
  } catch (cause) {
    const why = cause instanceof Error ? cause.message : String(cause);
    throw new SlewcurveError(
      'gltf.not-json',
      `${file}: the JSON (${bytes.byteLength} bytes at ${at}) can't be parsed: ${why}. Export the file again.`,
      place,
      { cause },
    );
  }
  if (!isObject(json))
    throw new SlewcurveError(
      'gltf.not-json',
      `${file}: glTF is one JSON object; this is ${Array.isArray(json) ? 'an array' : typeof json}.`,
      place,
    );
  return json;
}

function word(bytes: Uint8Array, at: number): number {
  return new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength).getUint32(at, true);
}

function truncated(file: string, size: number, needs: string): SlewcurveError {
  return new SlewcurveError(
    'gltf.truncated',
    `${file}: the file ends after ${size} bytes, and ${needs}. It was cut short; copy or export it again.`,
    { file, byte: size },
  );
}

function badChunk(file: string, byte: number, what: string): SlewcurveError {
  return new SlewcurveError(
    'gltf.bad-chunk',
    `${file}: byte ${byte}: ${what}. The container is damaged; export it again.`,
    { file, byte },
  );
}
