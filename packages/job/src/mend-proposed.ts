import { SlewcurveError, type Clip, type RotationTrack } from '@slewcurve/core';
import type { OpenOptions } from '@slewcurve/formats';
import { applySteps, sayStep, type Step } from '@slewcurve/mend';
import { surveyTrack, withDeclaredCuts, type Finding } from '@slewcurve/survey';
import { placeIn } from './place-in.js';
import { clipOnGrid } from './clip-on-grid.js';
import { mendFile, type MendedFile } from './mend-file.js';
import { newFaults } from './new-faults.js';
import type { OpenedFile } from './open-file.js';
import { shiftsKeys, propose, type Declined, type Proposal } from './propose.js';
import type { FileReport } from './report.js';
import type { JobSettings } from './settings.js';
import { UNWATCHED, type Watch } from './watch.js';

/** A file mended by what its survey proposed. */
export interface ProposedMend {
  readonly mended: MendedFile;
  readonly declined: readonly Declined[];
}

/**
 * Mend a file by the remedies that its survey proposes. A remedy that would raise a warning or an error of its own is left out and
 * told.
 *
 * @param before survey of the file as it is
 * @param allow verbs that need allowing and are allowed
 * @throws SlewcurveError what `mendFile` throws
 */
export async function mendProposed(
  opened: OpenedFile,
  before: FileReport,
  settings: JobSettings,
  options: OpenOptions,
  allow: readonly string[],
  watch: Watch = UNWATCHED,
): Promise<ProposedMend> {
  const { steps, declined } = declineHarmful(opened, propose(before, settings, allow), settings);
  return {
    mended: await mendFile(opened, { schemaVersion: 1, steps }, before, settings, options, watch),
    declined,
  };
}

/**
 * The steps of a proposal less those that would leave a warning or an error of their own behind.
 *
 * @param tracks the file's tracks as the proposal found them, in the file's order
 */
export function declineHarmful(
  opened: OpenedFile,
  proposal: Proposal,
  settings: JobSettings,
  tracks: readonly RotationTrack[] = opened.file.clips.flatMap((clip) => clip.tracks),
): { readonly steps: readonly Step[]; readonly declined: readonly Declined[] } {
  const declined = [...proposal.declined];
  const steps: Step[] = [];
  for (const clip of opened.file.clips)
    for (const track of tracks.filter((other) => other.clip === clip.name)) {
      const own = proposal.card.steps.filter((step) => step.clip === clip.name && step.track === track.id);
      if (own.length === 0) continue;
      const held = own.filter((step) => !(opened.file.fixedTimes && shiftsKeys(step)));
      for (const step of own)
        if (!held.includes(step))
          declined.push({
            step,
            why: `the file's columns share rows, so that no key can be put in, dropped or moved (${sayStep(step)})`,
          });
      const tried = trySteps(opened, clip, track, held, settings);
      steps.push(...tried.kept);
      declined.push(...tried.declined);
    }
  return { steps, declined };
}

interface Tried {
  readonly kept: readonly Step[];
  readonly declined: readonly Declined[];
}

/** Steps of one track, less those beside which the mended track has a fault that it did not have before. */
function trySteps(
  opened: OpenedFile,
  clip: Clip,
  track: RotationTrack,
  steps: readonly Step[],
  settings: JobSettings,
): Tried {
  const survey = (subject: RotationTrack): Finding[] =>
    surveyTrack(subject, {
      clip: clipOnGrid(clip, settings.frameRate),
      ...placeIn(opened.file),
      file: opened.name,
      ...settings,
    });
  const before = survey(track);
  const declined: Declined[] = [];
  let kept = steps;
  while (kept.length > 0) {
    const attempt = applied(withDeclaredCuts(track, settings.houseRules), kept);
    if ('refused' in attempt) {
      const { refused, why } = attempt;
      kept = kept.filter((step) => step !== refused);
      declined.push({ step: refused, why: `${why} (${sayStep(refused)})` });
      continue;
    }
    const { tracks, results } = attempt;
    const raised = newFaults(before, survey(tracks[0] ?? track));
    const worst = raised[0];
    if (worst === undefined) break;
    const at = results.findIndex(
      ({ result }) => result.span !== undefined && overlaps(result.span, worst.span),
    );
    const culprit = kept[Math.max(0, at)];
    kept = kept.filter((step) => step !== culprit);
    if (culprit)
      declined.push({
        step: culprit,
        why: `it would leave ${worst.rule} behind: ${worst.message} (${sayStep(culprit)})`,
      });
  }
  return { kept, declined };
}

/** Steps applied, or the first that can't be: a step that mends what it needs may have been declined before. */
function applied(
  track: RotationTrack,
  steps: readonly Step[],
): ReturnType<typeof applySteps> | { readonly refused: Step; readonly why: string } {
  try {
    return applySteps([track], steps);
  } catch (error) {
    const number =
      error instanceof SlewcurveError ? /^\/steps\/(\d+)/.exec(error.place.pointer ?? '')?.[1] : '';
    const refused = steps[Number(number ?? NaN)];
    if (!(error instanceof SlewcurveError) || number === '' || refused === undefined) throw error;
    return { refused, why: error.message };
  }
}

function overlaps(a: readonly [number, number] | undefined, b: readonly [number, number]): boolean {
  return a !== undefined && a[0] <= b[1] && b[0] <= a[1];
}
