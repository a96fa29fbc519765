/** Bytes that are read by range: a buffer, a Blob slice, a file handle. */
export interface Source {
  /** Bytes in all. */
  readonly size: number;
  /** Exactly `length` bytes from `offset`; the caller has checked both against `size`. */
  read(offset: number, length: number): Promise<Uint8Array>;
}

/** A source over bytes in memory. Reads are views, not copies. */
export function bufferSource(bytes: Uint8Array): Source {
  return { size: bytes.byteLength, read: async (offset, length) => bytes.subarray(offset, offset + length) };
}
