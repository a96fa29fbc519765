import { existsSync, readFileSync } from 'node:fs';

/** Outside data that stands beside the project and may not be shipped with it. */
const SHARED = '../shared';

/** Path of a file of the outside data, and whether it is there. Says so where it is not: a test over it is skipped, never passed. */
export function sharedFile(path: string): {
  readonly path: string;
  readonly absent: boolean;
  read(): Uint8Array;
} {
  const full = `${SHARED}/${path}`;
  const absent = !existsSync(full);
  if (absent) console.warn(`SKIPPED: there is no ${full}; tests over it do not run.`);
  return { path: full, absent, read: () => new Uint8Array(readFileSync(full)) };
}
