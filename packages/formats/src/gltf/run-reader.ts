import { readBuffer, type Buffers, type OpenBuffer } from './buffers.js';
import { AccessorFault, type Run } from './accessor-layout.js';
import { runLength, type RunBytes } from './accessor-data.js';

/** Runs nearer than this are read in one piece: one read costs about what this many bytes cost. */
const GAP = 16_384;

interface Piece {
  readonly offset: number;
  readonly bytes: Uint8Array;
}

/**
 * Reads many runs with few reads and none of what lies far from them. The result gives each run's bytes, and throws
 * AccessorFault `gltf.no-data` for one whose buffer has none.
 */
export async function readRuns(runs: readonly Run[], buffers: Buffers, file: string): Promise<RunBytes> {
  const byBuffer = new Map<number, Run[]>();
  for (const run of runs) {
    const known = byBuffer.get(run.buffer);
    if (known) known.push(run);
    else byBuffer.set(run.buffer, [run]);
  }
  const pieces = new Map<number, Piece[]>();
  for (const [index, wanted] of byBuffer) {
    const buffer = await buffers.open(index);
    if (buffer) pieces.set(index, await readPieces(buffer, wanted, file));
  }
  return (run) => {
    const found = pieces.get(run.buffer);
    const length = runLength(run);
    if (!found) throw noData(run, file);
    if (length === 0) return new Uint8Array(0);
    const piece = pieceAt(found, run.offset);
    return piece.bytes.subarray(run.offset - piece.offset, run.offset - piece.offset + length);
  };
}

async function readPieces(buffer: OpenBuffer, runs: readonly Run[], file: string): Promise<Piece[]> {
  const spans = runs
    .map((run) => ({ from: run.offset, to: run.offset + runLength(run) }))
    .filter(({ from, to }) => to > from);
  // oxlint-disable-next-line unicorn/no-array-sort -- our own list: sorted where it is, no copy
  spans.sort((a, b) => a.from - b.from);
  const pieces: Piece[] = [];
  let open = spans[0];
  if (!open) return pieces;
  const close = async ({ from, to }: { from: number; to: number }): Promise<void> => {
    pieces.push({ offset: from, bytes: await readBuffer(buffer, from, to - from, file) });
  };
  for (const span of spans) {
    if (span.from > open.to + GAP) {
      await close(open);
      open = span;
    } else open = { from: open.from, to: Math.max(open.to, span.to) };
  }
  await close(open);
  return pieces;
}

/** The last piece that starts at or before `offset`; pieces are ascending and every run lies in one. */
function pieceAt(pieces: readonly Piece[], offset: number): Piece {
  let low = 0;
  let high = pieces.length - 1;
  while (low < high) {
    const middle = (low + high + 1) >> 1;
    if ((pieces[middle]?.offset ?? Infinity) <= offset) low = middle;
    else high = middle - 1;
  }
  return pieces[low] ?? { offset, bytes: new Uint8Array(0) };
}

function noData(run: Run, file: string): AccessorFault {
  const pointer = `/buffers/${run.buffer}`;
  return new AccessorFault(
    'gltf.no-data',
    `${file}: ${pointer} has no URI and no BIN chunk, so /bufferViews/${run.view} has no data. Export the file again with its buffers.`,
    { file, pointer },
  );
}
