import {
  jsonReport,
  surveyFile,
  buildReport,
  textReport,
  textRoster,
  unreadableFile,
  type FileReport,
  type JobSettings,
} from '@slewcurve/job';
import { SlewcurveError } from '@slewcurve/core';
import type { TableOptions } from '@slewcurve/formats';
import type { CommandIo } from '../command-io.js';
import { EXIT } from '../exit-code.js';
import type { Arguments } from '../flags.js';
import { oneOf, settingsOf, tableOptionsOf } from '../settings.js';
import { reportedName, withFile } from '../with-file.js';

/** `slewcurve survey FILE…`: the roster of tracks, then the findings. */
export function survey(args: Arguments, io: CommandIo): Promise<number> {
  return report(args, io, textRoster);
}

/** `slewcurve check FILE…`: the findings and a verdict. */
export function check(args: Arguments, io: CommandIo): Promise<number> {
  return report(args, io, textReport);
}

async function report(args: Arguments, io: CommandIo, asText: typeof textReport): Promise<number> {
  if (args.words.length === 0)
    throw new SlewcurveError(
      'usage.no-file',
      'Name at least one file, for example: slewcurve check walk.glb',
    );
  const write = oneOf(args, 'format', ['text', 'json']) === 'json' ? jsonReport : asText;
  const settings = await settingsOf(args, io.cwd());
  const table = tableOptionsOf(args);
  const files: FileReport[] = [];
  for (const name of args.words) files.push(await surveyed(name, settings, table, io));
  const result = buildReport(files, settings);
  io.stdout.write(write(result));
  if (files.some((file) => file.status === 'unreadable')) return EXIT.unable;
  return result.verdict === 'pass' ? EXIT.pass : EXIT.fail;
}

/** One bad file does not stop the rest: it is reported as unreadable. */
async function surveyed(
  name: string,
  settings: JobSettings,
  table: TableOptions,
  io: CommandIo,
): Promise<FileReport> {
  try {
    return await withFile(name, io.cwd(), table, ({ opened }) =>
      surveyFile(opened.name, opened.file, settings),
    );
  } catch (error) {
    return unreadableFile(reportedName(name), error);
  }
}
