import { mkdtemp, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { main } from '@slewcurve/cli';
import { onTestFinished } from 'vitest';

/** What a run of the command left behind. */
export interface Ran {
  readonly code: number;
  readonly stdout: string;
  readonly stderr: string;
}

/** An empty folder that is gone after the test, and the command run in it. */
export async function commandFolder(): Promise<{
  readonly folder: string;
  path(name: string): string;
  run(...argv: string[]): Promise<Ran>;
}> {
  const folder = await mkdtemp(join(tmpdir(), 'slewcurve-test-'));
  onTestFinished(() => rm(folder, { recursive: true, force: true }));
  return {
    folder,
    path: (name) => join(folder, name),
    async run(...argv) {
      let stdout = '';
      let stderr = '';
      const code = await main(argv, {
        stdout: { write: (text) => (stdout += text) },
        stderr: { write: (text) => (stderr += text) },
        cwd: () => folder,
      });
      return { code, stdout, stderr };
    },
  };
}
