import { existsSync, mkdirSync, readFileSync, readdirSync, writeFileSync } from 'node:fs';
import { kestrelPoint } from '@slewcurve/job';
import { describe, expect, test } from 'vitest';
import { commandFolder, reportOf, type Ran } from '../support/run-command.js';

async function withDemo(): ReturnType<typeof commandFolder> {
  const at = await commandFolder();
  writeFileSync(at.path('demo.glb'), kestrelPoint());
  return at;
}

function verbsOf(ran: Ran): Set<string> {
  return new Set((reportOf(ran).steps ?? []).map(({ step }) => step.verb));
}

describe('slewcurve', () => {
  test('without a command says what it can do, on stderr, and could not do it', async () => {
    const { run } = await commandFolder();
    const { code, stdout, stderr } = await run();
    expect([code, stdout]).toEqual([2, '']);
    expect(stderr).toContain('slewcurve check FILE');
  });

  test('tells its version and its help on stdout', async () => {
    const { run } = await commandFolder();
    expect(await run('--version')).toEqual({ code: 0, stdout: 'slewcurve 0.1.0\n', stderr: '' });
    const help = await run('mend', '--help');
    expect([help.code, help.stderr]).toEqual([0, '']);
    for (const flag of [
      '--card',
      '--proposed',
      '--allow',
      '-o OUT',
      '--in-place',
      '--dry-run',
      '--undo-out',
      '--undo',
    ])
      expect(help.stdout).toContain(flag);
  });

  test('--loop says which clips repeat, beside those of the house rules', async () => {
    const { run } = await withDemo();
    const gaps = async (...flags: string[]): Promise<string[]> =>
      reportOf(await run('check', 'demo.glb', '--format', 'json', ...flags)).files.flatMap((file) =>
        file.findings.filter(({ rule }) => rule === 'seam.loop-gap').map(({ clip }) => clip),
      );
    expect(await gaps()).toEqual([]);
    expect(await gaps('--loop', 'beetle-knee')).toEqual(['beetle-knee']);
    expect(await gaps('--loop', 'beetle-*', '--loop', 'lens-doubled-end')).toEqual([
      'lens-doubled-end',
      'beetle-knee',
      'beetle-ankle',
    ]);
  });

  test('names the nearest command, flag and value', async () => {
    const { run } = await commandFolder();
    expect((await run('chek', 'a.glb')).stderr).toContain('Did you mean check?');
    expect((await run('check', 'a.glb', '--playbak', 'step')).stderr).toContain('Did you mean --playback?');
    expect((await run('check', 'a.glb', '--playback', 'finite-cubc')).stderr).toContain(
      'Did you mean finite-cubic?',
    );
    expect((await run('check', 'a.glb', '--allow', 'x')).stderr).toContain('It belongs to mend.');
  });

  test.each([
    [['check'], 'usage.no-file'],
    [['mend', 'a.glb', 'b.glb'], 'usage.one-file'],
    [['mend', 'demo.glb', '-o', 'x.glb'], 'usage.one-of'],
    [['mend', 'demo.glb', '--proposed'], 'usage.one-of'],
    [['mend', 'demo.glb', '--proposed', '--in-place', '-o', 'x.glb'], 'usage.one-of'],
    [['check', 'demo.glb', '--fail-at', 'fatal'], 'usage.bad-value'],
    [['check', 'demo.glb', '--allow-warnings', '-1'], 'usage.bad-value'],
    [['check', 'demo.glb', '--format', 'xml'], 'usage.bad-value'],
    [['check', 'demo.glb', '--rules', 'none.json'], 'file.not-found'],
    [['mend', 'demo.glb', '--card', 'demo.glb', '-o', 'x.glb'], 'file.not-json'],
    [['explain'], 'usage.no-word'],
    [['mend', 'demo.glb', '--proposed', '--allow', 'bananas', '--dry-run'], 'card.unknown-verb'],
  ])('%j could not be done: %s', async (argv, code) => {
    const { run } = await withDemo();
    const ran = await run(...argv);
    expect(ran.code).toBe(2);
    expect(ran.stdout).toBe('');
    expect(ran.stderr).toContain(code);
  });
});

describe('slewcurve check', () => {
  test('fails where something stands at the failing level, and passes where nothing does', async () => {
    const { run } = await withDemo();
    expect((await run('check', 'demo.glb')).code).toBe(1);
    const errors = reportOf(await run('check', 'demo.glb', '--format', 'json')).totals.error;
    expect((await run('check', 'demo.glb', '--fail-at', 'error')).code).toBe(errors > 0 ? 1 : 0);
  });

  test('lets so many warnings pass as it is told, and not one more', async () => {
    const { run, path } = await commandFolder();
    writeFileSync(path('demo.glb'), kestrelPoint());
    writeFileSync(
      path('rules.json'),
      JSON.stringify({ levels: { 'turn.half': 'off', 'pace.elbow': 'off' } }),
    );
    const { totals } = reportOf(await run('check', 'demo.glb', '--rules', 'rules.json', '--format', 'json'));
    expect(totals.error).toBe(0);
    expect(totals.warning).toBeGreaterThan(0);
    const allow = (n: number): Promise<Ran> =>
      run('check', 'demo.glb', '--rules', 'rules.json', '--allow-warnings', String(n));
    expect((await allow(totals.warning)).code).toBe(0);
    expect((await allow(totals.warning - 1)).code).toBe(1);
  });

  test('says each finding in a sentence and the verdict last', async () => {
    const { run } = await withDemo();
    const lines = (await run('check', 'demo.glb')).stdout.trimEnd().split('\n');
    expect(lines.at(-1)).toMatch(
      /^verdict: fail\. \d+ errors?, \d+ warnings?, \d+ notes? in 1 file, 0 stamped$/,
    );
    expect(lines.find((line) => line.includes('jump.shelf'))).toMatch(
      /^demo\.glb: .+ in beetle-ankle, 0\.733 s: from key 21 to key 22 it steps by .+°.+\. warning jump\.shelf; try: bridge key 22 of /,
    );
  });

  test('goes on after a file that is none, reports both, and exits 2', async () => {
    const { run, path } = await withDemo();
    writeFileSync(path('broken.glb'), kestrelPoint().subarray(0, 1000));
    const ran = await run('check', 'broken.glb', 'missing.glb', 'demo.glb', '--format', 'json');
    expect(ran.code).toBe(2);
    const { files } = reportOf(ran);
    expect(files.map(({ file, status }) => [file, status])).toEqual([
      ['broken.glb', 'unreadable'],
      ['missing.glb', 'unreadable'],
      ['demo.glb', 'surveyed'],
    ]);
    expect(files[0].error?.code).toBe('gltf.truncated');
    expect(files[1].error?.code).toBe('file.not-found');
  });

  test('asks about another player: signs that short way does not mind are errors under finite cubic', async () => {
    const { run } = await withDemo();
    const levels = async (playback: string): Promise<string[]> =>
      reportOf(await run('check', 'demo.glb', '--playback', playback, '--format', 'json'))
        .files[0].findings.filter(({ rule, clip }) => rule === 'turn.sign-flip' && clip === 'beetle-hip')
        .map(({ level }) => level);
    expect(await levels('as-written')).toEqual(['note']);
    expect(await levels('as-written,finite-cubic')).toEqual(['error']);
  });

  test('prints the same report every time, and nothing but the report on stdout', async () => {
    const { run } = await withDemo();
    const one = await run('check', 'demo.glb', '--format', 'json');
    expect(one.stderr).toBe('');
    expect((await run('check', 'demo.glb', '--format', 'json')).stdout).toBe(one.stdout);
  });

  test('writes forward slashes into the report, as given otherwise', async () => {
    const at = await commandFolder();
    mkdirSync(at.path('clips'));
    writeFileSync(at.path('clips/a.glb'), kestrelPoint());
    expect(reportOf(await at.run('check', './clips/a.glb', '--format', 'json')).files[0].file).toBe(
      './clips/a.glb',
    );
  });
});

describe('slewcurve survey', () => {
  test('lists every track with its figures and units, then what is found', async () => {
    const { run } = await withDemo();
    const { stdout, code } = await run('survey', 'demo.glb');
    expect(code).toBe(1);
    expect(stdout).toContain('demo.glb: 12 rotation tracks in 12 clips');
    expect(stdout).toMatch(/keys\s+from s\s+to s\s+turned °\s+median °\/s\s+peak °\/s/);
    expect(stdout).toMatch(/1,080\s+36\.0\s+36\.0 .*lens-thirds/);
    expect(stdout).toContain('verdict: fail.');
  });
});

describe('slewcurve mend', () => {
  test('mends what is proposed, tells the price, and takes it back to the byte', async () => {
    const at = await withDemo();
    const ran = await at.run('mend', 'demo.glb', '--proposed', '-o', 'out.glb', '--undo-out', 'undo.json');
    expect(ran.stdout).toMatch(
      /Lift out .+\d keys? changed, the largest by \d.*°; outside its span 0\.00°; 0\.00 s added[;.]/,
    );
    expect(readFileSync(at.path('demo.glb')).equals(kestrelPoint())).toBe(true);
    expect(readFileSync(at.path('out.glb')).equals(kestrelPoint())).toBe(false);
    expect((await at.run('mend', 'out.glb', '--undo', 'undo.json', '-o', 'back.glb')).code).toBe(0);
    expect(readFileSync(at.path('back.glb')).equals(kestrelPoint())).toBe(true);
  });

  test('writes nothing on a dry run', async () => {
    const at = await withDemo();
    const ran = await at.run('mend', 'demo.glb', '--proposed', '--dry-run');
    expect(ran.stderr).toMatch(/demo\.glb: bytes \d+ to \d+ become \d+: /);
    expect(readdirSync(at.folder)).toEqual(['demo.glb']);
  });

  test('writes over the file only in place, and keeps every original beside it', async () => {
    const at = await withDemo();
    const over = await at.run('mend', 'demo.glb', '--proposed', '-o', 'demo.glb');
    expect([over.code, over.stderr.includes('mend.over-input')]).toEqual([2, true]);
    expect(readFileSync(at.path('demo.glb')).equals(kestrelPoint())).toBe(true);
    await at.run('mend', 'demo.glb', '--proposed', '--in-place');
    await at.run('mend', 'demo.glb', '--proposed', '--in-place');
    expect(readdirSync(at.folder).toSorted()).toEqual([
      'demo.glb',
      'demo.original-2.glb',
      'demo.original.glb',
    ]);
    expect(readFileSync(at.path('demo.original.glb')).equals(kestrelPoint())).toBe(true);
  });

  test('stops a card at a step that fits nothing, and writes nothing', async () => {
    const at = await withDemo();
    writeFileSync(
      at.path('card.json'),
      JSON.stringify({
        schemaVersion: 1,
        steps: [{ verb: 'lift out', clip: 'beetle-ankle', track: 'nobody', keys: [3] }],
      }),
    );
    const ran = await at.run('mend', 'demo.glb', '--card', 'card.json', '-o', 'out.glb');
    expect([ran.code, ran.stdout]).toEqual([2, '']);
    expect(ran.stderr).toContain('step.no-match');
    expect(existsSync(at.path('out.glb'))).toBe(false);
  });

  test('leaves out what is a choice, and takes it when it is allowed by name', async () => {
    const at = await withDemo();
    const shy = await at.run('mend', 'demo.glb', '--proposed', '--dry-run', '--format', 'json');
    expect(verbsOf(shy).has('choose side')).toBe(false);
    expect(shy.stderr).toContain('left out: choose side');
    const bold = await at.run(
      'mend',
      'demo.glb',
      '--proposed',
      '--allow',
      'choose side',
      '--dry-run',
      '--format',
      'json',
    );
    expect(verbsOf(bold).has('choose side')).toBe(true);
  });

  test('refuses an undo plan that is for another file, that was run already, or that was changed', async () => {
    const at = await withDemo();
    await at.run('mend', 'demo.glb', '--proposed', '-o', 'out.glb', '--undo-out', 'undo.json');
    const untouched = await at.run('mend', 'demo.glb', '--undo', 'undo.json', '-o', 'back.glb');
    expect(untouched.code).toBe(2);
    expect(untouched.stderr).toContain('demo.glb is as it was before the change');
    await at.run('mend', 'out.glb', '--proposed', '--fail-at', 'note', '-o', 'more.glb');
    const other = await at.run('mend', 'more.glb', '--undo', 'undo.json', '-o', 'back.glb');
    expect([other.code, other.stderr.includes('undo.other-file')]).toEqual([2, true]);
    const plan = JSON.parse(readFileSync(at.path('undo.json'), 'utf8'));
    plan.ranges[0].bytes = Buffer.alloc(Buffer.from(plan.ranges[0].bytes, 'base64').length).toString(
      'base64',
    );
    writeFileSync(at.path('undo.json'), JSON.stringify(plan));
    const changed = await at.run('mend', 'out.glb', '--undo', 'undo.json', '-o', 'back.glb');
    expect([changed.code, changed.stderr.includes('undo.broken')]).toEqual([2, true]);
    expect(existsSync(at.path('back.glb'))).toBe(false);
  });

  test('copies the files that a glTF refers to beside its new place, and never over others', async () => {
    const at = await commandFolder();
    mkdirSync(at.path('new'));
    const times = Buffer.from(Float32Array.of(0, 1, 2).buffer);
    const values = Buffer.from(Float32Array.of(0, 0, 0, 1, 0, 1, 0, 0, 0, 0, 0, -1).buffer);
    writeFileSync(at.path('turn.bin'), Buffer.concat([times, values]));
    writeFileSync(
      at.path('turn.gltf'),
      JSON.stringify({
        asset: { version: '2.0' },
        nodes: [{ name: 'wheel' }],
        buffers: [{ uri: 'turn.bin', byteLength: 60 }],
        bufferViews: [
          { buffer: 0, byteLength: 12 },
          { buffer: 0, byteOffset: 12, byteLength: 48 },
        ],
        accessors: [
          { bufferView: 0, componentType: 5126, count: 3, type: 'SCALAR', min: [0], max: [2] },
          { bufferView: 1, componentType: 5126, count: 3, type: 'VEC4' },
        ],
        animations: [
          {
            name: 'spin',
            samplers: [{ input: 0, output: 1 }],
            channels: [{ sampler: 0, target: { node: 0, path: 'rotation' } }],
          },
        ],
      }),
    );
    const card = {
      schemaVersion: 1,
      steps: [{ verb: 'choose side', clip: 'spin', track: 'wheel', keys: [1], axis: [0, 1, 0] }],
    };
    writeFileSync(at.path('card.json'), JSON.stringify(card));
    const ran = await at.run(
      'mend',
      'turn.gltf',
      '--card',
      'card.json',
      '-o',
      'new/turn.gltf',
      '--fail-at',
      'error',
      '--format',
      'json',
    );
    expect(ran.stderr).toContain('copied beside it:');
    expect(readFileSync(at.path('new/turn.bin')).equals(Buffer.concat([times, values]))).toBe(true);
    expect(readFileSync(at.path('turn.bin')).equals(Buffer.concat([times, values]))).toBe(true);
    expect(reportOf(await at.run('check', 'new/turn.gltf', '--format', 'json')).files[0].tracks[0].keys).toBe(
      4,
    );
  });
});

describe('slewcurve explain', () => {
  test('leads from a word of the trade to ours', async () => {
    const { run } = await commandFolder();
    const pop = await run('explain', 'pop');
    expect(pop.code).toBe(0);
    expect(pop.stdout).toContain('jump.lone-key');
    expect((await run('explain', 'jump.shelf')).stdout).toContain('# jump.shelf');
    expect((await run('explain', 'same', 'side')).stdout).toContain('# same side');
    expect((await run('explain', 'finite-cubic')).stdout).toContain('finite-cubic');
  });

  test('offers the nearest word where nothing is known by one', async () => {
    const { run } = await commandFolder();
    const { code, stdout } = await run('explain', 'hemisfere');
    expect(code).toBe(2);
    expect(stdout).toContain('Did you mean hemisphere?');
  });
});
