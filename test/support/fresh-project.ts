import { execFileSync } from 'node:child_process';
import {
  mkdirSync,
  mkdtempSync,
  readdirSync,
  readFileSync,
  rmSync,
  symlinkSync,
  writeFileSync,
} from 'node:fs';
import { tmpdir } from 'node:os';
import { dirname, join, resolve } from 'node:path';
import { packPackages } from './packed.js';

/** A project of a stranger's that has the packages as npm would install them, and nothing of this repository's. */
export interface FreshProject {
  readonly folder: string;
  /** Writes a file and gives its path. */
  write(name: string, text: string): string;
  /** Runs Node in the project and gives what it prints. */
  node(...args: string[]): string;
  remove(): void;
}

/** Packs, unpacks and links; their dependencies come from this repository's own installation, as there may be no network. */
export function freshProject(): FreshProject {
  const folder = mkdtempSync(join(tmpdir(), 'slewcurve-fresh-'));
  const modules = join(folder, 'node_modules');
  for (const [name, tarball] of packPackages()) {
    const into = join(modules, '@slewcurve', name);
    mkdirSync(into, { recursive: true });
    execFileSync('tar', ['-xzf', tarball, '-C', into, '--strip-components=1']);
  }
  for (const name of [...dependencies(), ...OTHERS.flatMap(scoped)]) {
    mkdirSync(dirname(join(modules, name)), { recursive: true });
    symlinkSync(resolve('node_modules', name), join(modules, name));
  }
  writeFileSync(join(folder, 'package.json'), '{ "name": "fresh", "private": true }\n');
  return {
    folder,
    write(name, text) {
      const path = join(folder, name);
      mkdirSync(dirname(path), { recursive: true });
      writeFileSync(path, text);
      return path;
    },
    node: (...args) => execFileSync(process.execPath, args, { cwd: folder, encoding: 'utf8' }),
    remove: () => rmSync(folder, { recursive: true, force: true }),
  };
}

/** What a stranger's project may have besides: a scene, a compiler, types, and what `lit` itself brings. */
const OTHERS: readonly string[] = ['three', 'typescript', '@types', '@lit', 'lit-html', 'lit-element'];

/** What the packages say they need, ours left out. */
function dependencies(): string[] {
  const named = readdirSync('packages').flatMap((name) => {
    const manifest: { dependencies?: Record<string, string> } = JSON.parse(
      readFileSync(`packages/${name}/package.json`, 'utf8'),
    );
    return Object.keys(manifest.dependencies ?? {});
  });
  return [...new Set(named)].filter((name) => !name.startsWith('@slewcurve/'));
}

/** A package by its name, or every package of a scope. */
function scoped(name: string): string[] {
  const isScope = name.startsWith('@');
  return isScope ? readdirSync(join('node_modules', name)).map((one) => `${name}/${one}`) : [name];
}
