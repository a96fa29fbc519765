/** A block of notes: where its row begins and how tall it is, px. */
export interface MarginBlock {
  readonly top: number;
  readonly height: number;
}

/** How far each block is pushed down from its row so that none covers the next; the bottom of the last is where the margin ends. */
export function packMargin(
  blocks: readonly MarginBlock[],
  gap: number,
): { readonly pushes: number[]; readonly bottom: number } {
  let bottom = 0;
  const pushes = blocks.map(({ top, height }) => {
    if (height === 0) return 0;
    const push = Math.max(0, bottom + (bottom > 0 ? gap : 0) - top);
    bottom = top + push + height;
    return push;
  });
  return { pushes, bottom };
}
