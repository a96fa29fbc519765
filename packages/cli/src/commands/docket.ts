import { SlewcurveError } from '@slewcurve/core';
import {
  LEVELS,
  compareTracks,
  docketHtml,
  docketMarkdown,
  docketOf,
  mendFile,
  sha256Of,
  surveyFile,
  tracePicture,
  withStamps,
  type DocketParts,
  type FileReport,
  type JobSettings,
  type ReportedFinding,
  type Watch,
} from '@slewcurve/job';
import { parseJobCard } from '@slewcurve/mend';
import type { CommandIo } from '../command-io.js';
import { EXIT } from '../exit-code.js';
import { readStamps } from '../files/stamps-file.js';
import type { Arguments } from '../flags.js';
import { print } from '../print.js';
import { progressOn, watchOver } from '../progress.js';
import { oneOf, readJson, settingsOf, tableOptionsOf } from '../settings.js';
import { withFile, type FileInHand } from '../with-file.js';

/** Findings that are drawn: the worst; a page of hundreds is not looked at. */
const MOST_PICTURES = 60;
/** Tracks whose playbacks disagree that are listed. */
const MOST_DISAGREEMENTS = 20;

/** `slewcurve docket FILE`: the record that is handed on, of the file as it is or as a job card leaves it. Nothing is mended. */
export async function docket(args: Arguments, io: CommandIo): Promise<number> {
  const [name, ...more] = args.words;
  if (name === undefined || more.length > 0)
    throw new SlewcurveError('usage.one-file', `slewcurve docket takes one file; got ${args.words.length}.`);
  const asHtml = oneOf(args, 'format', ['markdown', 'html']) === 'html';
  const settings = await settingsOf(args, io.cwd());
  const progress = progressOn(io);
  const watch = watchOver(io, progress, '');
  const parts = await withFile(name, io.cwd(), tableOptionsOf(args), (file) =>
    partsOf(file, args, settings, io, watch),
  ).finally(() => progress.clear());
  const blocks = docketOf(asHtml ? parts : { ...parts, picture: undefined });
  await print(asHtml ? docketHtml(blocks) : docketMarkdown(blocks), args, io);
  return EXIT.pass;
}

async function partsOf(
  file: FileInHand,
  args: Arguments,
  settings: JobSettings,
  io: CommandIo,
  watch: Watch,
): Promise<DocketParts> {
  const { opened } = file;
  const stamps = await readStamps(file.path, opened.name);
  const report = withStamps(await surveyFile(opened.name, opened.file, settings, watch), stamps);
  const before = { size: opened.source.size, sha256: await sha256Of(opened.source, watch), report };
  const common = {
    before,
    playbacks: settings.playbacks,
    houseRules: settings.houseRules,
    ...(settings.playbacks.length > 1 && { disagreements: disagreementsOf(file, settings) }),
  };
  const picture = pictures(file, report, settings);
  const card = args.value('card');
  const rules = args.value('rules') === undefined ? '' : ` --rules ${args.value('rules')}`;
  if (card === undefined)
    return {
      ...common,
      lines: [],
      proofs: [],
      picture,
      command: `npx slewcurve check ${opened.name}${rules}`,
    };
  const steps = parseJobCard(await readJson(card, io.cwd()));
  const mended = await mendFile(opened, steps, report, settings, file.options, watch);
  const { findings, tracks } = withStamps(mended.report, stamps);
  const after = {
    size: mended.result.size,
    sha256: await sha256Of(mended.result, watch),
    findings,
    tracks,
  };
  const command = `npx slewcurve mend ${opened.name} --card ${card}${rules} -o OUT`;
  return {
    ...common,
    after,
    lines: steps.steps.map((step) => ({ step })),
    proofs: mended.steps,
    picture,
    command,
  };
}

/** Where the tracks are furthest apart under the first playback and another; tracks that one of them can't play are left out. */
function disagreementsOf(
  { opened }: FileInHand,
  { playbacks: [first = 'as-written', ...others] }: JobSettings,
): DocketParts['disagreements'] {
  const tracks = opened.file.clips.flatMap((clip) => clip.tracks);
  const all = others.flatMap((playback) =>
    tracks.flatMap((track) => {
      try {
        return [{ ...compareTracks(track, track, first, playback), playback }];
      } catch (error) {
        if (error instanceof SlewcurveError) return [];
        throw error;
      }
    }),
  );
  return all
    .filter(({ angle, rate }) => angle > 0 || rate > 0)
    .toSorted((a, b) => b.angle - a.angle || b.rate - a.rate)
    .slice(0, MOST_DISAGREEMENTS);
}

/** Draws the worst findings on the file as it came. */
function pictures(
  { opened }: FileInHand,
  { findings }: FileReport,
  { playbacks }: JobSettings,
): (finding: ReportedFinding) => string | undefined {
  const ranked = findings.toSorted((a, b) => LEVELS.indexOf(a.level) - LEVELS.indexOf(b.level));
  const drawn = new Set(ranked.slice(0, MOST_PICTURES).map(({ fingerprint }) => fingerprint));
  const tracks = opened.file.clips.flatMap((clip) => clip.tracks);
  return ({ fingerprint, clip, track: id, time, keys }) => {
    const track = tracks.find((other) => other.clip === clip && other.id === id);
    if (!track || keys.length === 0 || !drawn.has(fingerprint)) return undefined;
    return tracePicture(track, playbacks[0] ?? 'as-written', time);
  };
}
