import { decodeBase64 } from '../base64.js';

/** A `data:` URI in base64 (RFC 2397): its head, up to and with the comma, and its bytes. */
export interface DataUri {
  readonly head: string;
  readonly bytes: Uint8Array;
  /** Whether the payload is plain base64, so that four letters at 4n are bytes 3n to 3n + 2. */
  readonly plain: boolean;
}

export function isDataUri(uri: string): boolean {
  return /^data:/i.test(uri);
}

/** The parts of a base64 data URI; undefined where it is not in base64 or does not decode. */
export function parseDataUri(uri: string): DataUri | undefined {
  const comma = uri.indexOf(',');
  // The head is short in any sound file; a bound keeps a hostile one from being searched at length.
  if (comma < 0 || comma > 1024) return undefined;
  const head = uri.slice(0, comma + 1);
  if (!/;base64,$/i.test(head)) return undefined;
  const payload = uri.slice(comma + 1);
  const bytes = decodeBase64(payload);
  if (bytes) return { head, bytes, plain: true };
  const loosened = decodePercent(payload)?.replaceAll(/[\t\n\r ]/g, '');
  const found = loosened === undefined ? undefined : decodeBase64(loosened);
  return found && { head, bytes: found, plain: false };
}

function decodePercent(text: string): string | undefined {
  try {
    return decodeURIComponent(text);
  } catch {
    return undefined;
  }
}
