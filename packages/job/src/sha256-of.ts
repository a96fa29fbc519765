import { sha256 } from '@noble/hashes/sha2.js';
import type { Source } from '@slewcurve/formats';
import { UNWATCHED, betweenSlices, type Watch } from './watch.js';

const SLICE = 1 << 20;

/**
 * SHA-256 (FIPS 180-4) of a file's bytes as 64 lower-case hexadecimal digits, read in slices of 1 MiB.
 *
 * @throws SlewcurveError `job.stopped`
 */
export async function sha256Of(source: Source, watch: Watch = UNWATCHED): Promise<string> {
  const hash = sha256.create();
  for (let at = 0; at < source.size; at += SLICE) {
    hash.update(await source.read(at, Math.min(SLICE, source.size - at)));
    await betweenSlices(watch, Math.min(at + SLICE, source.size), source.size, 'bytes');
  }
  return Array.from(hash.digest(), (byte) => byte.toString(16).padStart(2, '0')).join('');
}
