import { createReadStream } from 'node:fs';
import { link, realpath, stat } from 'node:fs/promises';
import { parse, join } from 'node:path';
import { SlewcurveError } from '@slewcurve/core';
import { messageOf, systemCode } from '../system-error.js';
import { writeWhole } from './write-whole.js';

/**
 * Keep a file's bytes under another name beside it (`walk.original.glb`, then `walk.original-2.glb`); never over anything.
 *
 * @returns the other name's path
 * @throws SlewcurveError `file.unwritable`
 */
export async function keepOriginal(path: string): Promise<string> {
  const file = await realpath(path);
  const { dir, name, ext } = parse(file);
  for (let n = 1; n < 1000; n++) {
    const kept = join(dir, `${name}.original${n === 1 ? '' : `-${n}`}${ext}`);
    if (await takesName(file, kept)) return kept;
  }
  throw new SlewcurveError(
    'file.unwritable',
    `There are a thousand originals of ${path} already; clear some away.`,
    { file: path },
  );
}

/** A second name for the same bytes where the disk knows such, else a copy; false where the name is taken. */
async function takesName(file: string, kept: string): Promise<boolean> {
  try {
    await link(file, kept);
    return true;
  } catch (cause) {
    if (systemCode(cause) === 'EEXIST') return false;
  }
  try {
    if (await exists(kept)) return false;
    await writeWhole(kept, createReadStream(file));
    return true;
  } catch (cause) {
    throw new SlewcurveError(
      'file.unwritable',
      `The original can't be kept as ${kept}: ${messageOf(cause)}`,
      { file: kept },
      { cause },
    );
  }
}

async function exists(path: string): Promise<boolean> {
  return stat(path).then(
    () => true,
    (error: unknown) => {
      if (systemCode(error) === 'ENOENT') return false;
      throw error;
    },
  );
}
