import { copyFile, constants, link } from 'node:fs/promises';
import { parse, join } from 'node:path';
import { SlewcurveError } from '@slewcurve/core';
import { messageOf, systemCode } from '../system-error.js';

/**
 * Keep a file's bytes under another name beside it (`walk.original.glb`, then `walk.original-2.glb`); never over anything.
 *
 * @returns the other name's path
 * @throws SlewcurveError `file.unwritable`
 */
export async function keepOriginal(path: string): Promise<string> {
  const { dir, name, ext } = parse(path);
  for (let n = 1; n < 1000; n++) {
    const kept = join(dir, `${name}.original${n === 1 ? '' : `-${n}`}${ext}`);
    if (await takesName(path, kept)) return kept;
  }
  throw new SlewcurveError(
    'file.unwritable',
    `There are a thousand originals of ${path} already; clear some away.`,
    { file: path },
  );
}

/** A second name for the same bytes where the disk knows such, else a copy; false where the name is taken. */
async function takesName(path: string, kept: string): Promise<boolean> {
  try {
    await link(path, kept).catch((error: unknown) => {
      if (systemCode(error) === 'EEXIST') throw error;
      return copyFile(path, kept, constants.COPYFILE_EXCL);
    });
    return true;
  } catch (cause) {
    if (systemCode(cause) === 'EEXIST') return false;
    throw new SlewcurveError(
      'file.unwritable',
      `The original can't be kept as ${kept}: ${messageOf(cause)}`,
      { file: kept },
      { cause },
    );
  }
}
