import papaparse from 'papaparse';
import { lineError } from '../text/text-fault.js';
import type { Cell } from '../text/cell-change.js';
import type { TextLine } from '../text/text-lines.js';

/** What stands between the cells of a row. A space stands for any run of spaces and tabs. */
export type Separator = ',' | ';' | '\t' | ' ';

/** A line with the texts of its cells; quotes are taken off and spaces around a cell. */
export interface Row {
  readonly line: TextLine;
  readonly cells: readonly string[];
}

const ALL_SPACES = /[\t\v\f]/g;

/**
 * Splits lines into cells. papaparse does the splitting, by RFC 4180's rules for quotes.
 *
 * @param lines no empty ones; a cell may not go on in the next line
 * @throws SlewcurveError `delimited.bad-quotes`
 */
export function splitRows(file: string, lines: readonly TextLine[], separator: Separator): Row[] {
  if (lines.length === 0) return [];
  for (const line of lines) checkQuotes(file, line);
  const text = lines.map((line) => splittable(line, separator)).join('\n');
  const { data, errors } = papaparse.parse(text, { delimiter: separator, newline: '\n', quoteChar: '"' });
  const wrong = errors.find(({ type }) => type === 'Quotes');
  const faulty = wrong ? lines[wrong.row ?? 0] : lines[data.length === lines.length ? -1 : 0];
  if (faulty) throw badQuotes(file, faulty);
  return lines.map((line, i) => {
    const cells = (data[i] ?? []).map((cell) => cell.trim());
    return { line, cells: separator === ' ' ? cells.filter((cell) => cell !== '') : cells };
  });
}

function splittable(line: TextLine, separator: Separator): string {
  // Letter for letter, so that places in the text stay places in the line.
  return separator === ' ' ? line.text.replace(ALL_SPACES, ' ') : line.text;
}

function checkQuotes(file: string, line: TextLine): void {
  if (!line.text.includes('"')) return;
  if ((line.text.split('"').length - 1) % 2 === 1) throw badQuotes(file, line);
}

function badQuotes(file: string, line: TextLine): Error {
  return lineError(
    file,
    'delimited.bad-quotes',
    line,
    'a quote is not closed, or stands inside a cell; quotes go round a whole cell, and a cell ends on its line.',
  );
}

/** Where the cells of a row stand in its line, quotes and spaces around them left out. */
export function cellsOf({ line, cells }: Row, separator: Separator): Cell[] {
  const text = splittable(line, separator);
  let at = 0;
  return cells.map((cell) => {
    if (separator === ' ') while (text[at] === ' ') at++;
    const quoted = text[at] === '"';
    const raw = quoted ? cell.replaceAll('"', '""') : cell;
    const start = text.indexOf(raw, quoted ? at + 1 : at);
    const end = start + raw.length;
    const next = text.indexOf(separator, quoted ? text.indexOf('"', end) : end);
    at = next < 0 ? text.length : next + 1;
    return { start, end };
  });
}
