import {
  proveEdit,
  storedBytes,
  type AppliedStep,
  type EditProof,
  type Meeting,
  type Price,
} from '@slewcurve/mend';
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
  const proofs = edits.map(({ before, result }) => proveEdit(before, result.track, result, step.keep));
  return {
    step,
    changed: edits.reduce((sum, { result }) => sum + result.changed.length, 0),
    largest: significant(most(({ result }) => result.largest)),
    outside: significant(Math.max(0, ...proofs.map((proof) => proof.outside))),
    added: significant(most(({ result }) => result.added)),
    ...droppedKeys(edits),
    ...paceReport(edits, proofs),
  };
}

function droppedKeys(edits: readonly AppliedStep[]): Pick<StepReport, 'dropped'> {
  const dropped = edits.flatMap(({ before: { clip, id: track }, result }) =>
    result.dropped === undefined || result.dropped.length === 0
      ? []
      : [{ clip, track, keys: result.dropped }],
  );
  return dropped.length === 0 ? {} : { dropped };
}

/** Worst price, worst bends and worst join over the tracks. */
function paceReport(
  edits: readonly AppliedStep[],
  proofs: readonly EditProof[],
): Pick<StepReport, 'price' | 'bends' | 'meeting'> {
  const prices = edits.map((edit, i) => edit.result.price ?? plainPrice(edit, proofs[i]?.inside ?? 0));
  const worst = (of: (price: Price) => number): number =>
    significant(prices.reduce((most, price) => Math.max(most, of(price)), -Infinity));
  const rounded = worst((price) => price.rounded ?? -Infinity);
  const price = {
    seconds: worst(({ seconds }) => seconds),
    degrees: worst(({ degrees }) => degrees),
    bytes: prices.reduce((sum, { bytes }) => sum + bytes, 0),
    ...(rounded >= 0 && { rounded }),
  };
  const meetings = edits.flatMap(({ result }) => result.meeting ?? []);
  if (edits.every(({ result }) => result.bends === undefined)) return { price };
  const bends = edits.flatMap(({ result }) => result.bends ?? []);
  // oxlint-disable-next-line unicorn/no-array-sort -- our own list: sorted where it is, no copy
  bends.sort((a, b) => b.jump - a.jump);
  return {
    price,
    bends: bends.slice(0, 20).map(({ time, jump }) => ({ time, jump: significant(jump) })),
    ...(meetings.length > 0 && { meeting: worstMeeting(meetings) }),
  };
}

/** What an edit costs that is no pace. */
function plainPrice({ before, result }: AppliedStep, degrees: number): Price {
  return { seconds: result.added, degrees, bytes: storedBytes(result.track) - storedBytes(before) };
}

function worstMeeting(meetings: readonly Meeting[]): Meeting {
  const { before, after, axis } = meetings.reduce((a, b) => (gapOf(b) > gapOf(a) ? b : a));
  return { before: significant(before), after: significant(after), axis: significant(axis) };
}

function gapOf({ before, after }: Meeting): number {
  return Math.abs(before - after) / Math.max(before, after);
}
