import { SlewcurveError, nodeChain, type Clip, type RotationTrack } from '@slewcurve/core';
import type { OpenOptions, Source } from '@slewcurve/formats';
import { applySteps, type Step } from '@slewcurve/mend';
import { surveyTrack, withDeclaredCuts, type Finding } from '@slewcurve/survey';
import { clipReport } from './clip-report.js';
import { clipOnGrid } from './clip-on-grid.js';
import { conventionsOf, type SaidConventions } from './conventions.js';
import { cutsAfter } from './cuts-after.js';
import { mendFile } from './mend-file.js';
import { newFaults } from './new-faults.js';
import { openFile, type OpenedFile } from './open-file.js';
import { declineHarmful } from './mend-proposed.js';
import { playbackMatrix, type MatrixSettings, type PlaybackMatrix } from './playback-matrix.js';
import { propose } from './propose.js';
import type { Asks, CardAnswer, OpenedAnswer, TrackAnswer } from './protocol.js';
import type { FileReport } from './report.js';
import { rosterRow, type RosterRow } from './roster-row.js';
import type { JobSettings } from './settings.js';
import { withStamps, type Stamp } from './stamps.js';
import { stepReports } from './step-reports.js';
import { placeIn } from './place-in.js';
import { surveyFile } from './survey-file.js';
import { trackReport } from './track-report.js';
import { tryStep, type TrialAnswer } from './try-step.js';
import { undoPlan } from './undo-plan.js';
import { betweenSlices, type Watch } from './watch.js';
import { withEvents } from './with-events.js';
import { sourceBytes } from './source-bytes.js';

/** Files that are open at once, each with its survey and its job card: what the page's worker holds. No DOM, no Node. */
export interface Desk {
  /** Opens a file; `file` is its name on the desk. Throws what `openAnimation` throws. */
  open(
    file: string,
    source: Source,
    name: string,
    sibling?: (uri: string) => Promise<Source>,
    said?: SaidConventions,
  ): Promise<OpenedAnswer>;
  /** Surveys a file; every track's row is told first. Throws `job.stopped`. */
  survey(
    file: string,
    settings: JobSettings,
    watch: Watch,
    onRow: (row: RosterRow) => void,
  ): Promise<FileReport>;
  /** A track as the file has it and as the card leaves it. Throws `job.no-track`. */
  track(file: string, clip: string, track: string): TrackAnswer;
  /** Worst speed and departure of a track as the card leaves it, by playback and tick rate. Throws `job.no-track`. */
  matrix(file: string, clip: string, track: string, settings: MatrixSettings): PlaybackMatrix;
  /** What a step would make of a track as the card leaves it; nothing is kept. Throws `job.no-track` and what the step throws. */
  trial(file: string, clip: string, track: string, step: Step): TrialAnswer;
  /** Makes `steps` the file's whole card; an error leaves the card before in force. */
  card(file: string, steps: readonly Step[], watch: Watch): Promise<CardAnswer>;
  /** The remedies of what the survey found and no stamp accepts, less those that would do harm. */
  propose(
    file: string,
    allow: readonly string[],
    stamps?: readonly Stamp[],
  ): Asks<never>['propose']['answer'];
  /** The bytes that the card makes of the file, and what takes them back. */
  bytes(file: string, watch: Watch): Promise<Asks<never>['bytes']['answer']>;
  /** Puts a file away. */
  close(file: string): void;
}

interface Folder {
  readonly opened: OpenedFile;
  readonly sibling: ((uri: string) => Promise<Source>) | undefined;
  readonly said: SaidConventions | undefined;
  settings: JobSettings | undefined;
  report: FileReport | undefined;
  steps: readonly Step[];
  /** Tracks as the card leaves them, in the file's order. */
  current: readonly RotationTrack[];
  /** What is found on the tracks that the card changed, by their place in `current`. */
  changed: ReadonlyMap<number, readonly Finding[]>;
}

/** A desk with nothing on it. */
export function desk(): Desk {
  const folders = new Map<string, Folder>();
  const folderOf = (file: string): Folder => {
    const folder = folders.get(file);
    if (folder) return folder;
    throw new SlewcurveError('job.not-open', `No file ${file} is open.`, { file });
  };
  return {
    async open(file, source, name, sibling, said) {
      const opened = await openFile(source, optionsOf(name, sibling, said));
      const current = tracksOf(opened);
      folders.set(file, {
        opened,
        sibling,
        said,
        settings: undefined,
        report: undefined,
        steps: [],
        current,
        changed: new Map(),
      });
      return openedAnswer(opened, said);
    },
    async survey(file, settings, watch, onRow) {
      const folder = folderOf(file);
      await tellRows(folder, settings, watch, onRow);
      const own = folder.said ? { ...settings, said: folder.said } : settings;
      folder.report = await surveyFile(folder.opened.name, folder.opened.file, own, watch);
      folder.settings = own;
      return folder.report;
    },
    track(file, clip, track) {
      const folder = folderOf(file);
      const { before, after } = trackIn(folder, clip, track);
      return trackAnswer(before, after, tracksAbove(folder, after));
    },
    matrix: (file, clip, track, settings) =>
      playbackMatrix(trackIn(folderOf(file), clip, track).after, settings),
    trial: (file, clip, track, step) =>
      trialOf(folderOf(file), trackIn(folderOf(file), clip, track).after, step),
    card: (file, steps, watch) => setCard(folderOf(file), steps, watch),
    propose(file, allow, stamps = []) {
      const folder = surveyed(folderOf(file));
      const proposal = propose(withStamps(currentReport(folder), stamps), folder.settings, allow);
      return declineHarmful(folder.opened, proposal, folder.settings, folder.current);
    },
    async bytes(file, watch) {
      const { opened, sibling, said, steps, report, settings } = surveyed(folderOf(file));
      const options = optionsOf(opened.name, sibling, said);
      const card = { schemaVersion: 1 as const, steps };
      const mended = await mendFile(opened, card, report, settings, options, watch);
      const undo = await undoPlan(mended, watch);
      return {
        bytes: await sourceBytes(mended.result),
        sha256: undo.mended.sha256,
        original: undo.original,
        undo: undo.text,
        card: { ...card, for: { file: opened.name, sha256: undo.original.sha256 } },
      };
    },
    close(file) {
      folders.delete(file);
    },
  };
}

function optionsOf(name: string, sibling: Folder['sibling'], said: SaidConventions | undefined): OpenOptions {
  return { name, ...(sibling && { sibling }), ...(said?.table && { table: said.table }) };
}

/** @throws SlewcurveError `job.no-track` */
function trackIn(
  folder: Folder,
  clip: string,
  track: string,
): { before: RotationTrack; after: RotationTrack } {
  const at = tracksOf(folder.opened).findIndex((other) => other.clip === clip && other.id === track);
  const before = tracksOf(folder.opened)[at];
  const after = folder.current[at];
  if (before && after) return { before, after };
  throw new SlewcurveError('job.no-track', `There is no track ${track} in ${clip}.`, { clip, track });
}

/** Every track's row, drawn first: a survey takes longer. */
async function tellRows(
  folder: Folder,
  settings: JobSettings,
  watch: Watch,
  onRow: (row: RosterRow) => void,
): Promise<void> {
  let done = 0;
  for (const clip of folder.opened.file.clips)
    for (const track of clip.tracks) {
      onRow(rosterRow(currentOf(folder, track), clip, settings.playbacks[0] ?? 'as-written'));
      await betweenSlices(watch, ++done, folder.current.length, 'tracks drawn');
    }
}

async function setCard(folder: Folder, steps: readonly Step[], watch: Watch): Promise<CardAnswer> {
  const { opened, report, settings } = surveyed(folder);
  const stored = tracksOf(opened);
  const cut = stored.map((track) => withDeclaredCuts(track, settings.houseRules));
  const { tracks: edited, results } = applySteps(cut, steps, opened.file.nodes);
  // What no step touched stays the very object that was read.
  const tracks = edited.map((track, at) => (track === cut[at] ? (stored[at] ?? track) : track));
  const houseRules = cutsAfter(settings.houseRules, stored, results);
  const answers: CardAnswer['tracks'][number][] = [];
  const raised: Finding[] = [];
  const changed = new Map(folder.changed);
  for (const [at, track] of tracks.entries()) {
    const clip = clipOf(opened, track);
    if (track === stored[at]) changed.delete(at);
    if (track === folder.current[at] || !clip) continue;
    const findings = surveyTrack(track, {
      clip: clipOnGrid(clip, settings.frameRate),
      ...placeIn(opened.file),
      file: opened.name,
      ...settings,
      houseRules,
    });
    raised.push(...newFaults(report.findings, findings));
    changed.set(at, findings);
    const playback = settings.playbacks[0] ?? 'as-written';
    answers.push({ report: trackReport(track, playback), row: rosterRow(track, clip, playback), findings });
    await betweenSlices(watch, at, tracks.length, 'tracks');
  }
  folder.steps = steps;
  folder.current = tracks;
  folder.changed = changed;
  const { events = [] } = currentReport({ ...folder, report });
  return { tracks: answers, steps: stepReports(results), raised, events };
}

/** On the very tracks that a card would find: with their declared cuts. */
function trialOf(folder: Folder, track: RotationTrack, step: Step): TrialAnswer {
  const { opened, current, settings } = folder;
  const cut = (one: RotationTrack): RotationTrack =>
    settings ? withDeclaredCuts(one, settings.houseRules) : one;
  const on = cut(track);
  const answer = tryStep(
    {
      track: on,
      above: tracksAbove(folder, track).map(cut),
      all: current.map(cut),
      nodes: opened.file.nodes,
    },
    step,
  );
  return answer.after ? { ...answer, after: copyOf(answer.after) } : answer;
}

function surveyed(folder: Folder): Folder & { report: FileReport; settings: JobSettings } {
  const { report, settings } = folder;
  if (report && settings) return { ...folder, report, settings };
  throw new SlewcurveError(
    'job.not-surveyed',
    `${folder.opened.name} is not surveyed yet; wait until it is.`,
  );
}

/** The survey of the file as the card leaves it. */
function currentReport({ report, current, changed }: Folder & { report: FileReport }): FileReport {
  const isChanged = ({ clip, track }: Finding): boolean =>
    [...changed.keys()].some((at) => current[at]?.clip === clip && current[at].id === track);
  const kept = report.findings.filter((finding) => !isChanged(finding));
  return withEvents({ ...report, findings: [...kept, ...[...changed.values()].flat()] });
}

function openedAnswer({ name, source, file }: OpenedFile, said: SaidConventions | undefined): OpenedAnswer {
  return {
    name,
    format: file.format,
    size: source.size,
    nodes: file.nodes,
    clips: file.clips.map(clipReport),
    tracks: file.clips.flatMap((clip) =>
      clip.tracks.map(({ id, times }) => ({ clip: clip.name, track: id, keys: times.length })),
    ),
    problems: file.problems.map(({ code, message }) => ({ code, message })),
    conventions: conventionsOf(file, said),
  };
}

function tracksOf(opened: OpenedFile): RotationTrack[] {
  return opened.file.clips.flatMap((clip) => clip.tracks);
}

function currentOf(folder: Folder, track: RotationTrack): RotationTrack {
  return folder.current[tracksOf(folder.opened).indexOf(track)] ?? track;
}

function clipOf(opened: OpenedFile, track: RotationTrack): Clip | undefined {
  return opened.file.clips.find((clip) => clip.name === track.clip);
}

/** One object twice where nothing was edited, so that nobody compares equal numbers. */
function trackAnswer(
  before: RotationTrack,
  after: RotationTrack,
  above: readonly RotationTrack[],
): TrackAnswer {
  const copy = copyOf(before);
  return { before: copy, after: after === before ? copy : copyOf(after), above: above.map(copyOf) };
}

/** Tracks of the nodes that a track's node hangs on, in its clip. */
function tracksAbove({ opened, current }: Folder, { id, clip }: RotationTrack): RotationTrack[] {
  const { nodes } = opened.file;
  const [, ...above] = nodeChain(
    nodes,
    nodes.findIndex(({ path }) => path === id),
  );
  return above.flatMap((node) =>
    current.filter((track) => track.id === nodes[node]?.path && track.clip === clip).slice(0, 1),
  );
}

/** A copy whose arrays may be handed over. */
function copyOf(track: RotationTrack): RotationTrack {
  return { ...track, times: track.times.slice(), values: track.values.slice() };
}
