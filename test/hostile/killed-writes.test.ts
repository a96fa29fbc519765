// The real command in a process of its own, killed while it writes: at every step that changes the disk, and at random moments.
import { spawn, spawnSync } from 'node:child_process';
import { mkdtempSync, readFileSync, readdirSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join, resolve } from 'node:path';
import * as fc from 'fast-check';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { glb, oneTrack } from '../support/gltf-bytes.js';
import { measured } from '../support/measured.js';
import { seededRandom } from '../support/seeded-random.js';

/** `npm run long`. */
const LONG = fc.readConfigureGlobal()?.numRuns !== undefined;
const BIN = resolve('packages/cli/bin/slewcurve.js');

/**
 * Runs before the command: counts what it does to the disk, says so for the first, and kills the process before step `DIE_AT`, after
 * half of what a write was to write. `DIE_AT=never` only counts; `NO_LINKS` is a disk that knows no second names.
 */
const WATCH = `data:text/javascript,${encodeURIComponent(`
import fs from 'node:fs';
import { syncBuiltinESMExports } from 'node:module';
let steps = 0;
const say = (text) => fs.writeSync(2, text + '\\n');
const step = (half) => {
  if (steps === 0) say('first step');
  if (String(steps++) === process.env.DIE_AT) { half?.(); process.kill(process.pid, 'SIGKILL'); }
};
const disk = fs.promises;
const { open, rename, link } = disk;
disk.rename = (...names) => { step(); return rename(...names); };
disk.link = (...names) => {
  if (process.env.NO_LINKS) return Promise.reject(Object.assign(new Error('no links'), { code: 'EPERM' }));
  step(); return link(...names);
};
disk.open = async (path, flags, ...more) => {
  if (flags !== 'wx') return open(path, flags, ...more);
  step();
  const handle = await open(path, flags, ...more);
  const own = { writeFile: handle.writeFile, sync: handle.sync, close: handle.close, chmod: handle.chmod };
  handle.writeFile = (bytes) => {
    step(() => fs.writeSync(handle.fd, bytes, 0, bytes.length >> 1));
    return own.writeFile.call(handle, bytes);
  };
  for (const name of ['sync', 'close', 'chmod'])
    handle[name] = (...words) => { step(); return own[name].call(handle, ...words); };
  return handle;
};
syncBuiltinESMExports();
process.on('exit', () => say('steps ' + steps));
`)}`;

const small = oneTrack(Array.from({ length: 30 }, (_, key) => (key === 15 ? 35 : key)));
const walk = glb(small.asset, small.data);
const folder = mkdtempSync(join(tmpdir(), 'slewcurve-killed-'));
afterAll(() => rmSync(folder, { recursive: true, force: true }));

interface Place {
  readonly path: (name: string) => string;
  /** Command words that write `target`. */
  readonly words: readonly string[];
  readonly target: string;
}

let mended: Uint8Array;

/** A folder with walk.glb and, for -o, a file that is to be written over. */
function place(name: string, mode: 'in place' | 'over another', old: Uint8Array): Place {
  const own = mkdtempSync(join(folder, `${name}-`));
  writeFileSync(join(own, 'walk.glb'), old);
  if (mode === 'over another') writeFileSync(join(own, 'out.glb'), 'what was there before');
  return {
    path: (file) => join(own, file),
    words: ['mend', 'walk.glb', '--proposed', ...(mode === 'in place' ? ['--in-place'] : ['-o', 'out.glb'])],
    target: mode === 'in place' ? 'walk.glb' : 'out.glb',
  };
}

function run(at: Place, dieAt: string, noLinks = false): { signal: string | null; steps: number } {
  const { signal, stderr } = spawnSync(process.execPath, ['--import', WATCH, BIN, ...at.words], {
    cwd: at.path('.'),
    encoding: 'utf8',
    env: { ...process.env, DIE_AT: dieAt, ...(noLinks && { NO_LINKS: '1' }) },
  });
  return { signal, steps: Number(/steps (\d+)/.exec(stderr)?.[1] ?? NaN) };
}

/** The file is the old one or the new one, every original is whole, and what was begun is under no name that anybody reads. */
function assertWhole(at: Place, before: Uint8Array, after: Uint8Array): 'old' | 'new' {
  const names = readdirSync(at.path('.'));
  const now = readFileSync(at.path(at.target));
  const isOld = now.equals(before);
  expect(isOld || now.equals(after)).toBe(true);
  const originals = names.filter((name) => name.startsWith('walk.original'));
  expect(originals.every((name) => readFileSync(at.path(name)).equals(before))).toBe(true);
  const known = /^(?:walk|out)\.glb$|^walk\.original(?:-\d+)?\.glb$|^\..*\.part$/;
  expect(names.filter((name) => !known.test(name))).toEqual([]);
  expect(isOld || at.target !== 'walk.glb' || originals.length === 1).toBe(true);
  return isOld ? 'old' : 'new';
}

const modes = ['in place', 'over another'] as const;

describe.skipIf(process.platform === 'win32')('the command killed before any step of a write', () => {
  beforeAll(() => {
    const at = place('whole', 'in place', walk);
    run(at, 'never');
    mended = readFileSync(at.path('walk.glb'));
  });

  test('writes another file of the same size when it is left alone', () => {
    expect(mended.byteLength).toBe(walk.byteLength);
    expect(Buffer.compare(mended, walk)).not.toBe(0);
  });

  // In place covers every kind of step; the other ways are gone through in the long run.
  const cases = [
    ['in place', false],
    ...(LONG
      ? ([
          ['in place', true],
          ['over another', false],
        ] as const)
      : []),
  ] as const;
  test.each(cases)('%s (a disk without second names: %s) leaves the old file or the new', (mode, noLinks) => {
    const { steps } = run(place('count', mode, walk), 'never', noLinks);
    // A new file, its bytes, its permissions, flush, close, rename; and the original's other name.
    expect(steps).toBeGreaterThanOrEqual(mode === 'in place' ? 7 : 6);
    const left = Array.from({ length: steps }, (_, step) => {
      const at = place(`step-${step}`, mode, walk);
      const before = readFileSync(at.path(at.target));
      expect(run(at, String(step), noLinks).signal).toBe('SIGKILL');
      return assertWhole(at, before, mended);
    });
    // The rename comes last.
    expect(left).toEqual(Array(steps).fill('old'));
  });
});

describe.skipIf(!LONG)('the command killed at 200 random moments of a write', () => {
  /** 40 MB, so that a write takes a while. */
  const MESH = 40_000_000;

  test.each(modes)('%s leaves the old file or the new one, never half of either', async (mode) => {
    const big = oneTrack(Array.from({ length: 30 }, (_, key) => (key === 15 ? 35 : key)));
    const image = big.view(new Uint8Array(MESH).fill(7));
    const asset = { ...big.asset, ...big.json, images: [{ bufferView: image, mimeType: 'image/png' }] };
    const old = glb(asset, big.data);
    const whole = place('big', mode, old);
    const longest = await killedAfter(whole, Infinity);
    const after = readFileSync(whole.path(whole.target));
    rmSync(whole.path('.'), { recursive: true });
    const random = seededRandom(5);
    const left = { old: 0, new: 0 };
    for (let n = 0; n < 100; n++) {
      const at = place('random', mode, old);
      const before = readFileSync(at.path(at.target));
      await killedAfter(at, random() * longest * 1.05);
      left[assertWhole(at, before, after)]++;
      rmSync(at.path('.'), { recursive: true });
    }
    measured(
      `killed, writing ${mode}: ${left.old} times the old file was left, ${left.new} times the new one`,
    );
    expect(left.old).toBeGreaterThan(0);
  });
});

/** Kills the command so many milliseconds after the first step of its write. Gives how long it ran from there. */
async function killedAfter(at: Place, milliseconds: number): Promise<number> {
  const child = spawn(process.execPath, ['--import', WATCH, BIN, ...at.words], {
    cwd: at.path('.'),
    env: { ...process.env, DIE_AT: 'never' },
  });
  let began = 0;
  child.stderr.on('data', (text: Buffer) => {
    if (began > 0 || !text.includes('first step')) return;
    began = performance.now();
    if (Number.isFinite(milliseconds)) setTimeout(() => child.kill('SIGKILL'), milliseconds);
  });
  await new Promise((done) => child.once('close', done));
  return performance.now() - began;
}
