import type { PatchPlan, PatchRange } from '../patch-plan.js';
import { encodeUtf8 } from '../utf8.js';
import { writeDecimal } from './decimal-text.js';
import type { TextLine } from './text-lines.js';

/** A number of a row that is to be another. */
export interface CellChange {
  /** Which cell of the row. */
  readonly cell: number;
  readonly value: number;
  /** The number that stands there changes its sign alone, and keeps its digits. */
  readonly negated?: boolean;
  /** Decimal places that its column has. */
  readonly decimals: number;
  /** What stands there, for the docket. */
  readonly what: string;
}

/** Where a cell's text stands in its line. */
export interface Cell {
  readonly start: number;
  readonly end: number;
}

/**
 * New bytes for the changed cells of a line, and for nothing else: each is written as the old one was, and where numbers are padded
 * with spaces to columns, to the old width while there is room. Neighbouring changes of one `what` are one range.
 */
export function cellRanges(
  line: TextLine,
  cells: readonly Cell[],
  changes: readonly CellChange[],
): PatchRange[] {
  const ascending = [...changes];
  // oxlint-disable-next-line unicorn/no-array-sort -- our own list: sorted where it is, no copy
  ascending.sort((a, b) => a.cell - b.cell);
  const pieces: { start: number; end: number; text: string; cell: number; what: string }[] = [];
  for (const { cell, value, negated = false, decimals, what } of ascending) {
    const { start = 0, end = 0 } = cells[cell] ?? {};
    const old = line.text.slice(start, end);
    const text = negated ? negatedText(old) : writeDecimal(old, value, decimals);
    if (text === old) continue;
    const padded = inWidth(line.text, start, end, text);
    const open = pieces.at(-1);
    if (open && open.cell + 1 === cell && open.what === what) {
      open.text += line.text.slice(open.end, padded.start) + padded.text;
      open.end = end;
      open.cell = cell;
    } else pieces.push({ ...padded, end, cell, what });
  }
  return pieces.map(({ start, end, text, what }) => ({
    at: line.at + start,
    length: end - start,
    bytes: encodeUtf8(text),
    what,
  }));
}

/** The same digits with the other sign; zero has none. */
export function negatedText(text: string): string {
  if (Number(text) === 0) return text;
  if (text.startsWith('-')) return text.slice(1);
  return `-${text.replace(/^\+/, '')}`;
}

/** Two spaces or more between numbers, or before the first: a row that is padded to columns. */
const PADDED = /(?:^|\S) {2,}[^\s]/;

/** Takes from or gives to the spaces before a cell of a padded row, so that the next column stays where it is. */
function inWidth(line: string, start: number, end: number, text: string): { start: number; text: string } {
  let spaces = 0;
  while (line[start - spaces - 1] === ' ') spaces++;
  const first = start === spaces;
  if ((spaces === 0 && !first) || !PADDED.test(line)) return { start, text };
  const width = Math.max(end - start + spaces, text.length + (first ? 0 : 1));
  return { start: start - spaces, text: text.padStart(width, ' ') };
}

/** A frozen plan of ascending ranges over a file of `size` bytes. */
export function planOfRanges(ranges: readonly PatchRange[], size: number): PatchPlan {
  const grown = ranges.reduce((sum, { length, bytes }) => sum + bytes.byteLength - length, size);
  return Object.freeze({ ranges: Object.freeze([...ranges]), size: grown });
}
