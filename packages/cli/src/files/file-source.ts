import { open, type FileHandle } from 'node:fs/promises';
import { SlewcurveError } from '@slewcurve/core';
import type { Source } from '@slewcurve/formats';
import { messageOf, systemCode } from '../system-error.js';

/** A file on disk that is read by range; `close` it when done. */
export interface FileSource extends Source {
  close(): Promise<void>;
}

/**
 * Open a file for reading by range.
 *
 * @throws SlewcurveError `file.not-found`, `file.unreadable`
 */
export async function fileSource(path: string): Promise<FileSource> {
  try {
    const handle = await open(path, 'r');
    const { size } = await regularFile(handle, path);
    return {
      size,
      read: (offset, length) => readRange(handle, path, offset, length),
      close: () => handle.close(),
    };
  } catch (cause) {
    throw cause instanceof SlewcurveError ? cause : cannotRead(path, cause);
  }
}

async function regularFile(handle: FileHandle, path: string): Promise<{ size: number }> {
  const stat = await handle.stat();
  if (stat.isFile()) return stat;
  await handle.close();
  throw new SlewcurveError('file.unreadable', `${path} is not a file.`, { file: path });
}

async function readRange(
  handle: FileHandle,
  path: string,
  offset: number,
  length: number,
): Promise<Uint8Array> {
  const bytes = new Uint8Array(length);
  let done = 0;
  while (done < length) {
    const { bytesRead } = await handle.read(bytes, done, length - done, offset + done);
    if (bytesRead === 0)
      throw new SlewcurveError('file.changed', `${path} became shorter while it was read.`, {
        file: path,
        byte: offset + done,
      });
    done += bytesRead;
  }
  return bytes;
}

function cannotRead(path: string, cause: unknown): SlewcurveError {
  const missing = systemCode(cause) === 'ENOENT';
  return missing
    ? new SlewcurveError('file.not-found', `There is no file ${path}.`, { file: path }, { cause })
    : new SlewcurveError(
        'file.unreadable',
        `${path} can't be read: ${messageOf(cause)}`,
        { file: path },
        { cause },
      );
}
