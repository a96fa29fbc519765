import type { FileProblem } from '../animation-file.js';
import { type DecimalText, readDecimal } from '../text/decimal-text.js';
import { type NumberTable, numberTable } from '../text/number-table.js';
import { type LinePlace, lineError, lineProblem, quoted } from '../text/text-fault.js';
import type { TextLine } from '../text/text-lines.js';
import { type Layout } from './layout.js';
import { type Row, type Separator, splitRows } from './split-rows.js';
import { type Stamps, stampReader } from './stamps.js';

/** The rows of a table: their stamps, and the numbers of all bodies' columns in the order of the layout. */
export interface Rows {
  readonly stamps: Stamps;
  readonly numbers: NumberTable;
  /** Most decimal places of each of those columns. */
  readonly decimals: readonly number[];
}

export interface RowReader {
  take(lines: readonly TextLine[]): void;
  done(): Rows;
}

/** What is written where there was no sample. */
const MISSING = /^(?:|-+|\?|na|n\/a|none|null|missing)$/i;
/** A stamp beyond this, in seconds, is after the year 30,000: it is in another unit. */
const LATEST = 1e12;

/**
 * Reads the rows of a table. Missing numbers are NaN.
 *
 * Faults throw with their line: `delimited.row-length`, `delimited.bad-number`, `delimited.bad-time`, `delimited.time-unit`. A last
 * row that is cut is a problem, `delimited.cut-row`, and left out.
 *
 * @param width cells that every row must have
 */
export function rowReader(
  file: string,
  problems: FileProblem[],
  layout: Layout,
  separator: Separator,
  width: number,
): RowReader {
  const columns = layout.bodies.flatMap((body) => body.columns);
  const numbers = numberTable(columns.length);
  const decimals = columns.map(() => 0);
  const stamps = stampReader(layout.timePower ?? 0);
  const read: DecimalText = { value: 0, decimals: 0 };
  let cut: { readonly line: LinePlace; readonly cells: number } | undefined;

  function take(row: Row): void {
    if (cut) throw rowLength(file, cut.line, cut.cells, width);
    const cells = countOf(row, width);
    if (cells > width) throw rowLength(file, row.line, cells, width);
    if (cells < width) {
      cut = { line: row.line, cells };
      return;
    }
    takeStamp(file, stamps, layout, row);
    const { piece, at } = numbers.add();
    columns.forEach((column, i) => {
      const text = row.cells[column] ?? '';
      if (MISSING.test(text)) {
        piece[at + i] = NaN;
        return;
      }
      if (!readDecimal(read, text))
        throw lineError(
          file,
          'delimited.bad-number',
          row.line,
          `${quoted(text)} stands in column ${column + 1}, which must hold a number. Decimals are written with a point.`,
        );
      piece[at + i] = read.value;
      if (read.decimals > (decimals[i] ?? 0)) decimals[i] = read.decimals;
    });
  }

  return {
    take(lines) {
      for (const row of splitRows(file, lines, separator)) take(row);
    },
    done() {
      if (cut)
        problems.push(
          lineProblem(
            file,
            'delimited.cut-row',
            'warning',
            cut.line,
            `the last row has ${cut.cells} cells and the header names ${width}; it is left out.`,
          ),
        );
      return { stamps: stamps.done(), numbers, decimals };
    },
  };
}

/** Cells of a row; a separator at its end makes none. */
function countOf({ cells }: Row, width: number): number {
  let count = cells.length;
  while (count > width && cells[count - 1] === '') count--;
  return count;
}

function takeStamp(
  file: string,
  stamps: ReturnType<typeof stampReader>,
  layout: Layout,
  { line, cells }: Row,
): void {
  const text = cells[layout.time] ?? '';
  if (!stamps.add(text))
    throw lineError(
      file,
      'delimited.bad-time',
      line,
      `${quoted(text)} stands in column ${layout.time + 1}, which must hold the time.`,
    );
  if (layout.timePower === undefined && Math.abs(Number(text)) >= LATEST)
    throw lineError(
      file,
      'delimited.time-unit',
      line,
      `the time is ${quoted(text)}; as seconds that would be after the year 30000. Name its unit: timestamp_ns, timestamp_us or timestamp_ms.`,
    );
}

function rowLength(file: string, line: LinePlace, cells: number, width: number): Error {
  return lineError(
    file,
    'delimited.row-length',
    line,
    `the row has ${cells} cells and the header names ${width}. Correct whichever is wrong.`,
  );
}
