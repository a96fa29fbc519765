import type { FileProblem } from '../animation-file.js';
import { type DecimalText, readDecimal } from '../text/decimal-text.js';
import { lineError, lineProblem, quoted } from '../text/text-fault.js';
import { type NumberTable, numberTable } from '../text/number-table.js';
import type { TextLine } from '../text/text-lines.js';
import { findWords } from './row-words.js';

/** The rows of a MOTION: what they hold in the columns that were asked for. */
export interface Motion {
  /** Seconds from row to row, as written. */
  readonly frameTime: number;
  readonly frameTimeDecimals: number;
  readonly rows: number;
  /** Number of column number `column` of those asked for, in row `row`, as written. */
  value(row: number, column: number): number;
  /** Most decimal places that a column's numbers were written to, by column of those asked for. */
  readonly decimals: readonly number[];
}

/** Takes the lines after MOTION one by one. */
export interface MotionReader {
  take(line: TextLine): void;
  /** @throws SlewcurveError `bvh.truncated` */
  done(): Motion;
}

/**
 * Reads MOTION: `Frames:`, `Frame Time:`, then a row of numbers a frame.
 *
 * Faults throw with their line: `bvh.no-frame-time`, `bvh.frame-time`, `bvh.row-length`, `bvh.bad-number`. A header that counts
 * otherwise than the rows is a problem, `bvh.frame-count`; so is a last row that is cut, `bvh.cut-row`, which is left out.
 *
 * @param columns numbers that every row must have
 * @param wanted the columns that are kept, ascending
 */
export function motionReader(
  file: string,
  problems: FileProblem[],
  columns: number,
  wanted: readonly number[],
): MotionReader {
  const header = headerReader(file);
  const store = rowStore(file, columns, wanted);
  let cut: { readonly line: TextLine; readonly words: number } | undefined;
  return {
    take(line) {
      if (line.text.trim() === '') return;
      if (header.take(line)) return;
      if (cut) throw rowLength(file, cut.line, cut.words, columns);
      const words = store.take(line);
      if (words > columns) throw rowLength(file, line, words, columns);
      if (words < columns) cut = { line, words };
    },
    done() {
      const { frames, frameTime } = header.done();
      if (cut)
        problems.push(
          lineProblem(
            file,
            'bvh.cut-row',
            'warning',
            cut.line,
            `the last row has ${cut.words} numbers and the CHANNELS ask for ${columns}; it is left out.`,
          ),
        );
      if (frames && frames.count !== store.table.rows())
        problems.push(
          lineProblem(
            file,
            'bvh.frame-count',
            'note',
            frames.line,
            `Frames says ${frames.text} and ${store.table.rows()} rows follow; the rows are read.`,
          ),
        );
      return {
        frameTime: frameTime.value,
        frameTimeDecimals: frameTime.decimals,
        rows: store.table.rows(),
        value: (row, column) => store.table.value(row, column),
        decimals: store.decimals,
      };
    },
  };
}

function rowLength(file: string, line: TextLine, words: number, columns: number): Error {
  return lineError(
    file,
    'bvh.row-length',
    line,
    `the row has ${words} numbers and the CHANNELS ask for ${columns}. A frame is one line.`,
  );
}

interface Header {
  readonly frames: { readonly count: number; readonly text: string; readonly line: TextLine } | undefined;
  readonly frameTime: DecimalText;
}

/** Takes `Frames:` and `Frame Time:`; says false to the first row. */
function headerReader(file: string): { take(line: TextLine): boolean; done(): Header } {
  let frames: Header['frames'];
  let frameTime: DecimalText | undefined;
  let over = false;
  const whole = (): DecimalText => {
    if (frameTime) return frameTime;
    throw lineless(file, frames?.line);
  };
  return {
    take(line) {
      if (over) return false;
      const [, name, value = ''] = /^(frames|frame\s*time)\s*:(.*)$/i.exec(line.text.trim()) ?? [];
      const text = value.trim();
      if (name === undefined) {
        if (!frameTime)
          throw lineError(
            file,
            'bvh.no-frame-time',
            line,
            `${quoted(line.text.trim())} stands where Frames: or Frame Time: is expected.`,
          );
        over = true;
        return false;
      }
      if (name.toLowerCase() === 'frames') frames = { count: Number(text || NaN), text: quoted(text), line };
      else frameTime = frameTimeOf(file, line, text);
      return true;
    },
    done: () => ({ frames, frameTime: whole() }),
  };
}

function lineless(file: string, line: TextLine | undefined): Error {
  return lineError(
    file,
    'bvh.truncated',
    line ?? { number: 1, at: 0 },
    'the file ends before its Frame Time.',
  );
}

function frameTimeOf(file: string, line: TextLine, text: string): DecimalText {
  const read: DecimalText = { value: 0, decimals: 0 };
  if (readDecimal(read, text) && read.value > 0 && Number.isFinite(read.value)) return read;
  throw lineError(
    file,
    'bvh.frame-time',
    line,
    `Frame Time is ${quoted(text)}; it must be the seconds from frame to frame, more than 0.`,
  );
}

interface RowStore {
  readonly table: NumberTable;
  /** Takes a row where it is whole. Gives how many words it has. */
  take(line: TextLine): number;
  readonly decimals: readonly number[];
}

function rowStore(file: string, columns: number, wanted: readonly number[]): RowStore {
  const table = numberTable(wanted.length);
  const decimals = wanted.map(() => 0);
  const keep = new Int32Array(columns).fill(-1);
  wanted.forEach((column, i) => (keep[column] = i));
  const read: DecimalText = { value: 0, decimals: 0 };
  const found: number[] = [];

  function readWord(line: TextLine, column: number): void {
    const from = found[2 * column];
    const to = found[2 * column + 1];
    if (!readDecimal(read, line.text, from, to))
      throw lineError(
        file,
        'bvh.bad-number',
        line,
        `${quoted(line.text.slice(from, to))} stands in column ${column + 1}, which must hold a number.`,
      );
  }

  return {
    table,
    decimals,
    take(line) {
      const words = findWords(found, line.text);
      if (words !== columns) return words;
      const { piece, at } = table.add();
      for (let column = 0; column < columns; column++) {
        readWord(line, column);
        const kept = keep[column] ?? -1;
        if (kept < 0) continue;
        piece[at + kept] = read.value;
        if (read.decimals > (decimals[kept] ?? 0)) decimals[kept] = read.decimals;
      }
      return words;
    },
  };
}
