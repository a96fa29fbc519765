// Run by `npm run long` alone: budgets in processor time, as the machine may be busy with something else.
import { spawnSync } from 'node:child_process';
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join, resolve } from 'node:path';
import { afterAll, describe, expect, test } from 'vitest';
import { THREE_MINUTES, generatedTake } from '../support/generated-take.js';
import { measured } from '../support/measured.js';
import { sharedFile } from '../support/shared-data.js';

const folder = mkdtempSync(join(tmpdir(), 'slewcurve-speed-'));
afterAll(() => rmSync(folder, { recursive: true, force: true }));

/** Tells, at its end, what the process took. */
const TELL = `data:text/javascript,import{isMainThread}from'node:worker_threads';if(isMainThread)process.on('exit',()=>{const{user,system}=process.cpuUsage();process._rawDebug(JSON.stringify({cpu:(user+system)/1e6,megabytes:process.resourceUsage().maxRSS/1024}))})`;

/** What a run of the built command takes: processor seconds over all threads, megabytes at most. */
function costOf(...args: string[]): {
  readonly cpu: number;
  readonly megabytes: number;
  readonly verdict: string;
} {
  const bin = resolve('packages/cli/bin/slewcurve.js');
  const { stdout, stderr } = spawnSync(process.execPath, ['--import', TELL, bin, ...args], {
    cwd: folder,
    encoding: 'utf8',
    maxBuffer: 1 << 28,
  });
  const cost: { cpu: number; megabytes: number } = JSON.parse(stderr.trim().split('\n').at(-1) ?? '');
  measured(`${args.join(' ')}: ${cost.cpu.toFixed(2)} s of processor time, ${cost.megabytes.toFixed(0)} MB`);
  return { ...cost, verdict: stdout.trimEnd().split('\n').at(-1) ?? '' };
}

/** Milliseconds on the clock, for a machine that is busy with something else. */
const PATIENCE = 600_000;

describe.skipIf(process.env.SLEWCURVE_LONG_RUNS === undefined)('the command', () => {
  test('checks 300 files of 60 tracks of 120 keys in less than 60 s on two cores, by one thread even', () => {
    for (let i = 0; i < 300; i++)
      writeFileSync(
        join(folder, `${String(i).padStart(3, '0')}.glb`),
        generatedTake({
          joints: 60,
          frames: 120,
          rate: 30,
          ...(i % 10 === 0 && { pop: { joint: i % 60, frame: 50, degrees: 10 } }),
        }),
      );
    for (const threads of ['1', '2']) {
      const { cpu, verdict } = costOf('check', '???.glb', '--workers', threads);
      expect(verdict).toMatch(/^verdict: fail\. 0 errors, 30 warnings, \d+ notes in 300 files, 0 stamped$/);
      // Two threads may take twice as long as the clock.
      expect(cpu).toBeLessThan(60);
    }
  });

  const real = sharedFile('data/gltf/animation-only/840-joints.glb');
  test.skipIf(real.absent)(
    'checks 840 tracks in less than a second',
    () => {
      // The lowest of several runs: half of it is loading the command's modules, which another job on the machine slows.
      const runs = Array.from({ length: 5 }, () => costOf('check', resolve(real.path)).cpu);
      expect(Math.min(...runs)).toBeLessThan(1);
    },
    PATIENCE,
  );

  test.each([
    ['clean', 0],
    ['noisy', 0.03],
  ] as const)(
    'checks 1.73 million %s keys in less than 10 s and 600 MB',
    (name, grain) => {
      writeFileSync(join(folder, `${name}.glb`), generatedTake({ ...THREE_MINUTES, grain }));
      const runs = Array.from({ length: 2 }, () => costOf('check', `${name}.glb`));
      expect(Math.min(...runs.map(({ cpu }) => cpu))).toBeLessThan(10);
      expect(Math.max(...runs.map(({ megabytes }) => megabytes))).toBeLessThan(600);
    },
    PATIENCE,
  );
});
