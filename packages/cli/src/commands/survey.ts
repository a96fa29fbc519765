import { resolve } from 'node:path';
import { SlewcurveError, TIME_FORMS } from '@slewcurve/core';
import {
  REPORTERS,
  REPORT_FORMATS,
  baselineJson,
  baselineOf,
  buildReport,
  mergeReports,
  parseBaseline,
  textRoster,
  withBaseline,
  type FileReport,
  type Report,
  type ReportParts,
  type Shard,
} from '@slewcurve/job';
import type { CommandIo } from '../command-io.js';
import { EXIT } from '../exit-code.js';
import { findFiles } from '../files/find-files.js';
import type { Arguments, FlagName } from '../flags.js';
import { paintFor, print, writeText } from '../print.js';
import { oneOf, readJson, settingsOf, tableOptionsOf, wholeNumber } from '../settings.js';
import { surveyFiles } from '../survey/survey-files.js';
import { addStamp } from './stamp.js';

/** `slewcurve survey FILE…`: the roster of tracks, then the findings. */
export async function survey(args: Arguments, io: CommandIo): Promise<number> {
  checkFlags(args);
  return report(args, io, (result, options) => textRoster(result, options.paint, options.time));
}

/** `slewcurve check FILE…`: the findings and a verdict. */
export async function check(args: Arguments, io: CommandIo): Promise<number> {
  checkFlags(args);
  if (args.given('stamp')) await addStamp(args, io);
  return report(args, io, REPORTERS.text);
}

async function report(args: Arguments, io: CommandIo, asText: typeof REPORTERS.text): Promise<number> {
  const format = oneOf(args, 'format', REPORT_FORMATS) ?? 'text';
  const { files, shard, settings } = args.given('merge') ? await merged(args, io) : await surveyed(args, io);
  const result = await judged(files, shard, settings, args, io);
  const options = {
    folder: io.cwd().replaceAll('\\', '/'),
    paint: args.given('o') ? undefined : paintFor(io),
    time: oneOf(args, 'time', TIME_FORMS) ?? 'seconds',
  };
  await print((format === 'text' ? asText : REPORTERS[format])(result, options), args, io);
  if (files.some((file) => file.status === 'unreadable')) return EXIT.unable;
  return result.verdict === 'pass' ? EXIT.pass : EXIT.fail;
}

interface Looked {
  readonly files: readonly FileReport[];
  readonly shard?: Shard;
  readonly settings: Parameters<typeof buildReport>[1];
}

/** The files surveyed, or the part of them that `--shard` names. Files are dealt out one by one. */
async function surveyed(args: Arguments, io: CommandIo): Promise<Looked> {
  const settings = await settingsOf(args, io.cwd());
  const work = { cwd: io.cwd(), settings, table: tableOptionsOf(args) };
  const shard = shardOf(args.value('shard'));
  const threads = wholeNumber(args, 'workers');
  if (threads === 0) throw new SlewcurveError('usage.bad-value', '--workers takes 1 or more; got 0.');
  const { leaveOut } = settings.houseRules;
  const found = await findFiles(args.words, io.cwd(), leaveOut, args.given('allow-no-match'));
  const own = shard ? found.filter((_, i) => i % shard.of === shard.number - 1) : found;
  return { files: await surveyFiles(own, work, threads, io), settings, ...(shard && { shard }) };
}

/** Reports of earlier runs as one; `--fail-at` is theirs where it is not given. */
async function merged(args: Arguments, io: CommandIo): Promise<Looked> {
  const found = await findFiles(args.words, io.cwd(), [], false);
  const named = await Promise.all(
    found.map(async ({ name }) => ({ name, json: await readJson(name, io.cwd()) })),
  );
  const { files, like } = mergeReports(named);
  const settings = await settingsOf(args, io.cwd());
  const failAt = args.given('fail-at') ? settings.failAt : like.failAt;
  return { files, settings: { ...settings, playbacks: like.playbacks, failAt } };
}

async function judged(
  files: readonly FileReport[],
  shard: Shard | undefined,
  settings: Looked['settings'],
  args: Arguments,
  io: CommandIo,
): Promise<Report> {
  const out = args.value('baseline-out');
  if (out !== undefined) await writeText(resolve(io.cwd(), out), baselineJson(baselineOf(files)));
  const name = args.value('baseline');
  const parts: ReportParts = shard ? { shard } : {};
  if (name === undefined) return buildReport(files, settings, parts);
  const baseline = parseBaseline(await readJson(name, io.cwd()), name);
  const marked = withBaseline(files, baseline, shard === undefined);
  const exact = args.given('baseline-exact');
  return buildReport(marked.files, settings, { ...parts, baseline: { gone: marked.gone, exact } });
}

function shardOf(text: string | undefined): Shard | undefined {
  if (text === undefined) return undefined;
  const [, number = 0, of = 0] = (/^(\d{1,5})\/(\d{1,5})$/.exec(text) ?? []).map(Number);
  if (number >= 1 && number <= of) return { number, of };
  throw new SlewcurveError(
    'usage.bad-value',
    `--shard takes a part and how many there are, such as 1/4 for the first of four; got ${text}.`,
  );
}

/** Flags that mean nothing together. */
const APART: readonly (readonly [FlagName, readonly FlagName[]])[] = [
  [
    'merge',
    [
      'shard',
      'workers',
      'stamp',
      'rules',
      'role',
      'loop',
      'playback',
      'columns',
      'euler',
      'unit',
      'up',
      'hand',
      'space',
      'fps',
      'matrix',
    ],
  ],
  ['shard', ['stamp']],
];
/** Flags that mean nothing alone. */
const TOGETHER: readonly (readonly [FlagName, FlagName])[] = [
  ['baseline-exact', 'baseline'],
  ['reason', 'stamp'],
  ['by', 'stamp'],
  ['stamp', 'reason'],
  ['ticks', 'matrix'],
  ['reading', 'matrix'],
  ['storage', 'matrix'],
];

function checkFlags(args: Arguments): void {
  if (args.words.length === 0)
    throw new SlewcurveError(
      'usage.no-file',
      'Name at least one file, folder or pattern, for example: slewcurve check walk.glb',
    );
  for (const [flag, others] of APART)
    for (const other of others)
      if (args.given(flag) && args.given(other))
        throw new SlewcurveError('usage.not-together', `--${flag} and --${other} can't go together.`);
  for (const [flag, other] of TOGETHER)
    if (args.given(flag) && !args.given(other))
      throw new SlewcurveError('usage.needs-flag', `--${flag} needs --${other}.`);
}
