// How good the tests of the formulas are: flips one sign or constant at a time in a copy of the formula files, runs the tests
// that bear on it, and counts the mutants that no test notices. Part of `npm run long`; the result is test/data/mutants.json.
//
//   node .ci/mutants.mjs [--per-file 5] [--only quaternion/mean.ts] [--dry-run]
//   node .ci/mutants.mjs --again   tries those that went unnoticed once more: after tests were added
import { fork } from 'node:child_process';
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
import { availableParallelism, tmpdir } from 'node:os';
import path from 'node:path';
import ts from 'typescript';

const SOURCE = 'packages/core/src';
const FOLDERS = ['quaternion', 'quaternion/euler', 'curve', 'pace', 'measure', 'sampler'];
const RESULT = 'test/data/mutants.json';
/**
 * Tests that bear on a folder, tried first; then all of core's, and the references' for it.
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
const ALL = [
  'test/core/',
  'test/reference/conversions',
  'test/reference/curves',
  'test/reference/interpolation',
  'test/reference/kernels',
  'test/reference/slerp',
  'test/reference/smooth',
];
/** Milliseconds; longer than any of these runs take. A mutant that never ends is noticed too. */
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
 * Whether a number is the size or the first content of a store that is written before it is read, or the end of a view of which the
 * first numbers are read: no test can notice a greater one.
 *
 * @param {ts.Node} number
 */
function isRoom(number) {
  const { parent } = number;
  if (ts.isArrayLiteralExpression(parent)) return parent.elements.every((each) => each.getText() === '0');
  if (ts.isNewExpression(parent)) return parent.expression.getText().endsWith('Array');
  for (let at = number; !ts.isStatement(at); at = at.parent)
    if (ts.isCallExpression(at.parent) && /\.(?:subarray|slice)$/.test(at.parent.expression.getText()))
      return at === at.parent.arguments[1];
  return false;
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
    if (ts.isNumericLiteral(node) && !isRoom(node)) {
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

/**
 * A copy of the repository whose own packages are the copy's.
 *
 * @param {string} root
 * @param {number} number
 */
function copyRepository(root, number) {
  const copy = path.join(root, `repository-${number}`);
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
  return copy;
}

/**
 * @typedef {{ name: string, text: string, rounds: readonly (readonly string[])[] }} Order a text that takes a formula file's place, and
 * the tests to run round by round until one fails
 */

/** The process of one copy: does orders, says of each whether all tests passed. */
async function serveOrders() {
  const { createVitest } = await import('vitest/node');
  const vitest = await createVitest('test', {
    root: process.cwd(),
    project: ['node'],
    watch: false,
    bail: 1,
    reporters: [{}],
    maxWorkers: 1,
  });
  /** @param {readonly string[]} tests */
  const passes = async (tests) => {
    const specifications = await vitest.globTestSpecifications([...tests]);
    const { testModules, unhandledErrors } = await vitest.runTestSpecifications(specifications, false);
    return testModules.length > 0 && unhandledErrors.length === 0 && testModules.every((each) => each.ok());
  };
  process.on('message', (/** @type {Order} */ { name, text, rounds }) => {
    const target = path.resolve(SOURCE, name);
    const original = readFileSync(target, 'utf8');
    const work = async () => {
      writeFileSync(target, text);
      vitest.invalidateFile(target);
      for (const tests of rounds) if (!(await passes(tests))) return false;
      return true;
    };
    void work()
      .catch(() => false)
      .then((survives) => {
        writeFileSync(target, original);
        vitest.invalidateFile(target);
        process.send?.(survives);
      });
  });
}

/**
 * Does orders in a copy, one after the other. A process that does not answer is ended, and its mutant counts as noticed.
 *
 * @param {string} copy
 */
function lane(copy) {
  const start = () =>
    fork(path.resolve('.ci/mutants.mjs'), ['--orders'], { cwd: copy, detached: true, stdio: 'ignore' });
  let child = start();
  const stop = () => {
    if (child.pid !== undefined && child.exitCode === null) process.kill(-child.pid, 'SIGKILL');
  };
  /** @type {(order: Order) => Promise<boolean>} */
  const survives = (order) =>
    new Promise((resolve) => {
      const answer = (/** @type {boolean} */ value) => {
        clearTimeout(timer);
        child.removeAllListeners();
        resolve(value);
      };
      const again = () => {
        stop();
        const text = readFileSync(`${SOURCE}/${order.name}`, 'utf8');
        writeFileSync(path.join(copy, SOURCE, order.name), text);
        answer(false);
        child = start();
      };
      const timer = setTimeout(again, PATIENCE);
      child.once('message', answer);
      child.once('exit', again);
      child.send(order);
    });
  return { survives, stop };
}

/**
 * @typedef {{ perFile: number, results: { file: string, possible: number, unnoticed: { line: number, from: string, to: string }[] }[] }} Result
 */

/** @returns {Result} */
function earlierResult() {
  return JSON.parse(readFileSync(RESULT, 'utf8'));
}

/**
 * Whether a mutant went unnoticed, or may have: its file is not the one that was tried.
 *
 * @param {Result} earlier
 * @param {{ name: string, possible: number, line: number, from: string, to: string }} mutant
 */
function wasUnnoticed(earlier, { name, possible, line, from, to }) {
  const result = earlier.results.find(({ file }) => file === `${SOURCE}/${name}`);
  if (result?.possible !== possible) return true;
  return result.unnoticed.some((each) => each.line === line && each.from === from && each.to === to);
}

async function main() {
  const earlier = process.argv.includes('--again') ? earlierResult() : undefined;
  const perFile = earlier?.perFile ?? Number(option('--per-file', '5'));
  const only = option('--only', '');
  const files = FOLDERS.flatMap((folder) =>
    readdirSync(`${SOURCE}/${folder}`)
      .filter((name) => name.endsWith('.ts'))
      .map((name) => `${folder}/${name}`),
  ).filter((name) => name.includes(only));
  const mutants = files.flatMap((name) => {
    const text = readFileSync(`${SOURCE}/${name}`, 'utf8');
    const near = NEAR[name.split('/')[0] ?? ''] ?? ALL;
    const all = flips(text);
    return spread(all, perFile).map(({ start, end, from, to }) => ({
      name,
      possible: all.length,
      line: text.slice(0, start).split('\n').length,
      from,
      to,
      order: { name, text: `${text.slice(0, start)}${to}${text.slice(end)}`, rounds: [near, ALL] },
      survives: false,
    }));
  });
  const asked = mutants.filter((mutant) => !earlier || wasUnnoticed(earlier, mutant));
  console.log(`${asked.length} mutants of ${files.length} files`);
  const [first] = asked;
  if (process.argv.includes('--dry-run') || first === undefined) return 0;

  const root = mkdtempSync(path.join(tmpdir(), 'mutants-'));
  if (existsSync('../shared')) symlinkSync(path.resolve('../shared'), path.join(root, 'shared'));
  const lanes = Array.from({ length: availableParallelism() }, (_, i) => lane(copyRepository(root, i)));
  try {
    // Tests that fail without a mutant would count every mutant as noticed.
    const text = readFileSync(`${SOURCE}/${first.name}`, 'utf8');
    const rounds = [...Object.values(NEAR), ALL];
    if (!(await lanes[0].survives({ name: first.name, text, rounds })))
      throw new Error('The tests fail in the copy, without any mutant.');
    let next = 0;
    await Promise.all(
      lanes.map(async ({ survives }) => {
        for (let mutant = asked[next++]; mutant; mutant = asked[next++]) {
          mutant.survives = await survives(mutant.order);
          const { name, line, from, to } = mutant;
          if (mutant.survives) console.log(`${name}:${line}: ${to} for ${from} goes unnoticed`);
          if (next % 50 === 0) console.log(`${next} of ${asked.length} tried`);
        }
      }),
    );
  } finally {
    for (const { stop } of lanes) stop();
    rmSync(root, { recursive: true, force: true });
  }
  const results = files.map((name) => {
    const tried = mutants.filter((mutant) => mutant.name === name);
    const unnoticed = tried
      .filter(({ survives }) => survives)
      .map(({ line, from, to }) => ({ line, from, to }));
    return { file: `${SOURCE}/${name}`, possible: tried[0]?.possible ?? 0, tried: tried.length, unnoticed };
  });
  const missed = mutants.filter(({ survives }) => survives).length;
  const share = (mutants.length - missed) / mutants.length;
  console.log(
    `${mutants.length - missed} of ${mutants.length} mutants noticed: ${(100 * share).toFixed(1)} %`,
  );
  if (only === '') {
    const counts = { perFile, tried: mutants.length, noticed: mutants.length - missed, share };
    writeFileSync(RESULT, `${JSON.stringify({ ...counts, results }, null, 1)}\n`);
  }
  return share >= 0.95 ? 0 : 1;
}

if (process.argv.includes('--orders')) await serveOrders();
else process.exit(await main());
