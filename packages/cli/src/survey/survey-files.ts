import { availableParallelism } from 'node:os';
import type { FileReport } from '@slewcurve/job';
import type { CommandIo } from '../command-io.js';
import type { FoundFile } from '../files/find-files.js';
import { progressOn, watchOver } from '../progress.js';
import { surveyOne, type SurveyWork } from './survey-one.js';
import { surveyByThreads } from './survey-pool.js';

/** Bytes of files below which threads take longer to start than they save: each loads the command anew, some 0.3 s. */
const WORTH_THREADS = 4e6;

/**
 * The survey of every file, in their order. The reports are the same however many threads there are.
 *
 * @param threads as asked for; undefined: one for each core where it pays
 * @throws SlewcurveError `job.stopped`
 */
export async function surveyFiles(
  files: readonly FoundFile[],
  work: SurveyWork,
  threads: number | undefined,
  io: CommandIo,
): Promise<FileReport[]> {
  const progress = progressOn(io);
  const count = threads ?? threadsFor(files);
  try {
    if (count > 1 && files.length > 1)
      return await surveyByThreads(files, work, count, io.signal, (done) =>
        progress.say(`${done} of ${files.length} files`),
      );
    const reports: FileReport[] = [];
    for (const { name } of files) {
      const prefix = files.length > 1 ? `file ${reports.length + 1} of ${files.length}, ` : '';
      reports.push(await surveyOne(name, work, watchOver(io, progress, prefix)));
    }
    return reports;
  } finally {
    progress.clear();
  }
}

function threadsFor(files: readonly FoundFile[]): number {
  const bytes = files.reduce((sum, { size }) => sum + size, 0);
  return bytes < WORTH_THREADS ? 1 : availableParallelism();
}
