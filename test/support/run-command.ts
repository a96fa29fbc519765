import { mkdtemp, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { main } from '@slewcurve/cli';
import type { Report } from '@slewcurve/job';
import { onTestFinished } from 'vitest';

/** What a run of the command left behind. */
export interface Ran {
  readonly code: number;
  readonly stdout: string;
  readonly stderr: string;
}

/** What `--format json` printed. */
export function reportOf({ stdout }: Ran): Report {
  const report: Report = JSON.parse(stdout);
  return report;
}

/** What the command sees besides a folder. */
export interface World {
  readonly terminal?: boolean;
  readonly env?: Readonly<Record<string, string | undefined>>;
  readonly signal?: AbortSignal;
}

/** An empty folder that is gone after the test, and the command run in it. */
export async function commandFolder(): Promise<{
  readonly folder: string;
  readonly path: (name: string) => string;
  readonly run: (...argv: string[]) => Promise<Ran>;
  /** The same on a terminal, in an environment, or under a signal. */
  readonly runWith: (world: World, ...argv: string[]) => Promise<Ran>;
}> {
  const folder = await mkdtemp(join(tmpdir(), 'slewcurve-test-'));
  onTestFinished(() => rm(folder, { recursive: true, force: true }));
  const runWith = async ({ terminal, env, signal }: World, ...argv: string[]): Promise<Ran> => {
    let stdout = '';
    let stderr = '';
    const code = await main(argv, {
      stdout: { write: (text) => (stdout += text), ...(terminal && { isTTY: true }) },
      stderr: { write: (text) => (stderr += text), ...(terminal && { isTTY: true }) },
      cwd: () => folder,
      ...(env && { env }),
      ...(signal && { signal }),
    });
    return { code, stdout, stderr };
  };
  return { folder, path: (name) => join(folder, name), run: (...argv) => runWith({}, ...argv), runWith };
}
