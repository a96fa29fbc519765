import type { Source } from '@slewcurve/formats';

const SLICE = 1 << 20;

/** All bytes of a source, as a copy. */
export async function sourceBytes(source: Source): Promise<Uint8Array> {
  const bytes = new Uint8Array(source.size);
  for (let at = 0; at < source.size; at += SLICE)
    bytes.set(await source.read(at, Math.min(SLICE, source.size - at)), at);
  return bytes;
}
