import { proveEdit, type AppliedStep, type Price } from '@slewcurve/mend';
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
    ...droppedKeys(edits),
    ...paceReport(edits),
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

/** Worst price and worst bends over the tracks that a pace was given to. */
function paceReport(edits: readonly AppliedStep[]): Pick<StepReport, 'price' | 'bends'> {
  const prices = edits.flatMap(({ result }) => result.price ?? []);
  if (prices.length === 0) return {};
  const worst = (of: (price: Price) => number): number =>
    significant(prices.reduce((most, price) => Math.max(most, of(price)), -Infinity));
  const bends = edits.flatMap(({ result }) => result.bends ?? []);
  // oxlint-disable-next-line unicorn/no-array-sort -- our own list: sorted where it is, no copy
  bends.sort((a, b) => b.jump - a.jump);
  return {
    price: {
      seconds: worst(({ seconds }) => seconds),
      degrees: worst(({ degrees }) => degrees),
      bytes: prices.reduce((sum, { bytes }) => sum + bytes, 0),
    },
    bends: bends.slice(0, 20).map(({ time, jump }) => ({ time, jump: significant(jump) })),
  };
}
