import { randomBytes } from 'node:crypto';
import { type Stats } from 'node:fs';
import { open, realpath, rename, rm, stat, type FileHandle } from 'node:fs/promises';
import { basename, dirname, join } from 'node:path';
import { SlewcurveError } from '@slewcurve/core';
import { messageOf, systemCode } from '../system-error.js';

/**
 * Write a file so that it is there whole or not at all: into a temporary file beside it, flushed, then renamed over it. A link is
 * followed to the file that it leads to; a file that is written over keeps its permissions.
 *
 * @param atLast called when everything is written and only the renaming is left; what it throws leaves the old file as it is
 * @throws SlewcurveError `file.unwritable`, and what `parts` and `atLast` throw
 */
export async function writeWhole(
  path: string,
  parts: AsyncIterable<Uint8Array> | Iterable<Uint8Array>,
  atLast: () => Promise<void> = async () => {},
): Promise<void> {
  const { target, mode } = await targetOf(path);
  const temporary = join(dirname(target), `.${basename(target)}.${randomBytes(6).toString('hex')}.part`);
  try {
    const handle = await open(temporary, 'wx');
    try {
      await fill(handle, parts, mode);
    } finally {
      await handle.close();
    }
    await atLast();
    await rename(temporary, target);
    await flushFolder(dirname(target));
  } catch (cause) {
    await rm(temporary, { force: true });
    if (cause instanceof SlewcurveError) throw cause;
    const noFolder = systemCode(cause) === 'ENOENT';
    throw unwritable(path, noFolder ? 'its folder is not there; make it first' : messageOf(cause), cause);
  }
}

async function fill(
  handle: FileHandle,
  parts: AsyncIterable<Uint8Array> | Iterable<Uint8Array>,
  mode: number | undefined,
): Promise<void> {
  for await (const part of parts) await handle.writeFile(part);
  if (mode !== undefined) await handle.chmod(mode);
  await handle.sync();
}

/** The file that a path leads to and its permissions, if there is one. What is there and is no file is never renamed over. */
async function targetOf(path: string): Promise<{ readonly target: string; readonly mode?: number }> {
  let found: Stats;
  try {
    found = await stat(path);
  } catch (cause) {
    if (systemCode(cause) === 'ENOENT') return { target: path };
    throw unwritable(path, messageOf(cause), cause);
  }
  if (!found.isFile()) throw unwritable(path, 'it is not a file');
  return { target: await realpath(path), mode: found.mode & 0o777 };
}

/** The new name reaches the disk too. Systems that can't open a folder do without. */
async function flushFolder(folder: string): Promise<void> {
  try {
    const handle = await open(folder, 'r');
    await handle.sync().finally(() => handle.close());
  } catch {
    // The bytes are flushed and the name is there; only a loss of power right now could still show the old file.
  }
}

function unwritable(path: string, why: string, cause?: unknown): SlewcurveError {
  return new SlewcurveError(
    'file.unwritable',
    `${path} can't be written: ${why}.`,
    { file: path },
    { cause },
  );
}
