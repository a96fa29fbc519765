import { SlewcurveError } from '@slewcurve/core';
import type { FileProblem } from '../animation-file.js';
import type { TextLine } from './text-lines.js';

/** Where a line stands. */
export type LinePlace = Pick<TextLine, 'number' | 'at'>;

/** A fault of one line that stops the reading. `what` goes on from "line 12". */
export function lineError(file: string, code: string, line: LinePlace, what: string): SlewcurveError {
  const { message, place } = lineProblem(file, code, 'error', line, what);
  return new SlewcurveError(code, message, place);
}

/** A fault of one line that does not stop the reading. `what` goes on from "line 12". */
export function lineProblem(
  file: string,
  code: string,
  level: FileProblem['level'],
  line: LinePlace,
  what: string,
): FileProblem {
  return {
    code,
    level,
    message: `${file}, line ${line.number}: ${what}`,
    place: { file, line: line.number, byte: line.at },
  };
}

/** A piece of a file for a message: short, and on one line. */
export function quoted(text: string): string {
  return JSON.stringify(text.length > 40 ? `${text.slice(0, 40)}…` : text);
}
