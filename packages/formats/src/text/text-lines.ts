import { SlewcurveError } from '@slewcurve/core';
import { readRange } from '../read-range.js';
import type { Source } from '../source.js';

// The web's own decoder; declared here because this package sees no DOM types.
declare class TextDecoder {
  constructor(label: 'latin1');
  decode(bytes: Uint8Array): string;
}

/** One line of a file, without what ends it. */
export interface TextLine {
  /** Counted from 1. */
  readonly number: number;
  /** Byte offset of its first letter in the file. */
  readonly at: number;
  readonly bytes: Uint8Array;
  /** One letter a byte, so that a letter's index is a byte's: ASCII is itself, anything else is not to be shown. */
  readonly text: string;
}

/** Bytes read at a time: a large file never stands in memory whole. */
const SLICE = 1 << 18;
/** A line beyond this is no line of numbers: it would have to stand in memory whole. */
const LONGEST_LINE = 1 << 24;

const LINE_FEED = 0x0a;
const CARRIAGE_RETURN = 0x0d;

/**
 * The lines of a file, some at a time, ended by LF, CRLF or CR. A byte order mark is passed over. What follows the last line end
 * is a line where there is anything.
 *
 * @throws SlewcurveError `text.long-line`, `source.short-read`
 */
export async function* textLines(source: Source, file: string): AsyncGenerator<readonly TextLine[], void> {
  let at = 0;
  let number = 1;
  while (at < source.size) {
    const bytes = await wholeLines(source, file, at, number);
    const lines = linesOf(bytes, at, number);
    at += bytes.byteLength;
    number += lines.length;
    yield lines;
  }
}

async function wholeLines(source: Source, file: string, at: number, line: number): Promise<Uint8Array> {
  for (let length = SLICE; ; length *= 2) {
    if (length > LONGEST_LINE)
      throw new SlewcurveError(
        'text.long-line',
        `${file}: line ${line} is longer than ${LONGEST_LINE} bytes; that is no line of numbers.`,
        { file, byte: at },
      );
    const rest = source.size - at;
    const bytes = await readRange(source, at, Math.min(length, rest), file);
    if (length >= rest) return bytes;
    const end = endOfLines(bytes);
    if (end > 0) return bytes.subarray(0, end);
  }
}

/** Where the last whole line ends; 0 where none does. A CR as the last byte may be half of a CRLF. */
function endOfLines(bytes: Uint8Array): number {
  const feed = bytes.lastIndexOf(LINE_FEED);
  if (feed >= 0) return feed + 1;
  const last = bytes.byteLength - 1;
  return bytes.lastIndexOf(CARRIAGE_RETURN, last - 1) + 1;
}

function linesOf(bytes: Uint8Array, at: number, first: number): TextLine[] {
  const text = new TextDecoder('latin1').decode(bytes);
  const lines: TextLine[] = [];
  const mark = at === 0 && bytes[0] === 0xef && bytes[1] === 0xbb && bytes[2] === 0xbf ? 3 : 0;
  const last = bytes.byteLength;
  let feed = nextOf(bytes, LINE_FEED, mark);
  let carriage = nextOf(bytes, CARRIAGE_RETURN, mark);
  for (let start = mark; start < last;) {
    const end = Math.min(feed, carriage);
    lines.push({
      number: first + lines.length,
      at: at + start,
      bytes: bytes.subarray(start, end),
      text: text.slice(start, end),
    });
    start = carriage + 1 === feed ? feed + 1 : end + 1;
    if (feed < start) feed = nextOf(bytes, LINE_FEED, start);
    if (carriage < start) carriage = nextOf(bytes, CARRIAGE_RETURN, start);
  }
  return lines;
}

/** Where the next such byte stands; the end where there is none. */
function nextOf(bytes: Uint8Array, byte: number, from: number): number {
  const at = bytes.indexOf(byte, from);
  return at < 0 ? bytes.byteLength : at;
}
