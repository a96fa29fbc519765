import { randomBytes } from 'node:crypto';
import { open, rename, rm } from 'node:fs/promises';
import { basename, dirname, join } from 'node:path';
import { SlewcurveError } from '@slewcurve/core';
import { messageOf } from '../system-error.js';

/**
 * Write a file so that it is there whole or not at all: into a temporary file beside it, flushed, then renamed over it.
 *
 * @throws SlewcurveError `file.unwritable`
 */
export async function writeWhole(
  path: string,
  parts: AsyncIterable<Uint8Array> | Iterable<Uint8Array>,
): Promise<void> {
  const temporary = join(dirname(path), `.${basename(path)}.${randomBytes(6).toString('hex')}.part`);
  try {
    const handle = await open(temporary, 'wx');
    try {
      for await (const part of parts) await handle.writeFile(part);
      await handle.sync();
    } finally {
      await handle.close();
    }
    await rename(temporary, path);
  } catch (cause) {
    await rm(temporary, { force: true });
    if (cause instanceof SlewcurveError) throw cause;
    throw new SlewcurveError(
      'file.unwritable',
      `${path} can't be written: ${messageOf(cause)}`,
      { file: path },
      { cause },
    );
  }
}
