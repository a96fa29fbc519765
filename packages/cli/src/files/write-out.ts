import { realpath } from 'node:fs/promises';
import { dirname, join, resolve } from 'node:path';
import { SlewcurveError } from '@slewcurve/core';
import type { Source } from '@slewcurve/formats';
import type { CommandIo } from '../command-io.js';
import type { Arguments } from '../flags.js';
import type { FileInHand } from '../with-file.js';
import { copyMissingSiblings } from './copy-siblings.js';
import { keepOriginal } from './keep-original.js';
import { writeWhole } from './write-whole.js';

const SLICE = 1 << 20;

/**
 * Write the new bytes where `-o` or `--in-place` says. The file itself is written over only with `--in-place`, keeps its original
 * beside it then, and must still be what was opened.
 *
 * @throws SlewcurveError `mend.over-input`, `file.changed`, `file.unwritable`
 */
export async function writeOut(
  file: FileInHand,
  result: Source,
  args: Arguments,
  io: CommandIo,
): Promise<void> {
  const out = args.value('o');
  if (out === undefined) {
    await writeWhole(file.path, slicesOf(result), async () => {
      await assertUnchanged(file);
      io.stderr.write(`original kept as ${await keepOriginal(file.path)}\n`);
    });
    return;
  }
  const path = resolve(io.cwd(), out);
  await assertNoInput(file, path, out);
  // The new file is made of ranges of the old one, so that one must be what it was.
  await writeWhole(path, slicesOf(result), () => assertUnchanged(file));
  for (const copied of await copyMissingSiblings(file, dirname(path)))
    io.stderr.write(`copied beside it: ${copied}\n`);
}

/**
 * Nothing is written over what is read: the file and the files that it refers to.
 *
 * @param shown the path as it was typed
 * @throws SlewcurveError `mend.over-input`
 */
export async function assertNoInput(file: FileInHand, path: string, shown: string): Promise<void> {
  if (await isSameFile(path, file.path))
    throw new SlewcurveError(
      'mend.over-input',
      `${shown} is the file itself. Use --in-place to write over it and keep the original, or name another file.`,
      { file: shown },
    );
  for (const uri of file.siblings.opened)
    if (await isSameFile(path, join(dirname(file.path), uri)))
      throw new SlewcurveError(
        'mend.over-input',
        `${shown} holds data of ${file.opened.name}. Name another file.`,
        { file: shown },
      );
}

async function* slicesOf(source: Source): AsyncIterable<Uint8Array> {
  for (let at = 0; at < source.size; at += SLICE) yield source.read(at, Math.min(SLICE, source.size - at));
}

async function isSameFile(a: string, b: string): Promise<boolean> {
  return (await realPath(a)) === (await realPath(b));
}

/** The path itself where there is no file yet. */
function realPath(path: string): Promise<string> {
  return realpath(path).catch(() => path);
}

/** The name on disk must still hold what was opened. */
async function assertUnchanged(file: FileInHand): Promise<void> {
  if (await file.isUnchanged()) return;
  throw new SlewcurveError(
    'file.changed',
    `${file.opened.name} was changed by somebody else meanwhile; nothing was written. Run it again.`,
    { file: file.opened.name },
  );
}
