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

/** An empty folder that is gone after the test, and the command run in it. */
export async function commandFolder(): Promise<{
  readonly folder: string;
  readonly path: (name: string) => string;
  readonly run: (...argv: string[]) => Promise<Ran>;
}> {
  const folder = await mkdtemp(join(tmpdir(), 'slewcurve-test-'));
  onTestFinished(() => rm(folder, { recursive: true, force: true }));
  return {
    folder,
    path: (name) => join(folder, name),
    run: async (...argv) => {
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
