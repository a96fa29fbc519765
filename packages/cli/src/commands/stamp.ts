import { userInfo } from 'node:os';
import { resolve } from 'node:path';
import { SlewcurveError } from '@slewcurve/core';
import { addStamps, stampsFileName, stampsFor, surveyFile } from '@slewcurve/job';
import type { CommandIo } from '../command-io.js';
import { readStamps, writeStamps } from '../files/stamps-file.js';
import type { Arguments } from '../flags.js';
import { progressOn, watchOver } from '../progress.js';
import { settingsOf, tableOptionsOf } from '../settings.js';
import { withFile } from '../with-file.js';

/**
 * `slewcurve check FILE --stamp FINGERPRINT --reason TEXT`: accept findings of one file; they are written down beside it.
 *
 * @throws SlewcurveError `usage.one-file`, `usage.needs-flag`, `stamps.no-match`, and what opening and writing throw
 */
export async function addStamp(args: Arguments, io: CommandIo): Promise<void> {
  const [name, ...more] = args.words;
  if (name === undefined || more.length > 0)
    throw new SlewcurveError('usage.one-file', `--stamp takes one file; got ${args.words.length}.`);
  const reason = args.value('reason')?.trim() ?? '';
  if (reason === '')
    throw new SlewcurveError('usage.needs-flag', '--stamp needs --reason: say why it is as it should be.');
  const by = args.value('by')?.trim() || userInfo().username;
  const words = { reason, by, date: new Date().toISOString().slice(0, 10) };
  const settings = await settingsOf(args, io.cwd());
  const progress = progressOn(io);
  await withFile(name, io.cwd(), tableOptionsOf(args), async ({ opened }) => {
    const report = await surveyFile(opened.name, opened.file, settings, watchOver(io, progress, ''));
    const added = args.values('stamp').flatMap((named) => stampsFor(report, named, words));
    const path = resolve(io.cwd(), name);
    await writeStamps(path, addStamps(await readStamps(path, opened.name), added));
    progress.clear();
    const places = added.length === 1 ? '1 place' : `${added.length} places`;
    io.stderr.write(`${places} accepted in ${stampsFileName(opened.name)}\n`);
  });
}
