import { lineError } from '../text/text-fault.js';
import type { LinePlace } from '../text/text-fault.js';
import { type DecimalText, readDecimal } from '../text/decimal-text.js';
import type { TextLine } from '../text/text-lines.js';
import { decodeUtf8 } from '../utf8.js';
import { meaningOf } from './column-name.js';
import { type Separator, splitRows } from './split-rows.js';

/** What stands before the rows of a table. */
export interface TableHead {
  readonly separator: Separator;
  /** Undefined where nothing names the columns. */
  readonly names: readonly string[] | undefined;
  readonly namedAt: LinePlace | undefined;
  /** The line of the first row, and its cells. */
  readonly firstRow: LinePlace;
  readonly cells: number;
}

/** Takes the lines of a file one by one until the first row of numbers. */
export interface HeadReader {
  /** The head, once `line` is the first row. */
  take(line: TextLine): TableHead | undefined;
}

interface Named {
  readonly names: readonly string[];
  readonly line: LinePlace;
}

const SEPARATORS: readonly Separator[] = ['\t', ';', ',', ' '];
/** Lines of words before the first row: a file with more is prose. */
const MOST_WORDS = 64;

/**
 * Finds the first row (a line with two numbers or more), the separator that gives most numbers there, and the names of the columns:
 * the last line of words before it, or else the last comment that names a time and an orientation.
 *
 * @throws SlewcurveError `delimited.no-rows` where prose goes on and on
 */
export function headReader(file: string): HeadReader {
  const words: TextLine[] = [];
  let comment: Named | undefined;
  return {
    take(line) {
      if (isComment(line)) {
        comment = namesInComment(line) ?? comment;
        return undefined;
      }
      if (line.text.trim() === '') return undefined;
      const separator = separatorOf(line.text);
      if (separator === undefined) {
        words.push(line);
        if (words.length > MOST_WORDS)
          throw lineError(
            file,
            'delimited.no-rows',
            line,
            'no row of numbers has come yet; this is no table.',
          );
        return undefined;
      }
      const [row] = splitRows(file, [line], separator);
      const named = namesInWords(file, words, separator) ?? comment;
      return {
        separator,
        names: named?.names,
        namedAt: named?.line,
        firstRow: line,
        cells: row?.cells.length ?? 0,
      };
    },
  };
}

export function isComment({ text }: TextLine): boolean {
  return /^\s*#/.test(text);
}

function separatorOf(text: string): Separator | undefined {
  let best: Separator | undefined;
  let most = 1;
  for (const separator of SEPARATORS) {
    const numbers = text.split(separator === ' ' ? /\s+/ : separator).filter(isNumber).length;
    if (numbers <= most) continue;
    most = numbers;
    best = separator;
  }
  return best;
}

function isNumber(text: string): boolean {
  const read: DecimalText = { value: 0, decimals: 0 };
  return readDecimal(read, text.trim().replaceAll('"', ''));
}

/** The last line that has a name which means something, or else the last line. */
function namesInWords(file: string, words: readonly TextLine[], separator: Separator): Named | undefined {
  const rows = words.map((line) => {
    const [row] = splitRows(file, [readable(line)], separator);
    return { names: row?.cells ?? [], line };
  });
  return rows.findLast(({ names }) => names.some((name) => meaningOf(name))) ?? rows.at(-1);
}

function namesInComment(line: TextLine): Named | undefined {
  const text = readable(line)
    .text.replace(/^\s*#+\s*/, '')
    .replaceAll(/(?<!\s)\s+(?=[[(])/g, '');
  const separator = SEPARATORS.find((one) => text.includes(one)) ?? ' ';
  const names = text.split(separator === ' ' ? /\s+/ : separator).map((name) => name.trim());
  const kinds = new Set(names.map((name) => meaningOf(name)?.kind));
  kinds.delete(undefined);
  return kinds.has('time') && kinds.size > 1 ? { names, line } : undefined;
}

/** The line with its text as UTF-8 where it is that: names may have any letters. */
function readable(line: TextLine): TextLine {
  try {
    return { ...line, text: decodeUtf8(line.bytes) };
  } catch {
    return line;
  }
}
