import { copyFile, constants, mkdir } from 'node:fs/promises';
import { dirname, join } from 'node:path';
import { SlewcurveError } from '@slewcurve/core';
import type { FileInHand } from '../with-file.js';
import { messageOf, systemCode } from '../system-error.js';

/**
 * Copy the files that the written file refers to into its folder, where they are not there yet. Gives the paths that were copied.
 *
 * @throws SlewcurveError `file.unwritable`
 */
export async function copyMissingSiblings(file: FileInHand, folder: string): Promise<string[]> {
  const from = dirname(file.path);
  if (folder === from) return [];
  const copied: string[] = [];
  for (const uri of file.siblings.opened) {
    const to = join(folder, uri);
    try {
      await mkdir(dirname(to), { recursive: true });
      await copyFile(join(from, uri), to, constants.COPYFILE_EXCL);
      copied.push(to);
    } catch (cause) {
      if (systemCode(cause) !== 'EEXIST')
        throw new SlewcurveError(
          'file.unwritable',
          `${to} can't be written: ${messageOf(cause)}.`,
          { file: to },
          { cause },
        );
    }
  }
  return copied;
}
