/** Rows of numbers that grow with what is read, in pieces, so that nothing is copied and nothing claimed is allocated. */
export interface NumberTable {
  rows(): number;
  /** A new row, as the place in memory where its numbers are to be written. */
  add(): { readonly piece: Float64Array; readonly at: number };
  value(row: number, column: number): number;
}

const PIECE = 1 << 15;

export function numberTable(width: number): NumberTable {
  const pieceRows = Math.max(1, Math.floor(PIECE / Math.max(1, width)));
  const pieces: Float64Array[] = [];
  let rows = 0;
  return {
    rows: () => rows,
    add() {
      const piece = (pieces[Math.floor(rows / pieceRows)] ??= new Float64Array(pieceRows * width));
      return { piece, at: (rows++ % pieceRows) * width };
    },
    value: (row, column) => pieces[Math.floor(row / pieceRows)]?.[(row % pieceRows) * width + column] ?? NaN,
  };
}
