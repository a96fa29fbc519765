import { caretPath } from '../chart/carets.js';
import { inkBytes } from '../theme/ink-of.js';
import { inkRow } from './ink.js';
import { worstLevel, type RosterRow } from './roster-row.js';

/** Where the ink stands on the canvas, CSS pixels. */
export interface InkPlace {
  readonly width: number;
  /** Distance of two rows; what is drawn of a row stays within it. */
  readonly pitch: number;
  /** From a row's top to its ink, and the ink's height. */
  readonly top: number;
  readonly height: number;
}

/** Inks as resolved CSS colours. */
export interface RosterInks {
  readonly trace: string;
  readonly limit: string;
  readonly caution: string;
  readonly soft: string;
  readonly hairline: string;
}

/** What stands on a canvas: where and in which inks, and which row in each place. */
interface Drawn {
  readonly how: string;
  readonly rows: (RosterRow | undefined)[];
}

const onCanvas = new WeakMap<HTMLCanvasElement, Drawn>();

/**
 * Draws the ink rows and the carets of their findings; `rows` are those on screen, the first at the canvas's top. Rows that stand
 * there already are left alone. True where all is drawn; false where the milliseconds were over before: call again.
 */
export function drawInk(
  canvas: HTMLCanvasElement,
  rows: readonly RosterRow[],
  place: InkPlace,
  inks: RosterInks,
  milliseconds: number,
): boolean {
  const until = performance.now() + milliseconds;
  const ratio = canvas.ownerDocument.defaultView?.devicePixelRatio ?? 1;
  const context = canvas.getContext('2d');
  if (!context) return true;
  const width = Math.max(1, Math.round(place.width * ratio));
  const topOf = (i: number): number => Math.round(i * place.pitch * ratio);
  const drawn = drawnOn(canvas, width, topOf(rows.length), JSON.stringify([place, inks, ratio]));
  const sheet = context.createImageData(width, Math.ceil(place.pitch * ratio));
  const ink = inkBytes(inks.trace);
  for (const [i, row] of rows.entries()) {
    if (drawn.rows[i] === row) continue;
    if (performance.now() > until) return false;
    drawn.rows[i] = row;
    sheet.data.fill(0);
    inkRow(sheet, row.ink, Math.round(place.top * ratio), Math.max(1, Math.round(place.height * ratio)), ink);
    context.putImageData(sheet, 0, topOf(i), 0, 0, width, topOf(i + 1) - topOf(i));
    context.save();
    context.scale(ratio, ratio);
    drawMarks(context, row, i * place.pitch, place, inks);
    context.restore();
  }
  return true;
}

/** What stands on the canvas; nothing, where it has another size or is to look otherwise. */
function drawnOn(canvas: HTMLCanvasElement, width: number, height: number, how: string): Drawn {
  const known = onCanvas.get(canvas);
  const tall = Math.max(1, height);
  if (known?.how === how && canvas.width === width && canvas.height === tall) return known;
  // Giving a size empties it.
  canvas.width = width;
  canvas.height = tall;
  const fresh = { how, rows: [] };
  onCanvas.set(canvas, fresh);
  return fresh;
}

function drawMarks(
  context: CanvasRenderingContext2D,
  row: RosterRow,
  top: number,
  place: InkPlace,
  inks: RosterInks,
): void {
  const foot = Math.round(top + place.top + place.height) + 0.5;
  context.fillStyle = inks.hairline;
  context.fillRect(0, foot, place.width, 1);
  if (!worstLevel(row)) return;
  const size = Math.min(7, place.pitch - place.top - place.height - 1);
  for (const mark of row.marks) {
    const x = row.seconds > 0 ? (mark.time / row.seconds) * place.width : 0;
    const held = Math.min(place.width - size * 0.7, Math.max(size * 0.7, x));
    const path = new Path2D(caretPath(mark.level, held, foot - 1, size));
    context.fillStyle = mark.level === 'error' ? inks.limit : inks.soft;
    context.strokeStyle = inks.caution;
    context.lineWidth = 1.7;
    if (mark.level === 'warning') context.stroke(path);
    // oxlint-disable-next-line unicorn/no-array-fill-with-reference-type -- a canvas is no array
    else context.fill(path);
  }
}
