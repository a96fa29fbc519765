const ALPHABET = 'ABCDEFGHIJKLMNOPQRSTUVWXYZabcdefghijklmnopqrstuvwxyz0123456789+/';
const NOT_A_DIGIT = 255;
const PADDING = 61;

const DIGITS: Uint8Array = Uint8Array.from({ length: 128 }, (_, code) => {
  const digit = ALPHABET.indexOf(String.fromCharCode(code));
  return digit < 0 ? NOT_A_DIGIT : digit;
});

/**
 * Bytes of base64 text (RFC 4648 section 4; padding may be left out); undefined where the text is none.
 * Written here because `atob` takes a detour through a string of twice the size.
 */
export function decodeBase64(text: string): Uint8Array | undefined {
  let end = text.length;
  while (end > 0 && end > text.length - 2 && text.charCodeAt(end - 1) === PADDING) end--;
  if (end % 4 === 1 || (end !== text.length && text.length % 4 !== 0)) return undefined;
  const bytes = new Uint8Array(Math.floor((end * 3) / 4));
  let bits = 0;
  let held = 0;
  let at = 0;
  for (let i = 0; i < end; i++) {
    const code = text.charCodeAt(i);
    const digit = code < 128 ? (DIGITS[code] ?? NOT_A_DIGIT) : NOT_A_DIGIT;
    if (digit === NOT_A_DIGIT) return undefined;
    held = ((held << 6) | digit) & 0xffff;
    bits += 6;
    if (bits < 8) continue;
    bits -= 8;
    bytes[at++] = (held >> bits) & 255;
  }
  return bytes;
}

/** Base64 text of bytes, padded (RFC 4648 section 4). */
export function encodeBase64(bytes: Uint8Array): string {
  const parts: string[] = [];
  // 3,072 bytes a piece: a multiple of 3, so that no piece but the last is padded.
  for (let start = 0; start < bytes.length; start += 3072)
    parts.push(encodePiece(bytes.subarray(start, start + 3072)));
  return parts.join('');
}

function encodePiece(bytes: Uint8Array): string {
  let text = '';
  for (let i = 0; i < bytes.length; i += 3) {
    const left = bytes.length - i;
    const word = ((bytes[i] ?? 0) << 16) | ((bytes[i + 1] ?? 0) << 8) | (bytes[i + 2] ?? 0);
    text += ALPHABET.charAt(word >> 18) + ALPHABET.charAt((word >> 12) & 63);
    text += left > 1 ? ALPHABET.charAt((word >> 6) & 63) : '=';
    text += left > 2 ? ALPHABET.charAt(word & 63) : '=';
  }
  return text;
}
