import { SlewcurveError, type RotationTrack } from '@slewcurve/core';
import {
  invertPatchPlan,
  patchedSource,
  type Follower,
  type OpenOptions,
  type PatchPlan,
  type Source,
} from '@slewcurve/formats';
import { applySteps, type AppliedStep, type JobCard } from '@slewcurve/mend';
import { withDeclaredCuts, type Finding } from '@slewcurve/survey';
import { cutsAfter } from './cuts-after.js';
import { newFaults } from './new-faults.js';
import { openFile, type OpenedFile } from './open-file.js';
import type { FileReport, StepReport } from './report.js';
import type { JobSettings } from './settings.js';
import { stepReports } from './step-reports.js';
import { surveyFile } from './survey-file.js';
import { UNWATCHED, type Watch } from './watch.js';

/** A mended file, not yet written anywhere. */
export interface MendedFile {
  readonly opened: OpenedFile;
  /** The steps that were run. */
  readonly card: JobCard;
  readonly plan: PatchPlan;
  /** The plan that makes the old file from the new one. */
  readonly undo: PatchPlan;
  /** The new file's bytes. */
  readonly result: Source;
  /** Survey of the new file, read back from its bytes. */
  readonly report: FileReport;
  readonly steps: readonly StepReport[];
  /** Warnings and errors that the old file did not have. */
  readonly raised: readonly Finding[];
}

/**
 * Run a job card on an opened file and read the result back from its new bytes. Steps act on tracks with their declared cuts; where a pace moves one, the
 * result is surveyed with the cut at its new time.
 *
 * @param before survey of the file as it was
 * @throws SlewcurveError what `applySteps` and `AnimationFile.plan` throw; `mend.outside-changed` where the result differs from the
 *   file where it must not
 */
export async function mendFile(
  opened: OpenedFile,
  card: JobCard,
  before: FileReport,
  settings: JobSettings,
  options: OpenOptions,
  watch: Watch = UNWATCHED,
): Promise<MendedFile> {
  const tracks = opened.file.clips.flatMap((clip) => clip.tracks);
  const cut = tracks.map((track) => withDeclaredCuts(track, settings.houseRules));
  const applied = applySteps(cut, card.steps, opened.file.nodes);
  const changed = applied.tracks.filter((track) => !cut.includes(track));
  const plan = await opened.file.plan(changed, followersOf(applied.results), axesOf(applied.results));
  const result = patchedSource(opened.source, plan);
  const again = await openFile(result, options);
  assertOthersEqual(tracks, again, changed);
  const houseRules = cutsAfter(settings.houseRules, tracks, applied.results);
  const report = await surveyFile(opened.name, again.file, { ...settings, houseRules }, watch);
  return {
    opened,
    card,
    plan,
    undo: await invertPatchPlan(opened.source, plan),
    result,
    report,
    steps: stepReports(applied.results),
    raised: newFaults(before.findings, report.findings),
  };
}

/** Changes of axes, in the order of the steps; each is of all tracks. */
function axesOf(applied: readonly AppliedStep[]): string[] {
  const bySteps = new Map(applied.map(({ number, result }) => [number, result.axes]));
  return [...bySteps.values()].filter((axes) => axes !== undefined);
}

/** What else goes by the new clocks, in the order of the steps. */
function followersOf(applied: readonly AppliedStep[]): Follower[] {
  return applied.flatMap(({ before, result: { repaced } }) => {
    if (!repaced || repaced.with === 'track') return [];
    const { turnsBack, turnsAt } = repaced.retiming;
    const newTime = (old: number): number => repaced.retiming.newTime(old);
    return [
      {
        clip: before.clip,
        turnsBack,
        newTime,
        ...(repaced.with === 'node' && { track: before.id }),
        ...(turnsAt !== undefined && { turnsAt }),
      },
    ];
  });
}

/** Every track that no step named must come back from the new bytes as it was. */
function assertOthersEqual(
  before: readonly RotationTrack[],
  again: OpenedFile,
  changed: readonly RotationTrack[],
): void {
  const after = again.file.clips.flatMap((clip) => clip.tracks);
  const touched = new Set(changed.map(nameOf));
  before.forEach((track, i) => {
    const other = after[i];
    if (
      other === undefined ||
      nameOf(other) !== nameOf(track) ||
      (!touched.has(nameOf(track)) && !sameNumbers(track, other))
    )
      throw new SlewcurveError(
        'mend.outside-changed',
        `${track.id} in ${track.clip} would come back changed though no step names it. Nothing was written; this is a fault of Slewcurve's.`,
        { file: again.name, clip: track.clip, track: track.id },
      );
  });
}

function nameOf(track: RotationTrack): string {
  return JSON.stringify([track.clip, track.id]);
}

function sameNumbers(a: RotationTrack, b: RotationTrack): boolean {
  return sameArray(a.times, b.times) && sameArray(a.values, b.values);
}

/** To the bit: NaN equals NaN, and 0 is not -0. */
function sameArray(a: Float64Array, b: Float64Array): boolean {
  return a.length === b.length && a.every((value, i) => Object.is(value, b[i]));
}
