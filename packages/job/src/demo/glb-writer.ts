const HEADER = 12;
const CHUNK_HEADER = 8;
const MAGIC = 0x46546c67;
const JSON_CHUNK = 0x4e4f534a;
const BIN_CHUNK = 0x004e4942;

/**
 * A binary glTF file of one JSON and one BIN chunk (glTF 2.0, "GLB File Format Specification"). `json` must be ASCII when written
 * out; its `buffers` are added here.
 */
export function writeGlb(json: Readonly<Record<string, unknown>>, binary: Uint8Array): Uint8Array {
  const text = JSON.stringify({ ...json, buffers: [{ byteLength: binary.length }] });
  const jsonLength = padded(text.length);
  const binLength = padded(binary.length);
  const bytes = new Uint8Array(HEADER + CHUNK_HEADER + jsonLength + CHUNK_HEADER + binLength);
  const view = new DataView(bytes.buffer);
  const words = [MAGIC, 2, bytes.length, jsonLength, JSON_CHUNK];
  words.forEach((word, i) => view.setUint32(4 * i, word, true));
  const jsonAt = HEADER + CHUNK_HEADER;
  bytes.fill(0x20, jsonAt, jsonAt + jsonLength);
  for (let i = 0; i < text.length; i++) bytes[jsonAt + i] = text.charCodeAt(i);
  view.setUint32(jsonAt + jsonLength, binLength, true);
  view.setUint32(jsonAt + jsonLength + 4, BIN_CHUNK, true);
  bytes.set(binary, jsonAt + jsonLength + CHUNK_HEADER);
  return bytes;
}

/** Chunks end on multiples of four bytes. */
function padded(length: number): number {
  return Math.ceil(length / 4) * 4;
}
