import { DeskError, type DeskClient } from '../session/desk-client.js';

/** How a file was saved, in words. */
export interface Saved {
  readonly how: 'in place' | 'download';
  readonly name: string;
}

/** What is saved where. */
export interface SaveOrder {
  readonly name: string;
  readonly bytes: Uint8Array<ArrayBuffer>;
  /** Size and hash that the file must still have: as it was opened, or as it was last written from here. */
  readonly onDisk: { readonly size: number; readonly sha256: string };
  readonly handle?: FileSystemFileHandle;
}

/**
 * Write over the opened file. It is read first: one that somebody changed meanwhile is left alone. The browser writes into a file
 * beside it and swaps the two when all is written.
 *
 * @throws DeskError `file.changed`, `file.not-allowed`
 */
export async function saveInPlace(order: SaveOrder, desk: DeskClient): Promise<Saved> {
  const { handle, onDisk, name } = order;
  if (!handle)
    throw new DeskError('file.not-allowed', `The browser can't write over ${name}; save a copy instead.`);
  const now = await desk.ask('hash', { blob: await handle.getFile() });
  if (now.size !== onDisk.size || now.sha256 !== onDisk.sha256)
    throw new DeskError(
      'file.changed',
      `${name} was changed on disk since it was opened here; nothing was written. Save a copy instead, or open it again.`,
    );
  const out = await handle.createWritable();
  try {
    await out.write(order.bytes);
    await out.close();
  } catch (error) {
    await out.abort().catch(() => {});
    throw error;
  }
  return { how: 'in place', name };
}

/** Hand the bytes to the browser as a download. */
export function saveCopy(
  name: string,
  bytes: Uint8Array<ArrayBuffer> | string,
  type = 'application/octet-stream',
): Saved {
  const url = URL.createObjectURL(new Blob([bytes], { type }));
  const link = document.createElement('a');
  link.href = url;
  link.download = name;
  link.click();
  setTimeout(() => URL.revokeObjectURL(url), 60_000);
  return { how: 'download', name };
}

/** `walk.glb` mended is `walk.mended.glb`. */
export function mendedName(path: string): string {
  const name = path.slice(path.lastIndexOf('/') + 1);
  return name.replace(/(\.[^.]*)?$/, '.mended$1');
}
