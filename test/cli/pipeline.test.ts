import { mkdirSync, readFileSync, readdirSync, rmSync, symlinkSync, writeFileSync } from 'node:fs';
import { userInfo } from 'node:os';
import type { Stamp } from '@slewcurve/job';
import { describe, expect, test } from 'vitest';
import { generatedTake } from '../support/generated-take.js';
import { commandFolder, reportOf, type Ran } from '../support/run-command.js';

/** Two joints for 2 s at 30 Hz, one of which pops by 10° for a frame. */
const POPS = generatedTake({ joints: 2, frames: 60, rate: 30, pop: { joint: 1, frame: 30, degrees: 10 } });
const QUIET = generatedTake({ joints: 2, frames: 60, rate: 30 });

/** A library of six files in four folders, one of which is broken; and a folder that nobody means. */
async function library(): ReturnType<typeof commandFolder> {
  const at = await commandFolder();
  for (const folder of ['clips/deep/er', 'clips/.cache', 'clips/node_modules', 'more', 'empty'])
    mkdirSync(at.path(folder), { recursive: true });
  for (const name of ['clips/b.glb', 'clips/a.glb', 'clips/deep/c.GLB', 'clips/.cache/d.glb'])
    writeFileSync(at.path(name), POPS);
  for (const name of ['clips/deep/er/e.glb', 'more/f.glb', 'clips/node_modules/g.glb'])
    writeFileSync(at.path(name), QUIET);
  writeFileSync(at.path('more/broken.glb'), QUIET.subarray(0, 500));
  writeFileSync(at.path('clips/notes.txt'), 'not a take');
  return at;
}

function filesOf(ran: Ran): string[] {
  return reportOf(ran).files.map(({ file }) => file);
}

describe('files, folders and patterns', () => {
  test.each([
    [['clips'], ['clips/a.glb', 'clips/b.glb', 'clips/deep/c.GLB', 'clips/deep/er/e.glb']],
    [['clips/'], ['clips/a.glb', 'clips/b.glb', 'clips/deep/c.GLB', 'clips/deep/er/e.glb']],
    [['clips/*.glb'], ['clips/a.glb', 'clips/b.glb']],
    [['clips/**/*.glb'], ['clips/a.glb', 'clips/b.glb', 'clips/deep/er/e.glb']],
    [['clips/*/*.{glb,GLB}'], ['clips/deep/c.GLB']],
    [['**/[!bc].glb'], ['clips/a.glb', 'clips/deep/er/e.glb', 'more/f.glb']],
    [['clips/.cache/*.glb'], ['clips/.cache/d.glb']],
    [
      ['clips/?.glb', 'clips/b.glb', 'more/f.glb'],
      ['clips/a.glb', 'clips/b.glb', 'more/f.glb'],
    ],
    [
      ['more/f.glb', 'clips/a.glb'],
      ['more/f.glb', 'clips/a.glb'],
    ],
    [
      ['clips\\deep', 'clips\\*.glb', 'more\\f.glb'],
      ['clips/deep/c.GLB', 'clips/deep/er/e.glb', 'clips/a.glb', 'clips/b.glb', 'more/f.glb'],
    ],
  ])('%j are %j', async (words, files) => {
    const { run } = await library();
    expect(filesOf(await run('check', ...words, '--format', 'json'))).toEqual(files);
  });

  test('a link to a folder is not followed, one to a file is', async () => {
    const at = await library();
    symlinkSync(at.path('clips'), at.path('clips/deep/round'));
    symlinkSync(at.path('more/f.glb'), at.path('clips/deep/link.glb'));
    expect(filesOf(await at.run('check', 'clips/deep', '--format', 'json'))).toEqual([
      'clips/deep/c.GLB',
      'clips/deep/er/e.glb',
      'clips/deep/link.glb',
    ]);
  });

  test('nothing fits: could not do it, unless that is allowed', async () => {
    const { run } = await library();
    for (const word of ['empty', 'clips/*.bvh']) {
      const ran = await run('check', word, 'clips/a.glb');
      expect([ran.code, ran.stdout, ran.stderr.includes('usage.no-match')]).toEqual([2, '', true]);
      expect(filesOf(await run('check', word, 'more/f.glb', '--allow-no-match', '--format', 'json'))).toEqual(
        ['more/f.glb'],
      );
    }
    const nothing = await run('check', 'empty', '--allow-no-match');
    expect([nothing.code, nothing.stdout]).toEqual([
      0,
      'verdict: pass. 0 errors, 0 warnings, 0 notes in 0 files, 0 stamped\n',
    ]);
  });

  test('the house rules leave files out', async () => {
    const at = await library();
    writeFileSync(at.path('rules.json'), JSON.stringify({ leaveOut: ['*/deep/*'] }));
    expect(filesOf(await at.run('check', 'clips', '--rules', 'rules.json', '--format', 'json'))).toEqual([
      'clips/a.glb',
      'clips/b.glb',
    ]);
  });

  test('one bad file does not stop the rest', async () => {
    const { run } = await library();
    for (const workers of ['1', '2']) {
      const ran = await run('check', 'more', 'clips/a.glb', '--workers', workers, '--format', 'json');
      expect(ran.code).toBe(2);
      expect(reportOf(ran).files.map(({ file, status }) => [file, status])).toEqual([
        ['more/broken.glb', 'unreadable'],
        ['more/f.glb', 'surveyed'],
        ['clips/a.glb', 'surveyed'],
      ]);
    }
  });
});

describe('the report', () => {
  test.each(['text', 'json', 'sarif', 'csv', 'markdown'])(
    'as %s is the same to the byte on every run',
    async (format) => {
      const { run } = await library();
      const check = ['check', 'clips', 'more', '--format', format];
      const { stdout } = await run(...check);
      expect(stdout).not.toBe('');
      expect((await run(...check)).stdout).toBe(stdout);
    },
  );

  test('is the same to the byte with 1, 2 and 5 threads', async () => {
    const { run } = await library();
    const check = ['check', 'clips', 'more', '--format', 'json', '--workers'];
    const { stdout } = await run(...check, '1');
    for (const threads of ['2', '5']) expect((await run(...check, threads)).stdout).toBe(stdout);
  });

  test('goes into a file with -o, whole, and nothing to stdout', async () => {
    const { run, path } = await library();
    const printed = await run('check', 'clips', '--format', 'sarif');
    const written = await run('check', 'clips', '--format', 'sarif', '-o', 'report.sarif');
    expect([written.code, written.stdout, written.stderr]).toEqual([1, '', '']);
    expect(readFileSync(path('report.sarif'), 'utf8')).toBe(printed.stdout);
  });

  test('has colour on a terminal alone, and none with NO_COLOR', async () => {
    const { runWith, path } = await library();
    const check = ['check', 'clips/a.glb'];
    const plain = (await runWith({}, ...check)).stdout;
    const painted = (await runWith({ terminal: true, env: {} }, ...check)).stdout;
    expect(plain).not.toContain('\u001B');
    expect(painted).toContain('\u001B[33mwarning jump.lone-key\u001B[0m');
    // oxlint-disable-next-line no-control-regex -- colours are made of them
    expect(painted.replaceAll(/\u001B\[[\d;]*m/g, '')).toBe(plain);
    for (const env of [{ NO_COLOR: '1' }, { TERM: 'dumb' }])
      expect((await runWith({ terminal: true, env }, ...check)).stdout).toBe(plain);
    await runWith({ terminal: true, env: {} }, ...check, '-o', 'report.txt');
    expect(readFileSync(path('report.txt'), 'utf8')).toBe(plain);
  });

  test('has no control characters from the names of a stranger’s file', async () => {
    const { run, path } = await commandFolder();
    const csv = 'time,qx,qy,qz,qw\n0,0,0,0,1\n1,0,0,0,1\n';
    writeFileSync(path('a\u001B[2J\nverdict: pass.csv'), csv.replaceAll('\n', '\r\n'));
    const { stdout } = await run('check', '*.csv');
    expect(
      stdout
        .trimEnd()
        .split('\n')
        .filter((line) => line.startsWith('verdict')),
    ).toHaveLength(1);
    expect(stdout).not.toContain('\u001B');
  });
});

describe('a run', () => {
  test('shows how far it is on a terminal, and takes the line away', async () => {
    const { runWith, run } = await library();
    const { stderr } = await runWith({ terminal: true }, 'check', 'clips');
    expect(stderr).toMatch(/file 1 of 4, \d of 2 tracks/);
    expect(stderr.endsWith('\r\u001B[2K')).toBe(true);
    expect((await run('check', 'clips')).stderr).toBe('');
  });

  test.each(['1', '2'])(
    'is stopped between files, with %s threads, and leaves nothing behind',
    async (workers) => {
      const { runWith, path, folder } = await library();
      const before = readdirSync(folder);
      const stop = new AbortController();
      stop.abort();
      const ran = await runWith(
        { signal: stop.signal },
        'check',
        'clips',
        '--workers',
        workers,
        '-o',
        'report.json',
      );
      expect([ran.code, ran.stdout, ran.stderr.includes('job.stopped')]).toEqual([2, '', true]);
      expect(readdirSync(folder)).toEqual(before);
      expect(() => readFileSync(path('report.json'))).toThrow(/ENOENT/);
    },
  );

  test('of one part of the files, and of all parts merged, prints what one run prints', async () => {
    const { run } = await library();
    const whole = (await run('check', 'clips', 'more', '--format', 'json')).stdout;
    for (const part of [1, 2, 3, 8].map((number) => `${number}/8`))
      expect(
        filesOf(await run('check', 'clips', 'more', '--shard', part, '--format', 'json')).length,
      ).toBeLessThan(2);
    for (const part of ['1/3', '2/3', '3/3'])
      await run('check', 'clips', 'more', '--shard', part, '--format', 'json', '-o', `part-${part[0]}.json`);
    const merged = await run('check', '--merge', 'part-*.json', '--format', 'json');
    expect(merged.stderr).toBe('');
    expect(merged.stdout).toBe(whole);
    expect(merged.code).toBe(2);
    const lost = await run('check', '--merge', 'part-1.json', 'part-3.json');
    expect([lost.code, lost.stderr.includes('merge.missing-shard')]).toEqual([2, true]);
  });
});

describe('a baseline', () => {
  test('lets old findings pass and new ones fail, and exactly, fails when one is mended', async () => {
    const { run, path } = await library();
    expect((await run('check', 'clips', '--baseline-out', 'baseline.json')).code).toBe(1);
    const known = await run('check', 'clips', '--baseline', 'baseline.json', '--baseline-exact');
    expect([known.code, known.stdout]).toEqual([
      0,
      'verdict: pass. 0 errors, 0 warnings, 0 notes in 4 files, 0 stamped; 3 known from the baseline\n',
    ]);
    writeFileSync(path('clips/new.glb'), POPS);
    expect((await run('check', 'clips', '--baseline', 'baseline.json')).code).toBe(1);
    rmSync(path('clips/new.glb'));
    writeFileSync(path('clips/a.glb'), QUIET);
    expect((await run('check', 'clips', '--baseline', 'baseline.json')).code).toBe(0);
    const exact = await run('check', 'clips', '--baseline', 'baseline.json', '--baseline-exact');
    expect(exact.code).toBe(1);
    expect(exact.stdout).toMatch(/^clips\/a\.glb: .* gone since the baseline was written\. jump\.lone-key$/m);
  });
});

describe('a stamp', () => {
  test('is written beside the file with reason, name and day, and counts from then on', async () => {
    const { run, path } = await library();
    const ran = await run('check', 'clips/a.glb', '--stamp', 'jump.lone-key', '--reason', 'the hit is meant');
    expect(ran).toEqual({
      code: 0,
      stdout: 'verdict: pass. 0 errors, 0 warnings, 0 notes in 1 file, 1 stamped\n',
      stderr: '1 place accepted in clips/a.glb.stamps.json\n',
    });
    const { stamps }: { stamps: Stamp[] } = JSON.parse(readFileSync(path('clips/a.glb.stamps.json'), 'utf8'));
    expect(stamps).toEqual([
      {
        fingerprint: expect.stringMatching(/^[0-9a-f]{16}$/),
        rule: 'jump.lone-key',
        clip: 'Take',
        track: 'joint-0/joint-1',
        reason: 'the hit is meant',
        by: userInfo().username,
        date: expect.stringMatching(/^\d{4}-\d\d-\d\d$/),
      },
    ]);
    expect((await run('check', 'clips/a.glb')).code).toBe(0);
    expect((await run('check', 'clips/b.glb')).code).toBe(1);
    const mended = await run('mend', 'clips/a.glb', '--proposed', '-o', 'out.glb');
    expect(mended.stdout).toContain('1 stamped');
    expect(readFileSync(path('out.glb')).equals(POPS)).toBe(true);
  });

  test('goes by a fingerprint of the report too, and by the name that is given', async () => {
    const { run, path } = await library();
    const { fingerprint } = reportOf(await run('check', 'clips/a.glb', '--format', 'json')).files[0]
      .findings[0].occurrences[0];
    const args = ['--stamp', fingerprint, '--reason', 'meant', '--by', 'Ada'];
    expect((await run('check', 'clips/a.glb', ...args)).code).toBe(0);
    const text = readFileSync(path('clips/a.glb.stamps.json'), 'utf8');
    expect(text).toContain('"by": "Ada"');
    await run('check', 'clips/a.glb', '--stamp', 'jump.lone-key', '--reason', 'again', '--by', 'Ada');
    expect(readFileSync(path('clips/a.glb.stamps.json'), 'utf8')).toBe(text.replace('"meant"', '"again"'));
  });

  test('a damaged file of stamps is the fault of that file alone, and is never written over', async () => {
    const { run, path } = await library();
    writeFileSync(path('clips/a.glb.stamps.json'), '{"schemaVersion":1,"stamps":[{}]}');
    const ran = await run('check', 'clips', '--format', 'json');
    expect(ran.code).toBe(2);
    const [bad, ...rest] = reportOf(ran).files;
    expect(bad.error).toEqual({
      code: 'stamps.bad-shape',
      message: 'clips/a.glb.stamps.json: /stamps/0/fingerprint must be text; it is left out.',
    });
    expect(rest.map(({ status }) => status)).toEqual(['surveyed', 'surveyed', 'surveyed']);
    expect((await run('check', 'clips/a.glb', '--stamp', 'jump.lone-key', '--reason', 'x')).code).toBe(2);
    expect(readFileSync(path('clips/a.glb.stamps.json'), 'utf8')).toBe('{"schemaVersion":1,"stamps":[{}]}');
  });
});

describe('house rules', () => {
  test.each([
    [{ level: {} }, '"level" at /level is no key. Did you mean levels?', 'house-rules.unknown-key'],
    [
      { levels: { 'jump.shelf': 'loud' } },
      'There are: off, note, warning, error.',
      'house-rules.unknown-level',
    ],
    [{ limits: { joint: { 'jump.shef': 3 } } }, 'Did you mean jump.shelf?', 'house-rules.unknown-rule'],
    [{ limits: { jiont: {} } }, '/limits/jiont is no role', 'house-rules.unknown-role'],
    [{ loops: 'walk' }, '/loops of the house rules must be a list', 'house-rules.bad-shape'],
  ])(
    '%j stop the run, and are told with the file, the key and what is allowed',
    async (rules, words, code) => {
      const { run, path } = await library();
      writeFileSync(path('rules.json'), JSON.stringify(rules));
      const ran = await run('check', 'clips', '--rules', 'rules.json');
      expect([ran.code, ran.stdout]).toEqual([2, '']);
      for (const part of ['slewcurve: rules.json: ', words, code]) expect(ran.stderr).toContain(part);
    },
  );

  test('say by which playback files are looked at where no flag does', async () => {
    const { run, path } = await library();
    writeFileSync(path('rules.json'), JSON.stringify({ playback: ['finite-cubic'] }));
    const check = ['check', 'clips/a.glb', '--rules', 'rules.json', '--format', 'json'];
    expect(reportOf(await run(...check)).playbacks).toEqual(['finite-cubic']);
    expect(reportOf(await run(...check, '--playback', 'chord')).playbacks).toEqual(['chord']);
  });
});

describe('flags', () => {
  test('--role says what turns, for all tracks or some', async () => {
    const { run } = await library();
    const limits = async (...flags: string[]): Promise<number[]> =>
      reportOf(await run('check', 'clips/a.glb', '--format', 'json', ...flags)).files[0].findings.flatMap(
        ({ rule, limit }) => (rule === 'jump.lone-key' ? [limit] : []),
      );
    const joint = await limits();
    const camera = await limits('--role', 'camera-headset');
    // The limits on the rule's own page.
    expect([joint, camera]).toEqual([[1], [0.25]]);
    expect(await limits('--role', '*/joint-1=camera-headset')).toEqual(camera);
    expect(await limits('--role', 'joint-0=camera-headset')).toEqual(joint);
  });

  test.each([
    [['check', 'clips', '--shard', '4/3'], 'usage.bad-value'],
    [['check', 'clips', '--shard', 'one'], 'usage.bad-value'],
    [['check', 'clips', '--workers', '0'], 'usage.bad-value'],
    [['check', 'clips', '--role', 'jont'], 'Did you mean joint?'],
    [['check', 'clips', '--baseline-exact'], 'usage.needs-flag'],
    [['check', 'clips/a.glb', '--stamp', 'jump.lone-key'], 'usage.needs-flag'],
    [['check', 'clips/a.glb', '--reason', 'x'], 'usage.needs-flag'],
    [['check', 'clips/a.glb', 'clips/b.glb', '--stamp', 'jump.lone-key', '--reason', 'x'], 'usage.one-file'],
    [['check', 'clips/a.glb', '--stamp', 'jump.shelf', '--reason', 'x'], 'stamps.no-match'],
    [['check', '--merge', 'a.json', '--shard', '1/2'], 'usage.not-together'],
    [['check', '--merge', 'clips/notes.txt'], 'file.not-json'],
    [['check', 'clips', '--baseline', 'none.json'], 'file.not-found'],
    [['mend', 'clips/a.glb', '--shard', '1/2'], 'It belongs to survey, check.'],
  ])('%j could not be done: %s', async (argv, words) => {
    const { run } = await library();
    const ran = await run(...argv);
    expect([ran.code, ran.stdout]).toEqual([2, '']);
    expect(ran.stderr).toContain(words);
  });
});
