import { resolve } from 'node:path';
import { SlewcurveError } from '@slewcurve/core';
import {
  buildReport,
  jsonReport,
  mendFile,
  mendProposed,
  surveyFile,
  textReport,
  undoPlan,
  withStamps,
  type JobSettings,
  type MendedFile,
  type Watch,
} from '@slewcurve/job';
import { parseJobCard, verbNamed } from '@slewcurve/mend';
import type { CommandIo } from '../command-io.js';
import { EXIT } from '../exit-code.js';
import { readStamps } from '../files/stamps-file.js';
import { assertNoInput, writeOut } from '../files/write-out.js';
import { writeWhole } from '../files/write-whole.js';
import type { Arguments } from '../flags.js';
import { paintFor } from '../print.js';
import { progressOn, watchOver } from '../progress.js';
import { sayRanges } from '../say-ranges.js';
import { sayWritten } from '../say-written.js';
import { oneOf, readJson, settingsOf, tableOptionsOf } from '../settings.js';
import { withFile, type FileInHand } from '../with-file.js';
import { undo } from './undo.js';

/** `slewcurve mend FILE`: run a job card, or the remedies that the survey proposes, and write the result. */
export async function mend(args: Arguments, io: CommandIo): Promise<number> {
  const [name, ...more] = args.words;
  if (name === undefined || more.length > 0)
    throw new SlewcurveError('usage.one-file', `slewcurve mend takes one file; got ${args.words.length}.`);
  exactlyOne(args, ['card', 'proposed', 'undo']);
  exactlyOne(args, ['o', 'in-place', 'dry-run']);
  assertApart(args, io.cwd());
  // A verb that nobody knows would be allowed to no effect.
  for (const verb of args.values('allow')) verbNamed(verb);
  const settings = await settingsOf(args, io.cwd());
  const asJson = oneOf(args, 'format', ['text', 'json']) === 'json';
  return withFile(name, io.cwd(), tableOptionsOf(args), async (file) => {
    if (args.given('undo')) return undo(file, args, io);
    const progress = progressOn(io);
    const watch = watchOver(io, progress, '');
    const mended = await mendInHand(file, args, settings, io, watch).finally(() => progress.clear());
    await writeResults(file, mended, args, io);
    const report = buildReport([mended.report], settings, { steps: mended.steps });
    io.stdout.write(
      asJson
        ? jsonReport(report)
        : textReport(report, paintFor(io), 'seconds', sayWritten(file, mended, args)),
    );
    return report.verdict === 'pass' ? EXIT.pass : EXIT.fail;
  });
}

async function mendInHand(
  file: FileInHand,
  args: Arguments,
  settings: JobSettings,
  io: CommandIo,
  watch: Watch,
): Promise<MendedFile> {
  const stamps = await readStamps(file.path, file.opened.name);
  const before = withStamps(await surveyFile(file.opened.name, file.opened.file, settings, watch), stamps);
  const card = args.value('card');
  if (card !== undefined) {
    const steps = parseJobCard(await readJson(card, io.cwd()));
    const mended = await mendFile(file.opened, steps, before, settings, file.options, watch);
    for (const finding of mended.raised)
      io.stderr.write(`new since the card ran: ${finding.track} in ${finding.clip}: ${finding.message}\n`);
    return { ...mended, report: withStamps(mended.report, stamps) };
  }
  const { mended, declined } = await mendProposed(
    file.opened,
    before,
    settings,
    file.options,
    args.values('allow'),
    watch,
  );
  for (const { step, why } of declined)
    io.stderr.write(`left out: ${step.verb} on ${step.track} in ${step.clip}: ${why}\n`);
  return { ...mended, report: withStamps(mended.report, stamps) };
}

/** Write what was asked for. The side files come first: a mended file never stands without the plan that takes it back. */
async function writeResults(
  file: FileInHand,
  mended: MendedFile,
  args: Arguments,
  io: CommandIo,
): Promise<void> {
  if (args.given('dry-run')) {
    for (const line of sayRanges(file.opened.name, mended.plan.ranges)) io.stderr.write(`${line}\n`);
    return;
  }
  const { ranges } = mended.plan;
  const bytes = ranges.reduce((sum, range) => sum + range.bytes.length, 0);
  io.stderr.write(
    `${file.opened.name}: ${bytes} new bytes in ${ranges.length} places; all others stay. --dry-run tells them.\n`,
  );
  const undoOut = args.value('undo-out');
  if (undoOut !== undefined) await writeText(file, undoOut, (await undoPlan(mended)).text, io);
  const cardOut = args.value('card-out');
  if (cardOut !== undefined) await writeText(file, cardOut, `${JSON.stringify(mended.card, null, 2)}\n`, io);
  await writeOut(file, mended.result, args, io);
}

async function writeText(file: FileInHand, name: string, text: string, io: CommandIo): Promise<void> {
  const path = resolve(io.cwd(), name);
  await assertNoInput(file, path, name);
  await writeWhole(path, [new TextEncoder().encode(text)]);
}

/** @throws SlewcurveError `usage.same-output` */
function assertApart(args: Arguments, cwd: string): void {
  const flags = (['o', 'undo-out', 'card-out'] as const).filter((flag) => args.given(flag));
  const paths = flags.map((flag) => resolve(cwd, args.value(flag) ?? ''));
  const twice = paths.findIndex((path, i) => paths.indexOf(path) < i);
  if (twice < 0) return;
  throw new SlewcurveError(
    'usage.same-output',
    `--${flags[twice] ?? ''} names the file that another flag writes. Give each a name of its own.`,
  );
}

function exactlyOne(
  args: Arguments,
  flags: readonly ('card' | 'proposed' | 'undo' | 'o' | 'in-place' | 'dry-run')[],
): void {
  const given = flags.filter((flag) => args.given(flag));
  if (given.length === 1) return;
  const names = flags.map((flag) => (flag === 'o' ? '-o' : `--${flag}`));
  throw new SlewcurveError(
    'usage.one-of',
    `slewcurve mend needs ${given.length === 0 ? 'one' : 'only one'} of ${names.join(', ')}. Try slewcurve mend --help.`,
  );
}
