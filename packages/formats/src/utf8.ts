// The web's own decoder and encoder, present in browsers, workers and Node; declared here because this package sees no DOM types.
declare class TextDecoder {
  constructor(label: 'utf-8', options: { fatal: boolean; ignoreBOM: boolean });
  decode(bytes: Uint8Array): string;
}
declare class TextEncoder {
  encode(text: string): Uint8Array;
}

/** Text of UTF-8 bytes, without a byte order mark. Throws a TypeError on bytes that are no UTF-8. */
export function decodeUtf8(bytes: Uint8Array): string {
  return new TextDecoder('utf-8', { fatal: true, ignoreBOM: false }).decode(bytes);
}

export function encodeUtf8(text: string): Uint8Array {
  return new TextEncoder().encode(text);
}
