import type { Step } from '@slewcurve/mend';

/** A line of the job card as the page shows it. */
export interface CardLine {
  readonly step: Step;
  /** Kept on the page, left out of the card. */
  readonly skipped: boolean;
}

/** The card after one change, and what that change was: "lift out key 19". */
interface CardState {
  readonly lines: readonly CardLine[];
  readonly change: string;
}

/** A job card with everything that it was before: undo and redo are moves in a list, and no state is ever changed. */
export interface CardHistory {
  readonly states: readonly CardState[];
  readonly at: number;
}

export const EMPTY_HISTORY: CardHistory = Object.freeze({ states: [{ lines: [], change: '' }], at: 0 });

export function linesOf(history: CardHistory): readonly CardLine[] {
  return history.states[history.at]?.lines ?? [];
}

/** The steps that are run. */
export function stepsOf(history: CardHistory): Step[] {
  return linesOf(history).flatMap((line) => (line.skipped ? [] : [line.step]));
}

/** A new state after this one; what was undone is forgotten. */
export function withLines(history: CardHistory, lines: readonly CardLine[], change: string): CardHistory {
  const states = [...history.states.slice(0, history.at + 1), { lines, change }];
  return { states, at: states.length - 1 };
}

export function withSteps(history: CardHistory, steps: readonly Step[]): CardHistory {
  const change = steps.length === 1 ? (steps[0]?.verb ?? '') : `${steps.length} edits`;
  return withLines(
    history,
    [...linesOf(history), ...steps.map((step) => ({ step, skipped: false }))],
    change,
  );
}

export function undone(history: CardHistory): CardHistory {
  return { ...history, at: Math.max(0, history.at - 1) };
}

export function redone(history: CardHistory): CardHistory {
  return { ...history, at: Math.min(history.states.length - 1, history.at + 1) };
}

/** What undo would take back; empty where there is nothing. */
export function undoWords(history: CardHistory): string {
  return history.at > 0 ? (history.states[history.at]?.change ?? '') : '';
}

/** What redo would do again; empty where there is nothing. */
export function redoWords(history: CardHistory): string {
  return history.states[history.at + 1]?.change ?? '';
}

/** The line at `from` put at place `to`. */
export function moved(lines: readonly CardLine[], from: number, to: number): CardLine[] {
  const rest = lines.filter((_, i) => i !== from);
  const line = lines[from];
  return line ? [...rest.slice(0, to), line, ...rest.slice(to)] : [...lines];
}
