/** The rows of a long list that are on screen. */
export interface RowWindow {
  readonly first: number;
  /** Not counted in. */
  readonly last: number;
}

/** Rows to build for a list of `count` rows of `pitch` pixels, scrolled to `top`, `height` pixels high; `spare` more each side. */
export function rowWindow(count: number, pitch: number, top: number, height: number, spare = 6): RowWindow {
  const first = Math.max(0, Math.floor(top / pitch) - spare);
  return {
    first: Math.min(first, Math.max(0, count - 1)),
    last: Math.min(count, Math.ceil((top + height) / pitch) + spare),
  };
}

/** Where to scroll so that row `index` is wholly seen, moving as little as needed. */
export function scrollToRow(index: number, pitch: number, top: number, height: number): number {
  const from = index * pitch;
  if (from < top) return from;
  return from + pitch > top + height ? from + pitch - height : top;
}
