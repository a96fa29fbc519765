/** The ink of a track's row, to be drawn at any width without losing a bin. */
export interface TrackInk {
  /** How dark each of equal bins of time is, 0 to 1. */
  readonly density: Float32Array;
  /** The darkest of them. */
  readonly darkest: number;
}

/** Pixels as a canvas holds them: four bytes each, row by row. */
export interface InkSheet {
  readonly width: number;
  readonly height: number;
  readonly data: Uint8ClampedArray;
}

/** Ink for usual speeds: fast but usual stays pale. */
const PALE = 0.3;
/** Speeds this many times the usual are as black as ink gets. */
const BLACK_AT = 6;
/** Speeds kept up this long are usual for their place, however fast, seconds: a whip is no pop. */
const KEPT_UP = 0.1;

/**
 * The ink of a track.
 *
 * @param speeds greatest speed of equal bins of time, deg/s; a bin should be about a frame
 * @param bin seconds
 * @param noiseFloor deg/s
 */
export function trackInk(speeds: ArrayLike<number>, bin: number, noiseFloor: number): TrackInk {
  const habit = habitOf(speeds);
  // A pop of one frame may touch two bins; the length must be longer, else it would count as kept up.
  const kept = keptUp(speeds, Math.max(3, Math.round(KEPT_UP / bin)));
  const density = new Float32Array(speeds.length);
  let darkest = 0;
  for (let i = 0; i < density.length; i++) {
    density[i] = inkDensity(speeds[i], Math.max(habit, kept[i]), noiseFloor);
    darkest = Math.max(darkest, density[i]);
  }
  return { density, darkest };
}

/**
 * How dark a speed is, 0 to 1, against what is usual: nothing at the noise floor, pale up to the usual (by its square root, so
 * that slow motion is seen), then darker by the logarithm.
 */
export function inkDensity(speed: number, usual: number, noiseFloor: number): number {
  if (!(speed > noiseFloor)) return 0;
  const habit = Math.max(usual, noiseFloor);
  if (!(habit > 0)) return 1;
  if (speed <= habit) return PALE * Math.sqrt(speed / habit);
  return Math.min(1, PALE + ((1 - PALE) * Math.log(speed / habit)) / Math.log(BLACK_AT));
}

/** The 95th percentile of speeds, deg/s: a track's own habit. */
export function habitOf(speeds: ArrayLike<number>): number {
  const sorted = Float32Array.from(speeds).toSorted();
  return sorted.length === 0 ? 0 : sorted[Math.floor(0.95 * (sorted.length - 1))];
}

/**
 * At each bin the greatest speed that is kept up over `length` bins around it: the grey-scale opening of mathematical morphology
 * (least over a window, then greatest over the same window turned round), which takes away every peak narrower than the window.
 * Beyond the ends lies nothing, so a window there is shorter.
 */
export function keptUp(speeds: ArrayLike<number>, length: number): Float32Array {
  const before = Math.floor((length - 1) / 2);
  const least = slidingExtreme(speeds, before, length - 1 - before, (a, b) => a <= b);
  return slidingExtreme(least, length - 1 - before, before, (a, b) => a >= b);
}

/** Extreme over `[i − before, i + after]` for every i, each number looked at twice at most (a queue of candidates). */
function slidingExtreme(
  values: ArrayLike<number>,
  before: number,
  after: number,
  beats: (a: number, b: number) => boolean,
): Float32Array {
  const out = new Float32Array(values.length);
  const queue = new Int32Array(values.length);
  let head = 0;
  let tail = 0;
  for (let next = 0, i = 0; i < values.length; i++) {
    for (; next < values.length && next <= i + after; next++) {
      while (tail > head && beats(values[next], values[queue[tail - 1]])) tail--;
      queue[tail++] = next;
    }
    while (queue[head] < i - before) head++;
    out[i] = values[queue[head]];
  }
  return out;
}

/**
 * Greatest number in each of `width` equal columns. Columns share the bin that their border falls in, so no number is ever lost.
 */
export function columnMaxima(values: Float32Array, width: number): Float32Array {
  const columns = new Float32Array(width);
  const step = values.length / width;
  for (let column = 0; column < width; column++) {
    const last = Math.min(values.length - 1, Math.floor((column + 1) * step));
    let most = 0;
    for (let bin = Math.floor(column * step); bin <= last; bin++) most = Math.max(most, values[bin]);
    columns[column] = most;
  }
  return columns;
}

const drawn = new WeakMap<TrackInk, Float32Array>();

/** Darkest bin in each column; kept, since a roster is drawn again and again at one width. */
function columnsOf(ink: TrackInk, width: number): Float32Array {
  const known = drawn.get(ink);
  if (known?.length === width) return known;
  const columns = columnMaxima(ink.density, width);
  drawn.set(ink, columns);
  return columns;
}

/**
 * Writes one row's ink straight into the sheet: a column a pixel, the darkest bin within it, never the mean, so that a pop of one
 * frame among millions stands out. Column height follows darkness too, so that the row reads in grey and on paper.
 *
 * @param color red, green, blue, 0 to 255
 */
export function inkRow(
  sheet: InkSheet,
  ink: TrackInk,
  top: number,
  height: number,
  color: readonly [number, number, number],
): void {
  const columns = columnsOf(ink, sheet.width);
  // A pixel at a time; canvases exist on little-endian machines alone.
  const pixels = new Uint32Array(sheet.data.buffer, sheet.data.byteOffset, sheet.data.length / 4);
  const opaque = (color[2] << 16) | (color[1] << 8) | color[0];
  const colors = new Uint32Array(sheet.width);
  const tops = new Int32Array(sheet.width);
  for (let x = 0; x < sheet.width; x++) {
    const density = columns[x];
    const tall = density === 0 ? 0 : Math.max(1, Math.round(height * (0.35 + 0.65 * density)));
    tops[x] = top + height - tall;
    colors[x] = (Math.round(255 * (0.22 + 0.78 * density)) << 24) | opaque;
  }
  // Line by line, as the pixels lie in memory.
  for (let y = Math.max(0, top); y < Math.min(sheet.height, top + height); y++)
    for (let x = 0; x < sheet.width; x++) if (y >= tops[x]) pixels[y * sheet.width + x] = colors[x];
}
