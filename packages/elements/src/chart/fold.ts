/** One line of the folded trace. Seconds. */
export interface FoldRow {
  readonly index: number;
  readonly from: number;
  /** Where the paper ends; the motion may end before. */
  readonly to: number;
}

/** Rows at most: a trace of a day folded by the second would never end. */
export const ROWS_AT_MOST = 2000;

/**
 * The rows of a motion from `start` to `end` seconds, `seconds` long each. Rows begin at whole folds of the file's own clock
 * where the motion begins on one, else at its start, so that equal cycles lie under one another.
 */
export function foldRows(start: number, end: number, seconds: number): FoldRow[] {
  const fold = soundFold(start, end, seconds);
  // A last key that lies on a fold belongs to the row that ends there; 1e-6 is below any stored time step.
  const count = Math.max(1, Math.ceil((end - start) / fold - 1e-6));
  return Array.from({ length: count }, (_, index) => ({
    index,
    from: start + index * fold,
    to: start + (index + 1) * fold,
  }));
}

/** The row that a time stands in, held to the first and last. */
export function rowAt(rows: readonly FoldRow[], time: number): number {
  const first = rows[0];
  const fold = first.to - first.from;
  return Math.min(rows.length - 1, Math.max(0, Math.floor((time - first.from) / fold + 1e-9)));
}

/** Folds to choose from, seconds: what is asked for, one loop, and the usual ones. */
export function foldChoices(seconds: number, loop?: number): number[] {
  const usual = [1, 2, 5, 10, 20, 30, 60];
  const all = [...usual.filter((fold) => fold <= Math.max(10, seconds * 1.2)), ...(loop ? [loop] : [])];
  return [...new Set(all)].toSorted((a, b) => a - b);
}

function soundFold(start: number, end: number, seconds: number): number {
  const fold = Number.isFinite(seconds) && seconds > 0 ? seconds : 10;
  return Math.max(fold, (end - start) / ROWS_AT_MOST);
}
