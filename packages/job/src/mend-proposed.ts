import type { Clip, RotationTrack } from '@slewcurve/core';
import type { OpenOptions } from '@slewcurve/formats';
import { applySteps, sayStep, verbNamed, type Step } from '@slewcurve/mend';
import { surveyTrack, withDeclaredCuts, type Finding } from '@slewcurve/survey';
import { mendFile, type MendedFile } from './mend-file.js';
import { newFaults } from './new-faults.js';
import type { OpenedFile } from './open-file.js';
import { propose, type Declined, type Proposal } from './propose.js';
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
      const held = own.filter((step) => !(opened.file.fixedTimes && verbNamed(step.verb).insertsKeys));
      for (const step of own)
        if (!held.includes(step))
          declined.push({
            step,
            why: `the file's columns share rows, so that no key can be put in (${sayStep(step)})`,
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
    surveyTrack(subject, { clip, nodes: opened.file.nodes, file: opened.name, ...settings });
  const before = survey(track);
  const declined: Declined[] = [];
  let kept = steps;
  while (kept.length > 0) {
    const { tracks, results } = applySteps([withDeclaredCuts(track, settings.houseRules)], kept);
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

function overlaps(a: readonly [number, number] | undefined, b: readonly [number, number]): boolean {
  return a !== undefined && a[0] <= b[1] && b[0] <= a[1];
}
