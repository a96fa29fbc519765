import { proveEdit, type AppliedStep } from '@slewcurve/mend';
import type { StepReport } from './report.js';
import { significant } from '@slewcurve/survey';

/** What each step of a card did, over all tracks that it named, with the largest change that any of them shows where none may be. */
export function stepReports(applied: readonly AppliedStep[]): StepReport[] {
  const byStep = new Map<number, AppliedStep[]>();
  for (const one of applied) byStep.set(one.number, [...(byStep.get(one.number) ?? []), one]);
  return [...byStep.values()].flatMap((edits) => (edits[0] ? [stepReport(edits[0], edits)] : []));
}

function stepReport({ step }: AppliedStep, edits: readonly AppliedStep[]): StepReport {
  const most = (of: (edit: AppliedStep) => number): number => Math.max(0, ...edits.map(of));
  return {
    step,
    changed: edits.reduce((sum, { result }) => sum + result.changed.length, 0),
    largest: significant(most(({ result }) => result.largest)),
    outside: significant(
      most(({ before, result }) => proveEdit(before, result.track, result, step.keep).outside),
    ),
    added: significant(most(({ result }) => result.added)),
  };
}
