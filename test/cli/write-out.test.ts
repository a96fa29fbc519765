import { execFileSync } from 'node:child_process';
import {
  appendFileSync,
  chmodSync,
  mkdirSync,
  readFileSync,
  readdirSync,
  renameSync,
  rmSync,
  statSync,
  symlinkSync,
  writeFileSync,
} from 'node:fs';
import { main } from '@slewcurve/cli';
import { describe, expect, test } from 'vitest';
import { aboutZ, glb, gltf, oneTrack, Packer } from '../support/gltf-bytes.js';
import { commandFolder } from '../support/run-command.js';

/** A pop of 20° in one key. */
const made = oneTrack(Array.from({ length: 30 }, (_, key) => (key === 15 ? 35 : key)));
const walk = glb(made.asset, made.data);

async function withWalk(): ReturnType<typeof commandFolder> {
  const at = await commandFolder();
  writeFileSync(at.path('walk.glb'), walk);
  return at;
}

/** Somebody else's bytes of the same length. */
const other = walk.with(walk.length - 1, 1);

const MENDING = [['--in-place'], ['-o', 'out.glb']];
/** What somebody else does to a file. */
const CHANGES: [string, (path: string) => void][] = [
  ['written over in place', (path) => writeFileSync(path, other)],
  [
    'another file under its name',
    (path) => {
      writeFileSync(`${path}.new`, other);
      renameSync(`${path}.new`, path);
    },
  ],
  ['longer', (path) => appendFileSync(path, 'more')],
  ['gone', (path) => rmSync(path)],
];

describe('a file that somebody else changes while it is mended', () => {
  test.each(CHANGES.flatMap(([how, change]) => MENDING.map((flags) => [how, flags, change] as const)))(
    '%s: %j writes nothing',
    async (_, flags, change) => {
      const { folder, path } = await withWalk();
      let stderr = '';
      let left: string[] = [];
      const code = await main(['mend', 'walk.glb', '--proposed', ...flags], {
        stdout: { write: () => undefined },
        stderr: {
          // What is going to change is said before anything is written.
          write: (text) => {
            if (stderr === '') {
              change(path('walk.glb'));
              left = contents(folder);
            }
            stderr += text;
          },
        },
        cwd: () => folder,
      });
      expect([code, stderr]).toEqual([2, expect.stringContaining('file.changed')]);
      expect(contents(folder)).toEqual(left);
    },
  );
});

function contents(folder: string): string[] {
  return readdirSync(folder).map((name) => `${name} ${readFileSync(`${folder}/${name}`, 'base64')}`);
}

describe('a written file', () => {
  test('keeps its permissions', async () => {
    const { path, run } = await withWalk();
    chmodSync(path('walk.glb'), 0o640);
    await run('mend', 'walk.glb', '--proposed', '--in-place');
    expect(statSync(path('walk.glb')).mode & 0o777).toBe(0o640);
    expect(readFileSync(path('walk.glb')).equals(walk)).toBe(false);
  });

  test('is the one that a link leads to; the link stays', async () => {
    const { folder, path, run } = await withWalk();
    mkdirSync(path('shown'));
    symlinkSync('../walk.glb', path('shown/link.glb'));
    await run('mend', 'shown/link.glb', '--proposed', '--in-place');
    expect(readdirSync(folder).toSorted()).toEqual(['shown', 'walk.glb', 'walk.original.glb']);
    expect(readdirSync(path('shown'))).toEqual(['link.glb']);
    expect(readFileSync(path('shown/link.glb')).equals(readFileSync(path('walk.glb')))).toBe(true);
    expect(readFileSync(path('walk.original.glb')).equals(walk)).toBe(true);
  });

  test('never takes the place of what is no file', async () => {
    const { folder, path, run } = await withWalk();
    mkdirSync(path('out.glb'));
    const ran = await run('mend', 'walk.glb', '--proposed', '-o', 'out.glb');
    expect([ran.code, ran.stderr]).toEqual([2, expect.stringContaining('file.unwritable')]);
    expect(readdirSync(folder)).toEqual(['out.glb', 'walk.glb']);
    const device = await run('mend', 'walk.glb', '--proposed', '-o', '/dev/null');
    expect([device.code, device.stderr]).toEqual([2, expect.stringContaining('is not a file')]);
    expect(statSync('/dev/null').isCharacterDevice()).toBe(true);
  });

  test('is never one that is read, nor two things at once', async () => {
    const { path, run } = await commandFolder();
    const buffers = [{ byteLength: made.data.byteLength, uri: 'walk.bin' }];
    writeFileSync(path('walk.gltf'), gltf({ ...made.asset, buffers }));
    writeFileSync(path('walk.bin'), made.data);
    for (const [flags, code] of [
      [['-o', './walk.gltf'], 'mend.over-input'],
      [['-o', 'walk.bin'], 'mend.over-input'],
      [['-o', 'out.gltf', '--undo-out', 'walk.gltf'], 'mend.over-input'],
      [['-o', 'out.gltf', '--card-out', 'walk.bin'], 'mend.over-input'],
      [['-o', 'out.gltf', '--undo-out', './out.gltf'], 'usage.same-output'],
    ] as const) {
      const ran = await run('mend', 'walk.gltf', '--proposed', ...flags);
      expect([ran.code, ran.stderr]).toEqual([2, expect.stringContaining(code)]);
    }
    expect(readFileSync(path('walk.bin')).equals(made.data)).toBe(true);
    expect(readFileSync(path('walk.gltf'), 'utf8')).toContain('walk.bin');
  });
});

test.skipIf(process.platform === 'win32')('a pipe and a device are refused, not waited for', async () => {
  const { path, run } = await commandFolder();
  execFileSync('mkfifo', [path('walk.glb')]);
  for (const name of ['walk.glb', '/dev/zero'])
    expect(await run('check', name)).toMatchObject({
      code: 2,
      stdout: expect.stringContaining('file.unreadable'),
    });
});

describe('what a plan changes', () => {
  test('is told range by range where it is little', async () => {
    const { run } = await withWalk();
    const { stderr } = await run('mend', 'walk.glb', '--proposed', '--dry-run');
    expect(stderr).toMatch(/^walk\.glb: bytes \d+ to \d+ become 16: Turn Mast: values of key 15\n$/);
  });

  test('is told in a few lines where it is much: a track a line, then the rest', async () => {
    const { path, run } = await commandFolder();
    const rows = Array.from({ length: 40 }, (_, k) => `${k * 9}.0 ${k % 7 === 0 ? 3 : 0.5 * k} 0.0`);
    writeFileSync(
      path('boom.bvh'),
      `HIERARCHY\nROOT Mast\n{\nOFFSET 0 0 0\nCHANNELS 3 Zrotation Xrotation Yrotation\n}\nMOTION\nFrames: 40\nFrame Time: 0.04\n${rows.join('\n')}\n`,
    );
    const keys = Array.from({ length: 32 }, (_, i) => i + 4);
    const steps = [{ verb: 'bridge', clip: 'MOTION', track: 'Mast', keys }];
    writeFileSync(path('card.json'), JSON.stringify({ schemaVersion: 1, steps }));
    const { stderr } = await run('mend', 'boom.bvh', '--card', 'card.json', '--dry-run');
    expect(stderr.split('\n').filter((line) => line.includes('bytes'))).toEqual([
      expect.stringMatching(
        /^boom\.bvh: \d+ ranges between bytes \d+ and \d+, \d+ bytes in all, become \d+: Mast$/,
      ),
    ]);
  });

  test('of a hundred tracks is told in 24 lines', async () => {
    const { path, run } = await commandFolder();
    const packer = new Packer();
    const input = packer.add('SCALAR', [0, 1, 2]);
    const outputs = Array.from({ length: 100 }, () => packer.add('VEC4', [0, 10, 20].flatMap(aboutZ)));
    const asset = {
      ...packer.json,
      nodes: outputs.map((_, node) => ({ name: `Mast${node}` })),
      animations: [
        {
          name: 'Turn',
          channels: outputs.map((_, node) => ({ sampler: node, target: { node, path: 'rotation' } })),
          samplers: outputs.map((output) => ({ input, output })),
        },
      ],
    };
    writeFileSync(path('masts.glb'), glb(asset, packer.data));
    const steps = [{ verb: 'reverse', clip: 'Turn', track: '*', span: [0, 2], with: 'track' }];
    writeFileSync(path('card.json'), JSON.stringify({ schemaVersion: 1, steps }));
    const { stderr } = await run('mend', 'masts.glb', '--card', 'card.json', '--dry-run');
    const lines = stderr.split('\n').filter((line) => line.includes('bytes'));
    expect(lines).toHaveLength(24);
    expect(lines.at(-1)).toMatch(/: \d+ ranges between bytes .*: \d+ more things$/);
  });
});
