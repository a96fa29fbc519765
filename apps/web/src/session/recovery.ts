import type { SaidConventions, Stamp } from '@slewcurve/job';
import type { CardLine } from './card-history.js';

// Work in progress in the browser's own database: it survives a reload or a crash, and never leaves the machine.

/** One file's work, as far as it had come. */
export interface SavedWork {
  readonly name: string;
  /** The bytes as they were opened; absent for the demo scene. */
  readonly blob?: Blob;
  readonly siblings: Readonly<Record<string, Blob>>;
  readonly handle?: FileSystemFileHandle;
  /** What was said of the file where it is silent. */
  readonly said?: SaidConventions;
  readonly lines: readonly CardLine[];
  /** Left out by visits before there were any. */
  readonly stamps?: readonly Stamp[];
  readonly loops?: readonly string[];
  readonly savedAt: number;
}

const DATABASE = 'slewcurve';
const STORE = 'work';
const KEY = 'last';

/** Keep the work of this visit instead of what was kept before. Fails silently where the browser keeps nothing: saving is a comfort. */
export async function keepWork(files: readonly SavedWork[]): Promise<void> {
  await inStore('readwrite', (store) => store.put(files, KEY)).catch(() => {});
}

/** The work that an earlier visit left, if any. */
export async function keptWork(): Promise<readonly SavedWork[]> {
  const kept: unknown = await inStore('readonly', (store) => store.get(KEY)).catch(() => undefined);
  // oxlint-disable-next-line typescript/no-unsafe-type-assertion -- nobody but `keepWork` writes there
  return Array.isArray(kept) ? (kept as SavedWork[]) : [];
}

async function inStore(
  mode: IDBTransactionMode,
  use: (store: IDBObjectStore) => IDBRequest<unknown> | IDBRequest<IDBValidKey>,
): Promise<unknown> {
  const database = await opened();
  try {
    const request = use(database.transaction(STORE, mode).objectStore(STORE));
    await settled(request);
    return request.result;
  } finally {
    database.close();
  }
}

async function opened(): Promise<IDBDatabase> {
  const request = indexedDB.open(DATABASE, 1);
  request.addEventListener('upgradeneeded', () => request.result.createObjectStore(STORE));
  await settled(request);
  return request.result;
}

function settled(request: EventTarget): Promise<unknown> {
  return new Promise((resolve, reject) => {
    request.addEventListener('success', resolve);
    request.addEventListener('error', () => reject(new Error('The browser keeps nothing here.')));
  });
}
