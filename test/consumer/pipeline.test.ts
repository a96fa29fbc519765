// What the page on builds shows is what a reader gets: every command and both manifests are run. Plain lines are given to the command
// here; what needs a shell goes through one, to the built command. The manifests are read by `yaml`, a reader of YAML 1.2 that is not ours.
import { spawn, spawnSync } from 'node:child_process';
import {
  chmodSync,
  existsSync,
  mkdirSync,
  mkdtempSync,
  readFileSync,
  readdirSync,
  rmSync,
  writeFileSync,
} from 'node:fs';
import { tmpdir } from 'node:os';
import { delimiter, join, resolve } from 'node:path';
import { main } from '@slewcurve/cli';
import { afterAll, beforeEach, describe, expect, test } from 'vitest';
import { parse } from 'yaml';
import { generatedTake } from '../support/generated-take.js';

const page = readFileSync('packages/cli/docs/pipeline.md', 'utf8');
const folder = mkdtempSync(join(tmpdir(), 'slewcurve-pipeline-'));
afterAll(() => rmSync(folder, { recursive: true, force: true }));
const library = join(folder, 'library');

/** `npx slewcurve` is the built command. */
const programs = join(folder, 'programs');
mkdirSync(programs);
const bin = resolve('packages/cli/bin/slewcurve.js');
writeFileSync(join(programs, 'npx'), `#!/bin/sh\nshift\nexec "${process.execPath}" "${bin}" "$@"\n`);
chmodSync(join(programs, 'npx'), 0o755);

const TAKE = { joints: 2, frames: 60, rate: 30 };
const POP = { joint: 1, frame: 30, degrees: 10 };

beforeEach(() => {
  rmSync(library, { recursive: true, force: true });
  mkdirSync(join(library, 'clips/town'), { recursive: true });
  const names = ['walk', 'run', 'idle', 'town/nod', 'town/wave'];
  for (const name of names)
    writeFileSync(
      join(library, `clips/${name}.glb`),
      generatedTake(name === 'idle' ? TAKE : { ...TAKE, pop: POP }),
    );
  writeFileSync(join(library, 'clips/walk-again.glb'), generatedTake(TAKE));
});

function blocks(language: string): string[] {
  return [...page.matchAll(/^```(\w*)\n([\s\S]*?)^```$/gm)].flatMap(([, name, text]) =>
    name === language ? [text] : [],
  );
}

interface Ran {
  readonly status: number | null;
  readonly stdout: string;
  readonly stderr: string;
}

/** What a shell makes of a line, in the library. */
function sh(line: string, env: Readonly<Record<string, string>>): Ran {
  const path = [programs, process.env.PATH].join(delimiter);
  return spawnSync('sh', ['-c', line], {
    cwd: library,
    encoding: 'utf8',
    env: { ...process.env, ...env, PATH: path },
  });
}

/** What the command makes of a line that needs no shell: words, some in single quotes. npm is left alone. */
async function run(line: string): Promise<Ran> {
  const plain = line.replace(' || [ $? -eq 1 ]', '');
  const [program, name, ...words] = [...plain.matchAll(/'([^']*)'|(\S+)/g)].map(
    ([, quoted, bare]) => quoted ?? bare,
  );
  if (program === 'npm') return { status: 0, stdout: '', stderr: '' };
  expect([program, name]).toEqual(['npx', 'slewcurve']);
  let [stdout, stderr] = ['', ''];
  const status = await main(words, {
    stdout: { write: (text) => (stdout += text) },
    stderr: { write: (text) => (stderr += text) },
    cwd: () => library,
  });
  return { status: status === 1 && plain !== line ? 0 : status, stdout, stderr };
}

/** A step of a CI job. */
interface Step {
  readonly run?: string;
}

function runsOf(steps: readonly Step[]): string[] {
  return steps.flatMap(({ run: line }) => line ?? []);
}

async function wholeReport(): Promise<string> {
  return (await run('npx slewcurve check clips --format json')).stdout;
}

describe('the page on builds', () => {
  test('has commands of which every line runs', async () => {
    const lines = blocks('sh').flatMap((block) => block.trim().split('\n'));
    const statuses: [string, number | null][] = [];
    for (const line of lines) {
      const { status, stderr } = await run(line);
      expect(stderr, line).not.toMatch(/fault of its own|usage\./);
      statuses.push([line, status]);
    }
    // Findings are 1. Known from the baseline: 0, until a stamp takes one of them away.
    expect(statuses).toEqual([
      ['npm install --save-dev @slewcurve/cli', 0],
      ['npx slewcurve check clips', 1],
      ['npx slewcurve check clips --format sarif -o slewcurve.sarif', 1],
      ['npx slewcurve check clips --format markdown -o summary.md', 1],
      ['npx slewcurve check clips --format csv -o findings.csv', 1],
      ['npx slewcurve check clips --format json -o report.json', 1],
      ['npx slewcurve check clips --baseline-out baseline.json', 1],
      ['npx slewcurve check clips --baseline baseline.json', 0],
      ['npx slewcurve check clips --baseline baseline.json --baseline-exact', 0],
      ["npx slewcurve check clips/walk.glb --stamp jump.lone-key --reason 'the hit is meant'", 0],
      ['npx slewcurve compare clips/walk.glb clips/walk-again.glb --angle 0.5 --rate 20', 1],
      ['npx slewcurve docket clips/walk.glb --format html -o docket.html', 0],
      ['npx slewcurve check clips --shard 1/2 --format json -o part-1.json', 1],
      ['npx slewcurve check clips --shard 2/2 --format json -o part-2.json', 1],
      ['npx slewcurve check --merge part-1.json part-2.json', 1],
      ["npx slewcurve check --merge 'part-*.json' --format markdown -o summary.md", 1],
    ]);
    for (const name of ['slewcurve.sarif', 'summary.md', 'findings.csv', 'report.json', 'baseline.json'])
      expect(existsSync(join(library, name)), name).toBe(true);
    expect(existsSync(join(library, 'clips/walk.glb.stamps.json'))).toBe(true);
  });

  test('its CI matrix surveys every file once, and its verdict is that of one run', async () => {
    const [text] = blocks('yaml');
    const {
      jobs,
    }: {
      jobs: {
        part: { strategy: { matrix: { part: number[] } }; steps: Step[] };
        verdict: { needs: string; steps: Step[] };
      };
    } = parse(text);
    expect(jobs.verdict.needs).toBe('part');
    const whole = await wholeReport();
    const lines = jobs.part.strategy.matrix.part.flatMap((part) =>
      runsOf(jobs.part.steps).map((line) => line.replaceAll('${{ matrix.part }}', String(part))),
    );
    for (const line of lines) expect((await run(line)).status, line).toBe(0);
    expect((await run("npx slewcurve check --merge 'part-*.json' --format json")).stdout).toBe(whole);
    await run("npx slewcurve check --merge 'part-*.json' --baseline-out baseline.json");
    for (const line of runsOf(jobs.verdict.steps)) expect((await run(line)).status, line).toBe(0);
    const sarif: { runs: { results: { baselineState: string }[] }[] } = JSON.parse(
      readFileSync(join(library, 'slewcurve.sarif'), 'utf8'),
    );
    expect(sarif.runs[0].results.map(({ baselineState }) => baselineState)).toEqual(
      Array(4).fill('unchanged'),
    );
  });

  test('its Indexed Job has as many parts as it counts, and they merge to what one run prints', async () => {
    const [, text] = blocks('yaml');
    const job: {
      apiVersion: string;
      kind: string;
      spec: {
        completionMode: string;
        completions: number;
        template: { spec: { containers: { command: string[]; args: string[] }[] } };
      };
    } = parse(text);
    expect([job.apiVersion, job.kind, job.spec.completionMode]).toEqual(['batch/v1', 'Job', 'Indexed']);
    const [{ command, args }] = job.spec.template.spec.containers;
    expect(command).toEqual(['sh', '-c']);
    const whole = await wholeReport();
    for (let index = 0; index < job.spec.completions; index++)
      expect(sh(args[0], { JOB_COMPLETION_INDEX: String(index) }).status).toBe(0);
    expect((await run("npx slewcurve check --merge 'part-*.json' --format json")).stdout).toBe(whole);
    rmSync(join(library, 'part-3.json'));
    expect((await run("npx slewcurve check --merge 'part-*.json'")).stderr).toContain(
      'no report of part 4 of 4',
    );
  });

  test('Ctrl+C ends the command by the signal, and nothing is left half written', async () => {
    for (let i = 0; i < 60; i++)
      writeFileSync(
        join(library, `clips/${i}.glb`),
        generatedTake({ joints: 20, frames: 600, rate: 60, pop: { ...POP, joint: 'every' } }),
      );
    const child = spawn(process.execPath, [bin, 'check', 'clips', '-o', 'report.json', '--workers', '2'], {
      cwd: library,
      stdio: 'ignore',
    });
    setTimeout(() => child.kill('SIGINT'), 1500);
    const signal = await new Promise((done) => child.on('exit', (_, by) => done(by)));
    expect(signal).toBe('SIGINT');
    expect(existsSync(join(library, 'report.json'))).toBe(false);
    expect(readdirSync(library)).toEqual(['clips']);
  });
});
