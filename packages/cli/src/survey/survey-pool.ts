import { Worker } from 'node:worker_threads';
import { SlewcurveError } from '@slewcurve/core';
import { unreadableFile, type FileReport } from '@slewcurve/job';
import type { FoundFile } from '../files/find-files.js';
import { ownFault, type SurveyWork } from './survey-one.js';

/** A thread can only start from what is built. Tests run this file from its source, with conditions that lead to sources. */
const IS_SOURCE = import.meta.url.endsWith('.ts');
const THREAD = new URL(
  IS_SOURCE ? '../../dist/survey/survey-worker.js' : './survey-worker.js',
  import.meta.url,
);

/**
 * The survey of many files by several threads, in the order of `files` whatever thread is done first. Large files are begun first, so that
 * no thread is left alone with one at the end. A thread that dies takes one file's report along and is replaced.
 *
 * @param onDone told after each file how many are finished
 * @throws SlewcurveError `job.stopped`
 */
export function surveyByThreads(
  files: readonly FoundFile[],
  work: SurveyWork,
  threads: number,
  signal: AbortSignal | undefined,
  onDone: (done: number) => void,
): Promise<FileReport[]> {
  const order = [...files.keys()].toSorted((a, b) => (files[b]?.size ?? 0) - (files[a]?.size ?? 0) || a - b);
  const reports = new Map<number, FileReport>();
  const pool = new Set<Worker>();
  let next = 0;
  return new Promise((resolve, reject) => {
    const end = (): void => {
      signal?.removeEventListener('abort', stop);
      for (const worker of pool) void worker.terminate();
    };
    const stop = (): void => {
      end();
      reject(new SlewcurveError('job.stopped', `Stopped at ${reports.size} of ${files.length} files.`));
    };
    const done = (index: number, report: FileReport): void => {
      reports.set(index, report);
      onDone(reports.size);
      if (reports.size < files.length) return;
      end();
      resolve([...files.keys()].flatMap((at) => reports.get(at) ?? []));
    };
    const start = (): void => {
      const worker = new Worker(THREAD, { workerData: work, ...(IS_SOURCE && { execArgv: [] }) });
      let index: number | undefined;
      const deal = (): void => {
        index = order[next++];
        const name = index === undefined ? undefined : files[index]?.name;
        if (name !== undefined) return worker.postMessage(name);
        pool.delete(worker);
        void worker.terminate();
      };
      worker.on('message', (report: FileReport) => {
        if (index !== undefined) done(index, report);
        deal();
      });
      worker.on('error', (error) => {
        pool.delete(worker);
        if (index !== undefined) done(index, unreadableFile(files[index]?.name ?? '', ownFault(error)));
        if (next < files.length) start();
      });
      pool.add(worker);
      deal();
    };
    if (signal?.aborted) return stop();
    signal?.addEventListener('abort', stop);
    for (let i = 0; i < Math.min(threads, files.length); i++) start();
  });
}
