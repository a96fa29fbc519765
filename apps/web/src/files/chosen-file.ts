import { recordsAmong, type ChosenRecord } from './record.js';

// Not in every browser.
declare global {
  interface Window {
    showOpenFilePicker?: (options: { multiple: boolean }) => Promise<FileSystemFileHandle[]>;
  }
  interface DataTransferItem {
    getAsFileSystemHandle?: () => Promise<FileSystemHandle | null>;
  }
}

/** A file that somebody chose, with the files beside it that it may refer to. */
export interface ChosenFile {
  readonly name: string;
  readonly blob: Blob;
  readonly siblings: Readonly<Record<string, Blob>>;
  /** Where the browser can write it back. */
  readonly handle?: FileSystemFileHandle;
}

/** What somebody chose: animations, and what stands beside them. */
export interface Chosen {
  readonly files: readonly ChosenFile[];
  readonly records: readonly ChosenRecord[];
}

interface LooseFile {
  /** Path within what was chosen. */
  readonly path: string;
  readonly file: Blob;
  readonly handle?: FileSystemFileHandle;
}

/** Animation files among what was chosen or dropped, each with the rest as its siblings. */
function chosenFrom(files: readonly LooseFile[]): Chosen {
  const animations = files.filter(({ path }) => isAnimation(path));
  const records = recordsAmong(files, animations.length > 0);
  // Nothing known by name: let the reader say what is wrong with it.
  const subjects = animations.length > 0 || records.length > 0 ? animations : files;
  const chosen = subjects.map((subject) => ({
    name: subject.path,
    blob: subject.file,
    siblings: siblingsOf(subject, files),
    ...(subject.handle && { handle: subject.handle }),
  }));
  return { files: chosen, records };
}

function isAnimation(path: string): boolean {
  return /\.(glb|gltf|bvh|csv|tsv)$/i.test(path);
}

/** The other files by their path from this one's folder. */
function siblingsOf(subject: LooseFile, files: readonly LooseFile[]): Record<string, Blob> {
  const folder = subject.path.slice(0, subject.path.lastIndexOf('/') + 1);
  const beside = files.filter(
    (file) => file !== subject && file.path.startsWith(folder) && !isAnimation(file.path),
  );
  return Object.fromEntries(beside.map(({ path, file }) => [path.slice(folder.length), file]));
}

/** Every file in a drop, folders opened. Must be called within the drop event: the browser forgets the items afterwards. */
export async function droppedFiles(transfer: DataTransfer): Promise<Chosen> {
  const items = [...transfer.items].filter((item) => item.kind === 'file');
  const handles = items.map((item) => handleOf(item));
  const entries = items.map((item) => item.webkitGetAsEntry());
  const plain = items.map((item) => item.getAsFile());
  const loose = await Promise.all(
    items.map(async (_, i) => {
      const handle = await handles[i];
      if (handle instanceof FileSystemFileHandle) return [await writable(handle)];
      const entry = entries[i];
      if (entry) return filesUnder(entry, '');
      const file = plain[i];
      return file ? [{ path: file.name, file }] : [];
    }),
  );
  return chosenFrom(loose.flat());
}

/** Files from a file field, a folder field among them. */
export function pickedFiles(list: FileList | readonly File[]): Chosen {
  return chosenFrom([...list].map((file) => ({ path: file.webkitRelativePath || file.name, file })));
}

/** Ask for files by the browser's own dialogue, which lets them be written back; undefined where it has none. */
export async function askForFiles(): Promise<Chosen | undefined> {
  if (!window.showOpenFilePicker) return undefined;
  const handles = await window.showOpenFilePicker({ multiple: true }).catch((error: unknown) => {
    if (error instanceof DOMException && error.name === 'AbortError') return [];
    throw error;
  });
  return chosenFrom(await Promise.all(handles.map(writable)));
}

/** A file that may be written over is copied: once that is done, the browser gives its old bytes no more. */
async function writable(handle: FileSystemFileHandle): Promise<LooseFile> {
  const file = await handle.getFile();
  return { path: handle.name, file: new Blob([await file.arrayBuffer()]), handle };
}

function handleOf(item: DataTransferItem): Promise<FileSystemHandle | null> {
  return item.getAsFileSystemHandle?.().catch(() => null) ?? Promise.resolve(null);
}

// Browsers don't hand out these interfaces by name.
function isFile(entry: FileSystemEntry): entry is FileSystemFileEntry {
  return entry.isFile;
}

function isFolder(entry: FileSystemEntry): entry is FileSystemDirectoryEntry {
  return entry.isDirectory;
}

async function filesUnder(entry: FileSystemEntry, folder: string): Promise<LooseFile[]> {
  const path = `${folder}${entry.name}`;
  if (isFile(entry)) {
    const file = await new Promise<File>((resolve, reject) => entry.file(resolve, reject));
    return [{ path, file }];
  }
  if (!isFolder(entry)) return [];
  const reader = entry.createReader();
  const found: LooseFile[] = [];
  for (;;) {
    // A reader gives a folder in lots, and an empty lot at its end.
    const lot = await new Promise<FileSystemEntry[]>((resolve, reject) =>
      reader.readEntries(resolve, reject),
    );
    if (lot.length === 0) return found;
    for (const inner of lot) found.push(...(await filesUnder(inner, `${path}/`)));
  }
}
