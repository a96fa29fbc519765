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
  level: Problem['level'] = 'warning',
): Problem {
  return {
    code,
    level,
    message: `${container.file}: ${pointer} ${what}`,
    place: { file: container.file, pointer, ...place },
  };
}

/** A thrown fault as one that hides what it is about and does not stop the reading of the rest. */
export function problemOf(error: SlewcurveError, place: ErrorPlace): Problem {
  return { code: error.code, level: 'error', message: error.message, place: { ...error.place, ...place } };
}
