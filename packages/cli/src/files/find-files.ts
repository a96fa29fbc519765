import { readdir, stat } from 'node:fs/promises';
import { join, resolve } from 'node:path';
import { SlewcurveError } from '@slewcurve/core';
import { matchesPattern } from '@slewcurve/mend';
import { glob, isGlob, type Glob } from './glob.js';

/** A file to look at. */
export interface FoundFile {
  /** As given or found, forward slashes: what reports call it. */
  readonly name: string;
  /** Bytes; 0 where there is no such file, which is for whoever opens it to say. */
  readonly size: number;
}

/** What a folder is searched for. Tables of text are taken by name or pattern: not every table is motion. */
const EXTENSIONS = /\.(?:glb|gltf|bvh)$/i;
/** Folders that nobody means. */
const PASSED_OVER = /^(?:\.|node_modules$)/;

/**
 * The files that words name: files, folders (searched through) and patterns. In the order of the words, those of one word sorted by
 * their names' code units, each file once: the same on every machine.
 *
 * @param leaveOut patterns of names that are not looked at
 * @param allowNoMatch whether a folder or pattern may have nothing for us
 * @throws SlewcurveError `usage.no-match`
 */
export async function findFiles(
  words: readonly string[],
  cwd: string,
  leaveOut: readonly string[],
  allowNoMatch: boolean,
): Promise<FoundFile[]> {
  const byPath = new Map<string, string>();
  for (const word of words) {
    const names = await namesOf(word, cwd);
    if (names.length === 0 && !allowNoMatch)
      throw new SlewcurveError(
        'usage.no-match',
        `Nothing fits ${word}: a folder is searched for .glb, .gltf and .bvh, tables of text are taken by name. With --allow-no-match that is no fault.`,
        { file: word },
      );
    for (const name of names) {
      const path = resolve(cwd, name);
      if (!byPath.has(path)) byPath.set(path, name);
    }
  }
  const kept = [...byPath].filter(([, name]) => !leaveOut.some((pattern) => matchesPattern(pattern, name)));
  return Promise.all(
    kept.map(async ([path, name]) => ({ name, size: (await stat(path).catch(() => undefined))?.size ?? 0 })),
  );
}

async function namesOf(word: string, cwd: string): Promise<string[]> {
  for (const name of new Set([word, slashed(word)])) {
    const found = await stat(resolve(cwd, name)).catch(() => undefined);
    if (found?.isDirectory()) return sorted(await inFolder(name, cwd));
    if (found) return [slashed(name)];
  }
  if (isGlob(word)) return sorted(await fitting(glob(word), cwd));
  return [slashed(word)];
}

async function inFolder(folder: string, cwd: string): Promise<string[]> {
  const root = slashed(folder).replace(/\/+$/, '') || '/';
  return (await below(root, cwd, Infinity)).filter((name) => EXTENSIONS.test(name));
}

async function fitting(pattern: Glob, cwd: string): Promise<string[]> {
  return (await below(pattern.root, cwd, pattern.depth)).filter((name) => pattern.matches(name));
}

/** Names of all files below a folder. Links to folders are not followed: they may lead back. */
async function below(folder: string, cwd: string, depth: number): Promise<string[]> {
  const entries = await readdir(resolve(cwd, folder), { withFileTypes: true }).catch(() => []);
  const names: string[] = [];
  for (const entry of entries) {
    const name = folder === '' ? entry.name : `${folder === '/' ? '' : folder}/${entry.name}`;
    if (entry.isDirectory()) {
      if (depth > 0 && !PASSED_OVER.test(entry.name)) names.push(...(await below(name, cwd, depth - 1)));
    } else if (entry.isFile() || (await leadsToFile(resolve(cwd, join(folder, entry.name)))))
      names.push(name);
  }
  return names;
}

async function leadsToFile(path: string): Promise<boolean> {
  return (await stat(path).catch(() => undefined))?.isFile() ?? false;
}

function sorted(names: readonly string[]): string[] {
  return names.toSorted((a, b) => (a < b ? -1 : 1));
}

function slashed(path: string): string {
  return path.replaceAll('\\', '/');
}
