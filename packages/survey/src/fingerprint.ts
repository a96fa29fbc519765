// What ES2022 and every engine since 2016 have, though no library of TypeScript's but DOM declares it.
declare const TextEncoder: new () => { encode(text: string): Uint8Array };

/**
 * A finding's fingerprint: rule, clip and track, no time, no key number, no level. It must never change: files beside assets name it.
 */
export function findingFingerprint(rule: string, clip: string, track: string): string {
  return fnv1a64([rule, clip, track].join(SEPARATOR));
}

/**
 * An occurrence's fingerprint: that of its finding, its size to two significant digits, and by how many whole degrees the orientation
 * changes across the spot (its keys and three more on either side). The caller numbers equal ones.
 *
 * @param change degrees
 */
export function occurrenceFingerprint(
  rule: string,
  clip: string,
  track: string,
  size: number,
  change: number,
): string {
  return fnv1a64([rule, clip, track, size.toPrecision(2), change.toFixed(0)].join(SEPARATOR));
}

const UTF8 = new TextEncoder();

/** What no name in a file can be told apart by: ASCII's unit separator. */
const SEPARATOR = '\u001F';

/**
 * FNV-1a, 64 bit, over UTF-8, as 16 hexadecimal digits (G. Fowler, L. C. Noll, K.-P. Vo; draft-eastlake-fnv). In two 32-bit halves:
 * the prime is 2⁴⁰ + 435, so that hash·prime = (hash << 40) + 435·hash, and 435·2³² is exact in float64.
 */
export function fnv1a64(text: string): string {
  let high = 0xcbf29ce4;
  let low = 0x84222325;
  for (const byte of UTF8.encode(text)) {
    low = (low ^ byte) >>> 0;
    const product = low * 435;
    high = (Math.imul(high, 435) + Math.floor(product / 2 ** 32) + (low << 8)) >>> 0;
    low = product >>> 0;
  }
  return high.toString(16).padStart(8, '0') + low.toString(16).padStart(8, '0');
}
