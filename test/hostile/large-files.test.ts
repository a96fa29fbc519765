// What large files cost the real command, in a process of its own: memory is what it held at most (ru_maxrss).
import { spawnSync } from 'node:child_process';
import { closeSync, ftruncateSync, mkdtempSync, openSync, rmSync, writeFileSync, writeSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join, resolve } from 'node:path';
import * as fc from 'fast-check';
import { afterAll, describe, expect, test } from 'vitest';
import { generatedTake, THREE_MINUTES } from '../support/generated-take.js';
import { glb, oneTrack } from '../support/gltf-bytes.js';
import { measured } from '../support/measured.js';

/** `npm run long`. */
const LONG = fc.readConfigureGlobal()?.numRuns !== undefined;
const BIN = resolve('packages/cli/bin/slewcurve.js');
/** Tells the process's largest memory when it ends, kilobytes. */
const TELL = `data:text/javascript,${encodeURIComponent("process.on('exit', () => process.stderr.write(`most memory ${process.resourceUsage().maxRSS}\\n`));")}`;

const folder = mkdtempSync(join(tmpdir(), 'slewcurve-large-'));
afterAll(() => rmSync(folder, { recursive: true, force: true }));

function run(...words: string[]): { code: number | null; stdout: string; megabytes: number } {
  const { status, stdout, stderr } = spawnSync(process.execPath, ['--import', TELL, BIN, ...words], {
    cwd: folder,
    encoding: 'utf8',
    maxBuffer: 1 << 28,
  });
  const megabytes = Number(/most memory (\d+)/.exec(stderr)?.[1] ?? NaN) / 1024;
  measured(`slewcurve ${words.join(' ')}: ${megabytes.toFixed(0)} MB at most`);
  return { code: status, stdout, megabytes };
}

const MESH = 500_000_000;

/** A GLB whose mesh takes 500 MB of zeros that are a hole on disk, and whose one turn, with a pop, stands behind them. */
function writeHuge(name: string): void {
  const made = oneTrack(Array.from({ length: 30 }, (_, key) => (key === 15 ? 35 : key)));
  const bin = made.data.byteLength;
  const views = made.bufferViews.map((view) => ({ ...view, byteOffset: Number(view.byteOffset) + MESH }));
  const accessors = [
    ...made.accessors,
    {
      bufferView: views.length,
      componentType: 5126,
      type: 'VEC3',
      count: Math.floor(MESH / 12),
      min: [0, 0, 0],
      max: [0, 0, 0],
    },
  ];
  const small = glb({
    ...made.asset,
    accessors,
    bufferViews: [...views, { buffer: 0, byteLength: MESH }],
    buffers: [{ byteLength: MESH + bin }],
    meshes: [{ primitives: [{ attributes: { POSITION: made.accessors.length } }] }],
    nodes: [{ name: 'Mast', mesh: 0 }],
  });
  const head = Buffer.alloc(small.byteLength + 8);
  head.set(small);
  head.writeUInt32LE(head.byteLength + MESH + bin, 8);
  head.writeUInt32LE(MESH + bin, small.byteLength);
  head.writeUInt32LE(0x004e4942, small.byteLength + 4);
  const file = openSync(join(folder, name), 'w');
  writeSync(file, head);
  ftruncateSync(file, head.byteLength + MESH + bin);
  writeSync(file, made.data, 0, bin, head.byteLength + MESH);
  closeSync(file);
}

describe.skipIf(process.platform === 'win32')('a GLB of 500 MB with a mesh', () => {
  test('is opened by ranges: the command takes no more memory than for a small one', () => {
    writeHuge('huge.glb');
    const ran = run('check', 'huge.glb');
    expect(ran.code).toBe(1);
    expect(ran.stdout).toContain('jump.lone-key');
    // Node itself takes some 45 MB, the program 25; the file's 500 would be seen.
    expect(ran.megabytes).toBeLessThan(150);
  });

  test.skipIf(!LONG)('is written back in slices', () => {
    writeHuge('huge.glb');
    const ran = run('mend', 'huge.glb', '--proposed', '-o', 'mended.glb', '--undo-out', 'undo.json');
    expect(ran.code).toBe(0);
    expect(ran.megabytes).toBeLessThan(200);
    expect(run('mend', 'mended.glb', '--undo', 'undo.json', '-o', 'back.glb').megabytes).toBeLessThan(200);
    expect(spawnSync('cmp', [join(folder, 'huge.glb'), join(folder, 'back.glb')]).status).toBe(0);
  });
});

describe.skipIf(!LONG)('a take of 28 MB stays under 400 MB', () => {
  test('as GLB: 80 joints, 3 minutes, 120 Hz', () => {
    const pop = { joint: 40, frame: 9000, degrees: 5 };
    writeFileSync(join(folder, 'take.glb'), generatedTake({ ...THREE_MINUTES, pop }));
    for (const words of [
      ['check', 'take.glb'],
      ['survey', 'take.glb', '--format', 'json'],
      ['mend', 'take.glb', '--proposed', '-o', 'mended.glb', '--undo-out', 'undo.json'],
      ['mend', 'mended.glb', '--undo', 'undo.json', '-o', 'back.glb'],
    ])
      expect(run(...words).megabytes).toBeLessThan(400);
  });

  test('as BVH: 60 joints, 2½ minutes, 120 Hz', () => {
    const joints = Array.from({ length: 60 }, (_, i) => i);
    const head = `${joints
      .map(
        (i) =>
          `${i === 0 ? 'ROOT' : 'JOINT'} j${i}\n{\nOFFSET 0 1 0\nCHANNELS 3 Zrotation Xrotation Yrotation\n`,
      )
      .join('')}${'}\n'.repeat(joints.length)}`;
    const row = (k: number): string =>
      joints
        .map(
          (i) => `${(12 * Math.sin(k / 60 + i) + (k === 900 && i === 30 ? 5 : 0)).toFixed(4)} 0.0000 1.5000`,
        )
        .join(' ');
    const rows = Array.from({ length: 20_000 }, (_, k) => row(k)).join('\n');
    const text = `HIERARCHY\n${head}MOTION\nFrames: 20000\nFrame Time: 0.0083333333\n${rows}\n`;
    expect(text.length).toBeGreaterThan(24e6);
    writeFileSync(join(folder, 'take.bvh'), text);
    expect(run('check', 'take.bvh').megabytes).toBeLessThan(400);
    const mending = run('mend', 'take.bvh', '--proposed', '-o', 'mended.bvh', '--undo-out', 'undo.json');
    expect(mending.megabytes).toBeLessThan(400);
  });
});
