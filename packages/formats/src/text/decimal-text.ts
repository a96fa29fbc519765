/** A number as text wrote it. */
export interface DecimalText {
  value: number;
  /** Decimal places that it was written to: `1.50` has 2, `1.5e-3` has 4, `12` has none. */
  decimals: number;
}

// One way to match each text: a long one that fails, fails at once.
const DIGITS = /^[+-]?(?:\d+(?:\.(\d*))?|\.(\d+))(?:[eE]([+-]?\d+))?$/;
/** What programs write for a number that is none: C's and Python's words, and those of older C runtimes. */
const NO_NUMBER = /^[+-]?(?:nan(?:\(\w*\))?|1\.#(?:qnan|snan|ind)\d*)$/i;
const INFINITE = /^[+-]?(?:inf(?:inity)?|1\.#inf\d*)$/i;
/** 10^0 to 10^22 are exact in float64. */
const POWERS = Array.from({ length: 23 }, (_, power) => 10 ** power);
/** Places beyond this say nothing more: float64's smallest number is 4.9e-324. */
const MOST_PLACES = 350;

/**
 * Reads `text`, or the part of it up to but not including `to`, as one decimal number, `nan` or `inf`. False, with `out` as it was, where it is none.
 *
 * Up to 15 digits are taken as one whole number over a power of ten: both are exact, so their quotient is the nearest float64
 * (W. D. Clinger, "How to Read Floating Point Numbers Accurately", 1990). Anything else goes the long way.
 */
export function readDecimal(out: DecimalText, text: string, from = 0, to: number = text.length): boolean {
  return readShort(out, text, from, to) || readLong(out, text.slice(from, to));
}

function readShort(out: DecimalText, text: string, from: number, to: number): boolean {
  const first = text.charCodeAt(from);
  const signed = first === 0x2d || first === 0x2b;
  let whole = 0;
  let digits = 0;
  let point = -1;
  if (to - from > 17) return false;
  for (let i = signed ? from + 1 : from; i < to; i++) {
    const code = text.charCodeAt(i);
    if (code >= 0x30 && code <= 0x39) {
      whole = whole * 10 + (code - 0x30);
      digits++;
    } else if (code === 0x2e && point < 0) point = i;
    else return false;
  }
  if (digits === 0 || digits > 15) return false;
  out.decimals = point < 0 ? 0 : to - 1 - point;
  const size = whole / (POWERS[out.decimals] ?? 1);
  out.value = first === 0x2d ? -size : size;
  return true;
}

function readLong(out: DecimalText, text: string): boolean {
  const parts = DIGITS.exec(text);
  if (parts) {
    const places = (parts[1] ?? parts[2] ?? '').length - Number(parts[3] ?? 0);
    out.value = Number(text);
    out.decimals = Math.min(Math.max(places, 0), MOST_PLACES);
    return true;
  }
  const none = NO_NUMBER.test(text);
  if (!none && !INFINITE.test(text)) return false;
  out.value = none ? NaN : text.startsWith('-') ? -Infinity : Infinity;
  out.decimals = 0;
  return true;
}

/**
 * A new number written as the old one was: as many decimals (at least `decimals`, which the column has), the same sign and
 * exponent habits. `value` is finite.
 */
export function writeDecimal(old: string, value: number, decimals: number): string {
  const exponent = /[eE]([+-]?)(\d+)$/.exec(old);
  const text = exponent ? scientific(old, value, exponent) : value.toFixed(Math.min(decimals, 100));
  const unled = /^[+-]?\./.test(old) ? text.replace(/^(-?)0\./, '$1.') : text;
  return old.startsWith('+') && !unled.startsWith('-') ? `+${unled}` : unled;
}

function scientific(old: string, value: number, [, sign = '', power = '']: RegExpExecArray): string {
  const mantissa = /\.(\d*)/.exec(old)?.[1] ?? '';
  const [digits = '', exponent = '0'] = value.toExponential(Math.min(mantissa.length, 100)).split('e');
  const size = Math.abs(Number(exponent)).toString().padStart(power.length, '0');
  const minus = exponent.startsWith('-') ? '-' : sign === '-' || sign === '+' ? '+' : '';
  return `${digits}${old.includes('E') ? 'E' : 'e'}${minus}${size}`;
}
