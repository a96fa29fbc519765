import { realpath } from 'node:fs/promises';
import { dirname, resolve } from 'node:path';
import { SlewcurveError } from '@slewcurve/core';
import { sha256Of } from '@slewcurve/job';
import type { Source } from '@slewcurve/formats';
import type { CommandIo } from '../command-io.js';
import type { Arguments } from '../flags.js';
import type { FileInHand } from '../with-file.js';
import { copyMissingSiblings } from './copy-siblings.js';
import { fileSource } from './file-source.js';
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
    await assertUnchanged(file);
    io.stderr.write(`original kept as ${await keepOriginal(file.path)}\n`);
    await writeWhole(file.path, slicesOf(result));
    return;
  }
  const path = resolve(io.cwd(), out);
  if (await isSameFile(path, file.path))
    throw new SlewcurveError(
      'mend.over-input',
      `${out} is the file itself. Use --in-place to write over it and keep the original, or name another file.`,
      { file: out },
    );
  await writeWhole(path, slicesOf(result));
  for (const copied of await copyMissingSiblings(file, dirname(path)))
    io.stderr.write(`copied beside it: ${copied}\n`);
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

/** The name on disk must still hold the bytes that were opened. */
async function assertUnchanged(file: FileInHand): Promise<void> {
  const now = await fileSource(file.path);
  try {
    if (
      now.size === file.opened.source.size &&
      (await sha256Of(now)) === (await sha256Of(file.opened.source))
    )
      return;
  } finally {
    await now.close();
  }
  throw new SlewcurveError(
    'file.changed',
    `${file.opened.name} was changed by somebody else meanwhile; nothing was written. Run it again.`,
    {
      file: file.opened.name,
    },
  );
}
