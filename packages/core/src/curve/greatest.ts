/** Steps of the even grid that a search starts from; between two of them one local maximum is looked for. */
const STEPS = 24;
const GOLDEN = (3 - Math.sqrt(5)) / 2;

/** A place where a function may be narrow: `width` is the distance over which it changes. */
export interface NarrowPlace {
  readonly at: number;
  readonly width: number;
}

/**
 * Where `f` is greatest in `[a, b]`; the earliest of equals. Searched on an even grid, refined geometrically about each narrow
 * place down to its width, then by golden section in every cell that may hold the maximum. A maximum narrower than a 24th of the
 * interval is found only where a narrow place says so.
 */
export function greatest(
  f: (x: number) => number,
  a: number,
  b: number,
  narrow: readonly NarrowPlace[] = [],
): number {
  const grid = searchGrid(a, b, narrow);
  const values = grid.map(f);
  let best = 0;
  for (let i = 1; i < grid.length; i++) if (values[i] > values[best]) best = i;
  let at = grid[best];
  let most = values[best];
  const worthy = 0.8 * most;
  for (let i = 0; i < grid.length; i++) {
    const before = Math.max(0, i - 1);
    const after = Math.min(grid.length - 1, i + 1);
    if (values[i] < worthy || values[i] < values[before] || values[i] < values[after]) continue;
    const x = climb(f, grid[before], grid[after]);
    const value = f(x);
    if (value > most) {
      most = value;
      at = x;
    }
  }
  return at;
}

function searchGrid(a: number, b: number, narrow: readonly NarrowPlace[]): number[] {
  if (!(b > a)) return [a];
  const grid: number[] = [];
  for (let i = 0; i <= STEPS; i++) grid.push(i === STEPS ? b : a + ((b - a) * i) / STEPS);
  for (const { at, width } of narrow) {
    grid.push(at);
    for (let step = Math.max(width / 4, Number.EPSILON); step < (b - a) / STEPS; step *= 2)
      grid.push(at - step, at + step);
  }
  if (narrow.length === 0) return grid;
  const sorted = Float64Array.from(grid.filter((x) => x >= a && x <= b));
  // oxlint-disable-next-line unicorn/no-array-sort -- our own list: sorted where it is, no copy
  sorted.sort();
  return [...sorted].filter((x, i, all) => i === 0 || x > all[i - 1]);
}

/** Golden section (J. Kiefer 1953, from memory) in a cell that holds one maximum. */
function climb(f: (x: number) => number, a: number, b: number): number {
  let x = a + GOLDEN * (b - a);
  let y = b - GOLDEN * (b - a);
  let fx = f(x);
  let fy = f(y);
  // A maximum is flat: 40 steps (2e-9 of the cell) put its place past where its value still changes in float64.
  for (let i = 0; i < 40; i++) {
    if (fx >= fy) {
      b = y;
      y = x;
      fy = fx;
      x = a + GOLDEN * (b - a);
      fx = f(x);
    } else {
      a = x;
      x = y;
      fx = fy;
      y = b - GOLDEN * (b - a);
      fy = f(y);
    }
  }
  return fx >= fy ? x : y;
}
