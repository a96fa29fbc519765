import { SlewcurveError } from '@slewcurve/core';
import type { Source } from '../source.js';
import { textLines } from '../text/text-lines.js';
import { meaningOf, type ColumnMeaning } from './column-name.js';
import { splitRows } from './split-rows.js';
import { headReader, isComment, type TableHead } from './table-head.js';
import type { TableOptions } from './table-options.js';

/** Rows that are shown. */
const SHOWN = 5;

/** What a table does not say of itself, and must be told: a name for every column, the sequence of its angles, their unit. */
export type TableSilence = 'columns' | 'euler' | 'unit';

/** The head of a table of text and its first rows, as they stand. */
export interface TableLook {
  /** Names of the columns; undefined where no header has them. */
  readonly names: readonly string[] | undefined;
  readonly rows: readonly (readonly string[])[];
  /** What must be told before it can be read. */
  readonly silent: readonly TableSilence[];
}

/**
 * Looks at a table without reading it: what its first rows are and what it leaves open, so that nothing else is asked.
 *
 * @throws SlewcurveError `delimited.no-rows`, and the `text.` and `source.` codes of a damaged file
 */
export async function lookAtTable(
  source: Source,
  file: string,
  options: TableOptions = {},
): Promise<TableLook> {
  const reader = headReader(file);
  let head: TableHead | undefined;
  const rows: (readonly string[])[] = [];
  for await (const lines of textLines(source, file)) {
    for (const line of lines) {
      head ??= reader.take(line);
      if (!head || isComment(line) || line.text.trim() === '' || rows.length === SHOWN) continue;
      rows.push(splitRows(file, [line], head.separator)[0]?.cells ?? []);
    }
    if (rows.length === SHOWN) break;
  }
  if (!head)
    throw new SlewcurveError(
      'delimited.no-rows',
      `${file}: no line has two numbers or more; there is no table in it.`,
      {
        file,
        byte: 0,
      },
    );
  const names = options.columns ?? head.names;
  return { names, rows, silent: silencesOf(names, options) };
}

function silencesOf(names: readonly string[] | undefined, { euler, unit }: TableOptions): TableSilence[] {
  const meanings = (names ?? []).flatMap((name) => meaningOf(name) ?? []);
  const parts = meanings.filter((meaning) => meaning.kind !== 'time');
  if (parts.length === meanings.length) return ['columns'];
  if (isExact(parts)) return [];
  const angles = parts.filter(({ kind }) => kind === 'angles');
  const turns = countOf(parts, 'axis') >= 3 ? parts.filter(({ kind }) => kind === 'turn') : [];
  const measured = angles.length > 0 ? angles : turns;
  if (measured.length === 0) return ['columns'];
  const isUnnamed = unit === undefined && measured.every((part) => part.unit === undefined);
  return [
    ...(angles.length > 1 && euler === undefined ? (['euler'] as const) : []),
    ...(isUnnamed ? (['unit'] as const) : []),
  ];
}

type Part = Exclude<ColumnMeaning, { kind: 'time' }>;

/** Whether there is a quaternion or a matrix, which need neither sequence nor unit. */
function isExact(parts: readonly Part[]): boolean {
  const isPlain = countOf(parts, 'plain') >= 4 && parts.some(({ part }) => part === 'w');
  return isPlain || countOf(parts, 'quaternion') >= 4 || countOf(parts, 'matrix') >= 9;
}

function countOf(parts: readonly Part[], kind: Part['kind']): number {
  return parts.filter((part) => part.kind === kind).length;
}
