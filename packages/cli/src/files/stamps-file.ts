import { existsSync } from 'node:fs';
import { parseStamps, stampsFileName, stampsJson, type Stamp } from '@slewcurve/job';
import { readJson } from '../settings.js';
import { writeWhole } from './write-whole.js';

/**
 * The stamps of the asset at `path`, an absolute one; none where there is no such file.
 *
 * @param name of the asset as reported, for the errors
 * @throws SlewcurveError what `parseStamps` throws, `file.not-json`
 */
export async function readStamps(path: string, name: string): Promise<Stamp[]> {
  const file = stampsFileName(path);
  return existsSync(file) ? parseStamps(await readJson(file, ''), stampsFileName(name)) : [];
}

/** Writes the stamps of the asset at `path` beside it. @throws SlewcurveError `file.unwritable` */
export async function writeStamps(path: string, stamps: readonly Stamp[]): Promise<void> {
  await writeWhole(stampsFileName(path), [new TextEncoder().encode(stampsJson(stamps))]);
}
