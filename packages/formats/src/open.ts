import { SlewcurveError } from '@slewcurve/core';
import type { AnimationFile, OpenOptions } from './animation-file.js';
import { bvhFile } from './bvh/bvh-file.js';
import { delimitedFile } from './delimited/delimited-file.js';
import { isGlb, readGlb, readGltf } from './gltf/container.js';
import { gltfFile } from './gltf/gltf-file.js';
import { readRange } from './read-range.js';
import type { Source } from './source.js';

/** Enough for a magic number, for white space and the brace that opens JSON, or for a header and a row of a table. */
const SNIFFED = 1024;

/**
 * Reads an animation file into tracks. Its kind is told by its first bytes; text that opens with nothing of its own goes by its
 * name or is tried as a table. Of glTF only the JSON and the ranges of rotation data are read, so a large file with meshes opens as
 * fast as a small one.
 *
 * Faults of single channels are listed in `problems`; a file that can't be read as what it is throws.
 *
 * @throws SlewcurveError `file.empty`, `file.unknown-format`, and the `gltf.`, `bvh.`, `delimited.`, `text.` and
 *   `source.` codes of a damaged file
 */
export async function openAnimation(source: Source, options: OpenOptions): Promise<AnimationFile> {
  const { name } = options;
  if (source.size === 0)
    throw new SlewcurveError('file.empty', `${name}: the file is empty.`, { file: name, byte: 0 });
  const start = await readRange(source, 0, Math.min(SNIFFED, source.size), name);
  if (isGlb(start)) return gltfFile(await readGlb(source, name), options);
  if (opensJson(start)) return gltfFile(await readGltf(source, name), options);
  if (opensBvh(start, name)) return bvhFile(source, name);
  if (opensTable(start, name)) return delimitedFile(source, name, options.table ?? {});
  throw new SlewcurveError(
    'file.unknown-format',
    `${name}: none of GLB (which starts with "glTF"), glTF JSON (which starts with "{"), BVH (which starts with "HIERARCHY") and a table of text; it starts with ${hex(start.subarray(0, 8))}.`,
    { file: name, byte: 0 },
  );
}

/** Whether the first word is HIERARCHY, or the name says that it should be. */
function opensBvh(start: Uint8Array, name: string): boolean {
  const text = String.fromCharCode(...start);
  return /^(?:\xef\xbb\xbf)?\s*HIERARCHY\b/i.test(text) || /\.bvh$/i.test(name);
}

/** Whether it is text with a digit or a comment in it, or the name says that it should be a table. */
function opensTable(start: Uint8Array, name: string): boolean {
  if (start.some((byte) => byte < 0x20 && ![0x09, 0x0a, 0x0d].includes(byte))) return false;
  const text = String.fromCharCode(...start);
  return /\.(?:csv|tsv|txt)$/i.test(name) || /^(?:\xef\xbb\xbf)?\s*#|[\d\s][,;\t ]\s*[-+.\d]/.test(text);
}

/** Whether the first letter after a byte order mark and white space is `{`. */
function opensJson(start: Uint8Array): boolean {
  const mark = start[0] === 0xef && start[1] === 0xbb && start[2] === 0xbf;
  const first = start.subarray(mark ? 3 : 0).find((byte) => ![0x20, 0x09, 0x0a, 0x0d].includes(byte));
  return first === 0x7b;
}

function hex(bytes: Uint8Array): string {
  return [...bytes].map((byte) => byte.toString(16).padStart(2, '0')).join(' ');
}
