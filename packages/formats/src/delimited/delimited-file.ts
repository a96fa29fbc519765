import { frameGrid, SlewcurveError, type Clip, type RotationTrack, type SceneNode } from '@slewcurve/core';
import type { AnimationFile, FileProblem, Follower } from '../animation-file.js';
import { nodePaths } from '../node-paths.js';
import type { Source } from '../source.js';
import { lineError } from '../text/text-fault.js';
import { textLines, type TextLine } from '../text/text-lines.js';
import { bodyTrack } from './body-track.js';
import { type Layout, layoutOf, refuseUnnamed } from './layout.js';
import { rowReader, type RowReader } from './row-reader.js';
import { headReader, isComment, type TableHead } from './table-head.js';
import type { TableOptions } from './table-options.js';
import { writePlan } from './write-plan.js';

/** A table is one clip. */
const CLIP = 'table';
/** A body whose columns say no name. */
const NAMELESS = 'rotation';

/**
 * Reads a table of text: a row a sample, a column for the time and one for each number of an orientation. Columns go by their names;
 * where a file has none, or leaves out a sequence or a unit, `options` say them.
 *
 * Times are seconds as stored. Stamps that float64 can't hold (nanoseconds since 1970) are seconds after the whole second of the
 * first; the problem `delimited.epoch` says which that is. Write-back leaves their text alone.
 *
 * @throws SlewcurveError the `delimited.`, `text.` and `source.` codes of a file that can't be read
 */
export async function delimitedFile(
  source: Source,
  name: string,
  options: TableOptions,
): Promise<AnimationFile> {
  const problems: FileProblem[] = [];
  const { head, layout, rows } = await readTable(source, name, options, problems);
  const read = rows.done();
  const nodes = nodesOf(layout);
  let first = 0;
  const bodies = layout.bodies.map((body, node) => {
    const made = bodyTrack(read, body, first, { id: nodes[node]?.path ?? `#${node}`, clip: CLIP, node });
    first += body.columns.length;
    return made;
  });
  if (read.stamps.epoch !== 0n) problems.push(epochProblem(name, read.stamps.epoch));
  problems.push(...bodyProblems(name, layout));
  return Object.freeze({
    format: 'delimited',
    fixedTimes: true,
    nodes: Object.freeze(nodes),
    clips: Object.freeze([clipOf(bodies.map(({ track }) => track))]),
    problems: Object.freeze(problems),
    plan: async (
      changed: readonly RotationTrack[],
      _followers?: readonly Follower[],
      axes: readonly string[] = [],
    ) => {
      if (axes.length > 0) refusePositions(name, options.columns ?? head.names ?? []);
      return writePlan(source, name, head, bodies, changed);
    },
  });
}

/**
 * Positions have axes too, and no column of them is rewritten.
 *
 * @throws SlewcurveError `delimited.positions-stay`
 */
function refusePositions(file: string, names: readonly string[]): void {
  const position = names.find((name) => /^(?:.+[_.\s])?t[_.]?[xyz]$/i.test(name.trim()));
  if (position === undefined) return;
  throw new SlewcurveError(
    'delimited.positions-stay',
    `${file}: the positions in ${position.trim().slice(0, 24)} and its like would stay in the old axes while the orientations turn. Restate the table where it is made.`,
    { file },
  );
}

interface Table {
  readonly head: TableHead;
  readonly layout: Layout;
  readonly rows: RowReader;
}

async function readTable(
  source: Source,
  file: string,
  options: TableOptions,
  problems: FileProblem[],
): Promise<Table> {
  const reader = headReader(file);
  let table: Table | undefined;
  for await (const lines of textLines(source, file)) {
    const rows: TextLine[] = [];
    for (const line of lines) {
      table ??= openTable(file, options, problems, reader.take(line));
      if (table && isRow(line)) rows.push(line);
    }
    table?.rows.take(rows);
  }
  if (table) return table;
  throw new SlewcurveError(
    'delimited.no-rows',
    `${file}: no line has two numbers or more; there is no table in it.`,
    { file, byte: 0 },
  );
}

function isRow(line: TextLine): boolean {
  return !isComment(line) && line.text.trim() !== '';
}

function openTable(
  file: string,
  options: TableOptions,
  problems: FileProblem[],
  head: TableHead | undefined,
): Table | undefined {
  if (!head) return undefined;
  const names = options.columns ?? head.names;
  if (!names) return refuseUnnamed(file, head.cells, head.firstRow);
  if (options.columns && options.columns.length !== head.cells)
    throw lineError(
      file,
      'delimited.column-count',
      head.firstRow,
      `the row has ${head.cells} cells and ${options.columns.length} columns are named for it (--columns).`,
    );
  const layout = layoutOf(file, names, options, options.columns ? undefined : head.namedAt);
  return { head, layout, rows: rowReader(file, problems, layout, head.separator, names.length) };
}

function nodesOf({ bodies }: Layout): SceneNode[] {
  const names = bodies.map(({ name }) => (name === '' ? NAMELESS : name));
  const paths = nodePaths(
    names,
    names.map(() => -1),
  );
  return names.map((name, index) => ({
    path: paths[index] ?? `#${index}`,
    name,
    parent: -1,
    rotation: [0, 0, 0, 1],
    translation: [0, 0, 0],
    scale: [1, 1, 1],
    joint: false,
  }));
}

function clipOf(tracks: readonly RotationTrack[]): Clip {
  const clocks = tracks.map(({ times }) => times);
  const frameRate = frameGrid(clocks);
  let start = Infinity;
  let end = -Infinity;
  for (const times of clocks)
    for (const time of times) {
      if (time < start) start = time;
      if (time > end) end = time;
    }
  return Object.freeze({
    name: CLIP,
    index: 0,
    tracks: Object.freeze(tracks),
    start: Number.isFinite(start) ? start : 0,
    end: Number.isFinite(end) ? end : 0,
    ...(frameRate !== undefined && { frameRate }),
    loop: false,
    marks: Object.freeze([]),
  });
}

function epochProblem(file: string, epoch: bigint): FileProblem {
  return {
    code: 'delimited.epoch',
    level: 'note',
    message: `${file}: times are told in seconds after ${epoch} s, so that none of their digits is lost; the file keeps its own.`,
    place: { file },
  };
}

function bodyProblems(file: string, layout: Layout): FileProblem[] {
  return layout.doubled.map((name): FileProblem => ({
    code: 'delimited.two-forms',
    level: 'note',
    message: `${file}: the orientation of ${name || NAMELESS} stands in two forms; the quaternion or the matrix is read and written, the other stays as it is.`,
    place: { file },
  }));
}
