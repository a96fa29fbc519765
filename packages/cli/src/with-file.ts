import { resolve } from 'node:path';
import { openFile, type OpenedFile } from '@slewcurve/job';
import type { OpenOptions, TableOptions } from '@slewcurve/formats';
import { fileSource } from './files/file-source.js';
import { siblingsOf, type Siblings } from './files/siblings.js';

/** A file that is open while something works on it. */
export interface FileInHand {
  readonly opened: OpenedFile;
  readonly options: OpenOptions;
  readonly siblings: Siblings;
  /** Where it is on disk. */
  readonly path: string;
  /** Whether it is there still as it was opened. */
  isUnchanged(): Promise<boolean>;
}

/**
 * Open a file, work on it, close it.
 *
 * @param name as given on the command line; reported with forward slashes
 * @param table what the flags say of a table of delimited text
 * @throws what opening and `work` throw
 */
export async function withFile<T>(
  name: string,
  cwd: string,
  table: TableOptions,
  work: (file: FileInHand) => Promise<T>,
): Promise<T> {
  const path = resolve(cwd, name);
  const source = await fileSource(path);
  const siblings = siblingsOf(path);
  try {
    const options: OpenOptions = {
      name: reportedName(name),
      sibling: (uri) => siblings.open(uri),
      table,
    };
    const opened = await openFile(source, options);
    return await work({ opened, options, siblings, path, isUnchanged: () => source.isUnchanged() });
  } finally {
    await Promise.all([source.close(), siblings.close()]);
  }
}

/** A path as reports write it: as given, with forward slashes. */
export function reportedName(path: string): string {
  return path.replaceAll('\\', '/');
}
