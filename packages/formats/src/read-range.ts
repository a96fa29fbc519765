import { SlewcurveError } from '@slewcurve/core';
import type { Source } from './source.js';

/**
 * Bytes of a source after checking the range against its size, and that the source kept its word.
 *
 * @throws SlewcurveError `source.out-of-range`, `source.short-read`
 */
export async function readRange(
  source: Source,
  offset: number,
  length: number,
  file: string,
): Promise<Uint8Array> {
  if (offset < 0 || length < 0 || offset + length > source.size)
    throw new SlewcurveError(
      'source.out-of-range',
      `${file}: ${length} bytes at ${offset} are asked for; the file has ${source.size}.`,
      { file, byte: offset },
    );
  if (length === 0) return new Uint8Array(0);
  const bytes = await source.read(offset, length);
  if (bytes.byteLength !== length)
    throw new SlewcurveError(
      'source.short-read',
      `${file}: ${length} bytes were asked for at ${offset}, ${bytes.byteLength} came. The file changed while it was read; open it again.`,
      { file, byte: offset },
    );
  return bytes;
}
