// How good the tests of the formulas are: flips one sign or constant at a time in a copy of the formula files, runs the tests
// that bear on it, and counts the mutants that no test notices. Part of `npm run long`; the result is test/data/mutants.json.
//
//   node .ci/mutants.mjs [--per-file 5] [--only quaternion/mean.ts] [--dry-run]
import { spawnSync } from 'node:child_process';
import {
  cpSync,
  existsSync,
  mkdirSync,
  mkdtempSync,
  readdirSync,
  readFileSync,
  rmSync,
  symlinkSync,
  writeFileSync,
} from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import ts from 'typescript';

const SOURCE = 'packages/core/src';
const FOLDERS = ['quaternion', 'quaternion/euler', 'curve', 'pace', 'measure', 'sampler'];
const RESULT = 'test/data/mutants.json';
/**
 * Tests that bear on a folder, tried after the file's own; then all of core's and the references'.
 *
 * @type {Readonly<Record<string, readonly string[]>>}
 */
const NEAR = {
  quaternion: ['test/core/quaternion', 'test/reference/conversions', 'test/reference/kernels'],
  curve: [
    'test/core/curve',
    'test/core/playback',
    'test/reference/curves',
    'test/reference/interpolation',
    'test/reference/smooth',
  ],
  pace: ['test/core/pace'],
  measure: ['test/core/measure'],
  sampler: ['test/core/sampler'],
};
/** @type {Readonly<Record<string, string>>} */
const OTHER = { '+': '-', '-': '+', '*': '/', '/': '*', '+=': '-=', '-=': '+=' };
const ALL = ['test/core/', 'test/reference/'];
/** Longer than any of these runs take; a mutant that never ends is noticed too. */
const PATIENCE = 300_000;

/**
 * @param {string} name
 * @param {string} fallback
 */
function option(name, fallback) {
  const at = process.argv.indexOf(name);
  return at < 0 ? fallback : (process.argv[at + 1] ?? fallback);
}

/**
 * Every flip of a sign or constant in a text: where it stands, what was there, what comes instead.
 *
 * @param {string} source
 */
function flips(source) {
  const file = ts.createSourceFile('formula.ts', source, ts.ScriptTarget.Latest, true);
  /** @type {{ start: number, end: number, from: string, to: string }[]} */
  const found = [];
  /** @type {(node: ts.Node, to: string) => void} */
  const flip = (node, to) =>
    void found.push({ start: node.getStart(), end: node.end, from: node.getText(), to });
  /** @type {(node: ts.Node) => void} */
  const visit = (node) => {
    if (ts.isTypeNode(node)) return;
    if (ts.isBinaryExpression(node)) {
      const other = OTHER[node.operatorToken.getText()];
      const words = ts.isStringLiteralLike(node.left) || ts.isStringLiteralLike(node.right);
      if (other && !words) flip(node.operatorToken, other);
    }
    if (ts.isPrefixUnaryExpression(node) && node.operator === ts.SyntaxKind.MinusToken)
      found.push({ start: node.getStart(), end: node.operand.getStart(), from: '-', to: '' });
    if (ts.isNumericLiteral(node)) {
      const value = Number(node.getText());
      flip(node, Number.isInteger(value) ? String(value + 1) : String(value * 1.1));
    }
    ts.forEachChild(node, visit);
  };
  visit(file);
  return found;
}

/**
 * `count` of the list, evenly spread over it.
 *
 * @template T
 * @param {readonly T[]} list
 * @param {number} count
 * @returns {readonly T[]}
 */
function spread(list, count) {
  if (list.length <= count) return list;
  return list.filter(
    (_, i) => Math.floor(((i + 1) * count) / list.length) > Math.floor((i * count) / list.length),
  );
}

/** A copy of the repository whose own packages are the copy's. */
function copyRepository() {
  const root = mkdtempSync(path.join(tmpdir(), 'mutants-'));
  const copy = path.join(root, 'repository');
  mkdirSync(path.join(copy, 'node_modules/@slewcurve'), { recursive: true });
  for (const name of ['package.json', 'tsconfig.json', 'vite.config.ts', '.ci', 'packages', 'test'])
    cpSync(name, path.join(copy, name), {
      recursive: true,
      filter: (from) => !/\/(dist|node_modules)$/.test(from),
    });
  for (const name of readdirSync('node_modules'))
    if (name !== '@slewcurve' && !name.startsWith('.'))
      symlinkSync(path.resolve('node_modules', name), path.join(copy, 'node_modules', name));
  for (const name of readdirSync('packages'))
    symlinkSync(path.join(copy, 'packages', name), path.join(copy, 'node_modules/@slewcurve', name));
  if (existsSync('../shared')) symlinkSync(path.resolve('../shared'), path.join(root, 'shared'));
  return { root, copy };
}

/**
 * Whether the tests pass in the copy.
 *
 * @param {string} copy
 * @param {readonly string[]} tests
 */
function passes(copy, tests) {
  const vitest = path.resolve('node_modules/vitest/vitest.mjs');
  const run = ['run', '--project', 'node', '--bail', '1', '--reporter', 'dot', ...tests];
  return (
    spawnSync(process.execPath, [vitest, ...run], { cwd: copy, timeout: PATIENCE, stdio: 'ignore' })
      .status === 0
  );
}

const perFile = Number(option('--per-file', '5'));
const only = option('--only', '');
const files = FOLDERS.flatMap((folder) =>
  readdirSync(`${SOURCE}/${folder}`)
    .filter((name) => name.endsWith('.ts'))
    .map((name) => `${folder}/${name}`),
).filter((name) => name.includes(only));
const work = files.map((name) => {
  const text = readFileSync(`${SOURCE}/${name}`, 'utf8');
  return { name, text, all: flips(text) };
});
if (process.argv.includes('--dry-run')) {
  for (const { name, all } of work) console.log(name, all.length);
  process.exit(0);
}

const { root, copy } = copyRepository();
const results = [];
try {
  // Tests that fail without a mutant would count every mutant as noticed.
  const folders = new Set(work.map(({ name }) => name.split('/')[0]));
  for (const folder of folders)
    if (!passes(copy, NEAR[folder ?? ''] ?? ALL))
      throw new Error(`The tests of ${folder} fail in the copy, without any mutant.`);
  if (!passes(copy, ALL)) throw new Error('The tests fail in the copy, without any mutant.');
  for (const { name, text, all } of work) {
    const near = NEAR[name.split('/')[0] ?? ''] ?? ALL;
    const target = path.join(copy, SOURCE, name);
    const own = `test/core/${name.replace(/\.ts$/, '.test.ts')}`;
    // The quickest first: most mutants are noticed by the test of their own file.
    const rounds = [...(existsSync(path.join(copy, own)) ? [[own]] : []), near, ALL];
    const tried = spread(all, perFile);
    const unnoticed = [];
    for (const { start, end, from, to } of tried) {
      writeFileSync(target, `${text.slice(0, start)}${to}${text.slice(end)}`);
      const survives = rounds.every((tests) => passes(copy, tests));
      if (!survives) continue;
      const line = text.slice(0, start).split('\n').length;
      unnoticed.push({ line, from, to });
      console.log(`${name}:${line}: ${to} for ${from} goes unnoticed`);
    }
    writeFileSync(target, text);
    if (tried.length > 0)
      results.push({ file: `${SOURCE}/${name}`, possible: all.length, tried: tried.length, unnoticed });
    console.log(`${name}: ${tried.length - unnoticed.length} of ${tried.length} noticed`);
  }
} finally {
  rmSync(root, { recursive: true, force: true });
}
const tried = results.reduce((sum, { tried: count }) => sum + count, 0);
const missed = results.reduce((sum, { unnoticed }) => sum + unnoticed.length, 0);
const share = tried > 0 ? (tried - missed) / tried : 1;
console.log(`${tried - missed} of ${tried} mutants noticed: ${(100 * share).toFixed(1)} %`);
if (only === '')
  writeFileSync(
    RESULT,
    `${JSON.stringify({ perFile, tried, noticed: tried - missed, share, results }, null, 1)}\n`,
  );
process.exit(share >= 0.95 ? 0 : 1);
