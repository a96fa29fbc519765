import { VERBS, verbNamed, type JobCard, type Step } from '@slewcurve/mend';
import { isAtLeast, type FileReport, type ReportedFinding } from './report.js';
import { isOpen } from './settle-finding.js';
import type { JobSettings } from './settings.js';

/** A remedy that was not taken, and why. */
export interface Declined {
  readonly step: Step;
  readonly why: string;
}

/** Steps for what a survey found. */
export interface Proposal {
  readonly card: JobCard;
  readonly declined: readonly Declined[];
}

/**
 * The remedy of every place at or above `settings.failAt`. A verb that needs allowing is taken only where `allow`
 * names it. Steps of one verb on one track that differ in their keys alone become one; steps that insert keys come last on their
 * track and from the last key to the first, so that every key number on the card is that of the file.
 */
export function propose(report: FileReport, settings: JobSettings, allow: readonly string[] = []): Proposal {
  const wanted = report.findings
    .filter((finding) => isAtLeast(finding.level, settings.failAt))
    .flatMap((finding) => remediesOf(finding, settings));
  const declined: Declined[] = [];
  const steps: Step[] = [];
  for (const step of wanted)
    if (verbNamed(step.verb).needsAllowing && !allow.includes(step.verb))
      declined.push({
        step,
        why: `${step.verb} is a choice of yours: allow it by name (--allow "${step.verb}")`,
      });
    else if (!steps.some((other) => sameStep(other, step))) steps.push(step);
  return { card: { schemaVersion: 1, steps: ordered(merged(steps)) }, declined };
}

/** A finding is as bad as its worst place; a milder place of it is left alone, and so is one that somebody accepted. */
function remediesOf(finding: ReportedFinding, { failAt }: JobSettings): Step[] {
  return finding.occurrences
    .filter((place) => isAtLeast(place.level, failAt) && isOpen(place))
    .flatMap((place) => place.remedy ?? []);
}

function sameStep(a: Step, b: Step): boolean {
  return JSON.stringify(a) === JSON.stringify(b);
}

/** One step for all keys of a verb that takes each key by itself. */
function merged(steps: readonly Step[]): Step[] {
  const byRest = new Map<string, Step>();
  for (const step of steps) {
    const { keys, ...rest } = step;
    const together = verbNamed(step.verb).keysApart && keys !== undefined;
    const name = JSON.stringify(together ? rest : step);
    const known = byRest.get(name);
    byRest.set(name, known?.keys && keys && together ? { ...known, keys: union(known.keys, keys) } : step);
  }
  return [...byRest.values()];
}

function union(a: readonly number[], b: readonly number[]): number[] {
  return [...new Set([...a, ...b])].toSorted((x, y) => x - y);
}

/**
 * In the order in which the edits are listed: keys are mended before a hum is read from them, and noise is averaged after that. Steps that change how many keys
 * there are come last, from the last key to the first.
 */
function ordered(steps: readonly Step[]): Step[] {
  return steps.toSorted(
    (a, b) =>
      Number(shiftsKeys(a)) - Number(shiftsKeys(b)) ||
      (shiftsKeys(a) ? (b.keys?.[0] ?? 0) - (a.keys?.[0] ?? 0) : placeOf(a) - placeOf(b)),
  );
}

function placeOf(step: Step): number {
  return VERBS.indexOf(verbNamed(step.verb));
}

/** Whether a step puts keys in, drops them or gives them other times, which tracks that share rows can't hold, and which shifts later key numbers. */
export function shiftsKeys(step: Step): boolean {
  const { insertsKeys, movesTimes = false } = verbNamed(step.verb);
  return insertsKeys || movesTimes;
}
