import { type BigIntStats } from 'node:fs';
import { constants, open, stat, type FileHandle } from 'node:fs/promises';
import { SlewcurveError } from '@slewcurve/core';
import type { Source } from '@slewcurve/formats';
import { messageOf, systemCode } from '../system-error.js';

/** A file on disk that is read by range; `close` it when done. */
export interface FileSource extends Source {
  /** Whether its path still leads to the file that was opened, with nothing written to it since, as far as the disk's clock tells. */
  isUnchanged(): Promise<boolean>;
  close(): Promise<void>;
}

/**
 * Open a file for reading by range. Only a file is opened: a pipe or a device would block, or never end.
 *
 * @throws SlewcurveError `file.not-found`, `file.unreadable`
 */
export async function fileSource(path: string): Promise<FileSource> {
  try {
    assertFile(await stat(path, { bigint: true }), path);
    // Were a pipe put in its place since, opening it would not wait for a writer.
    const handle = await open(path, constants.O_RDONLY | (constants.O_NONBLOCK ?? 0));
    const opened = await fileStat(handle, path);
    return {
      size: Number(opened.size),
      read: (offset, length) => readRange(handle, path, offset, length),
      isUnchanged: async () => {
        const now = await stat(path, { bigint: true }).catch(() => undefined);
        return now !== undefined && MARKS.every((mark) => now[mark] === opened[mark]);
      },
      close: () => handle.close(),
    };
  } catch (cause) {
    throw cause instanceof SlewcurveError ? cause : cannotRead(path, cause);
  }
}

/** What tells one state of a file from another without reading it. */
const MARKS = ['dev', 'ino', 'size', 'mtimeNs', 'ctimeNs'] as const satisfies readonly (keyof BigIntStats)[];

async function fileStat(handle: FileHandle, path: string): Promise<BigIntStats> {
  try {
    const found = await handle.stat({ bigint: true });
    assertFile(found, path);
    return found;
  } catch (error) {
    await handle.close();
    throw error;
  }
}

function assertFile(found: BigIntStats, path: string): void {
  if (!found.isFile()) throw new SlewcurveError('file.unreadable', `${path} is not a file.`, { file: path });
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
        `${path} can't be read: ${messageOf(cause)}.`,
        { file: path },
        { cause },
      );
}
