import { SlewcurveError } from '@slewcurve/core';
import type { TableOptions } from '@slewcurve/formats';
import {
  surveyFile,
  unreadableFile,
  withStamps,
  type FileReport,
  type JobSettings,
  type Watch,
} from '@slewcurve/job';
import { readStamps } from '../files/stamps-file.js';
import { reportedName, withFile } from '../with-file.js';

/** What every file of a run is surveyed by. Plain data: it is handed to threads. */
export interface SurveyWork {
  readonly cwd: string;
  readonly settings: JobSettings;
  readonly table: TableOptions;
}

/**
 * The survey of one file with its stamps. One bad file does not stop the rest: it is reported as unreadable, and so is one that a fault
 * of ours stops at.
 *
 * @throws SlewcurveError `job.stopped`
 */
export async function surveyOne(
  name: string,
  { cwd, settings, table }: SurveyWork,
  watch: Watch,
): Promise<FileReport> {
  try {
    return await withFile(name, cwd, table, async ({ opened, path }) => {
      const stamps = await readStamps(path, opened.name);
      return withStamps(await surveyFile(opened.name, opened.file, settings, watch), stamps);
    });
  } catch (error) {
    if (error instanceof SlewcurveError && error.code === 'job.stopped') throw error;
    return unreadableFile(reportedName(name), error instanceof SlewcurveError ? error : ownFault(error));
  }
}

/** A fault of ours, as an error of the file at which it showed. */
export function ownFault(error: unknown): SlewcurveError {
  return new SlewcurveError(
    'internal.fault',
    `Slewcurve has a fault of its own here, please report it with the file: ${String(error)}`,
    {},
    { cause: error },
  );
}
