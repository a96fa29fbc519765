import { SlewcurveError } from '@slewcurve/core';
import type { Container } from './container.js';
import type { Problem } from './problem.js';

/** Collects what is wrong with a file. */
export interface Problems {
  push(...more: readonly Problem[]): void;
}

/** More than this nobody reads; a hostile file of a few megabytes could have a million. */
const MOST = 1000;

/** A file with more faults than this is no animation; going on would take long and tell nothing. */
const HOPELESS = 20_000;

/**
 * Keeps the first thousand problems and counts the others. What hides a whole file's rotations is always kept.
 *
 * @throws SlewcurveError `gltf.too-broken` from `push`
 */
export function problemList({ file }: Container): Problems & { readonly all: () => Problem[] } {
  const kept: Problem[] = [];
  let more = 0;
  let hidden = false;
  return {
    push(...problems) {
      for (const problem of problems) {
        const hides = problem.code === 'gltf.needs-extension';
        if (kept.length < MOST || (hides && !hidden)) kept.push(problem);
        else more++;
        if (more > HOPELESS) throw tooBroken(file);
        hidden ||= hides;
      }
    },
    all: () =>
      more === 0
        ? kept
        : [
            ...kept,
            {
              code: 'gltf.more-problems',
              level: 'warning',
              message: `${file}: ${more} more problems of the same kinds.`,
              place: { file },
            },
          ],
  };
}

function tooBroken(file: string): SlewcurveError {
  return new SlewcurveError(
    'gltf.too-broken',
    `${file}: more than ${HOPELESS} things are wrong with it; it is damaged or no animation. Export it again.`,
    { file },
  );
}
