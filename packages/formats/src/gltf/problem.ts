import type { ErrorPlace, SlewcurveError } from '@slewcurve/core';
import type { FileProblem } from '../animation-file.js';
import type { Container } from './container.js';

export type Problem = FileProblem;

/** A fault at a JSON pointer that does not stop the reading. `what` goes on from the pointer. */
export function problem(
  container: Container,
  code: string,
  pointer: string,
  what: string,
  place: ErrorPlace = {},
): Problem {
  return {
    code,
    message: `${container.file}: ${pointer} ${what}`,
    place: { file: container.file, pointer, ...place },
  };
}

/** A thrown fault as one that does not stop the reading. */
export function problemOf(error: SlewcurveError, place: ErrorPlace): Problem {
  return { code: error.code, message: error.message, place: { ...error.place, ...place } };
}
