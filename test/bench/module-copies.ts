import { cpSync, mkdirSync } from 'node:fs';
import { basename, dirname, join } from 'node:path';
import { fileURLToPath } from 'node:url';
import type * as core from '@slewcurve/core';
import type * as samplers from '@slewcurve/core/sampler';
import type { quat } from 'gl-matrix';
import type { Quaternion, QuaternionLinearInterpolant } from 'three';

/*
 * Every contender runs code of its own: a loop that meets two kinds of array is compiled for both and is slower for each. A copy
 * of the built package, or of the part of a library that is measured, keeps them apart.
 */

const copies = join(dirname(fileURLToPath(import.meta.url)), 'copies');

export type Core = typeof core & typeof samplers;

/** A copy of core as it was built. */
export async function coreCopy(tag: string): Promise<Core> {
  const at = copy(folderOf('@slewcurve/core'), `core-${tag}`);
  return { ...(await import(join(at, 'index.js'))), ...(await import(join(at, 'sampler/index.js'))) };
}

/** A copy of gl-matrix's quaternion functions, from its ES modules, which are what a bundler takes. */
export async function glMatrixCopy(tag: string): Promise<typeof quat> {
  const at = copy(join(folderOf('gl-matrix'), '../esm'), `gl-matrix-${tag}`);
  return import(join(at, 'quat.js'));
}

/** What is measured of three. Its own types ask for `number[]` where it takes any array. */
export interface Three {
  readonly Quaternion: typeof Quaternion & {
    slerpFlat(
      out: Float32Array,
      at: number,
      a: Float32Array,
      aAt: number,
      b: Float32Array,
      bAt: number,
      t: number,
    ): void;
  };
  readonly QuaternionLinearInterpolant: typeof QuaternionLinearInterpolant;
}

/** A copy of three's quaternion and its interpolant, from its sources. */
export async function threeCopy(tag: string): Promise<Three> {
  const parts = ['src', 'math', 'interpolants', 'utils.js', 'constants.js'];
  const at = copy(folderOf('three/src/utils.js'), `three-${tag}`, parts);
  return {
    ...(await import(join(at, 'math/Quaternion.js'))),
    ...(await import(join(at, 'math/interpolants/QuaternionLinearInterpolant.js'))),
  };
}

function folderOf(specifier: string): string {
  return dirname(fileURLToPath(import.meta.resolve(specifier)));
}

let loaded = 0;

/** A module of this folder, loaded anew: the loop of a contender, too, must not be compiled for what another one calls. */
export function again<M>(path: string): Promise<M> {
  return import(new URL(`${path}?${loaded++}`, import.meta.url).href);
}

/** Whole, or of its folders and top files only the named `parts`. */
function copy(from: string, name: string, parts?: readonly string[]): string {
  const to = join(copies, name);
  mkdirSync(copies, { recursive: true });
  const wanted = (path: string): boolean =>
    parts === undefined || parts.includes(basename(path)) || parts.includes(basename(dirname(path)));
  cpSync(from, to, { recursive: true, filter: (path) => wanted(path) });
  return to;
}
