import { caretPath } from '../chart/carets.js';
import { inkBytes } from '../theme/ink-of.js';
import { inkRow } from './ink.js';
import { worstLevel, type RosterRow } from './roster-row.js';

/** Where the ink stands on the canvas, CSS pixels. */
export interface InkPlace {
  readonly width: number;
  /** Distance of two rows. */
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

/** Draws the ink rows and the carets of their findings; `rows` are those on screen, the first at the canvas's top. */
export function drawInk(
  canvas: HTMLCanvasElement,
  rows: readonly RosterRow[],
  place: InkPlace,
  inks: RosterInks,
): void {
  const ratio = canvas.ownerDocument.defaultView?.devicePixelRatio ?? 1;
  const width = Math.max(1, Math.round(place.width * ratio));
  const height = Math.max(1, Math.round(rows.length * place.pitch * ratio));
  if (canvas.width !== width) canvas.width = width;
  if (canvas.height !== height) canvas.height = height;
  const context = canvas.getContext('2d');
  if (!context) return;
  const sheet = context.createImageData(width, height);
  const ink = inkBytes(inks.trace);
  rows.forEach((row, i) =>
    inkRow(
      sheet,
      row.ink,
      Math.round((i * place.pitch + place.top) * ratio),
      Math.max(1, Math.round(place.height * ratio)),
      ink,
    ),
  );
  context.putImageData(sheet, 0, 0);
  context.save();
  context.scale(ratio, ratio);
  rows.forEach((row, i) => drawMarks(context, row, i * place.pitch, place, inks));
  context.restore();
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
  const size = Math.min(7, place.pitch - place.top - place.height + 2);
  for (const mark of row.marks) {
    const x = row.seconds > 0 ? (mark.time / row.seconds) * place.width : 0;
    const held = Math.min(place.width - size * 0.6, Math.max(size * 0.6, x));
    const path = new Path2D(caretPath(mark.level, held, foot - 1, size));
    context.fillStyle = mark.level === 'error' ? inks.limit : inks.soft;
    context.strokeStyle = inks.caution;
    context.lineWidth = 1.7;
    if (mark.level === 'warning') context.stroke(path);
    // oxlint-disable-next-line unicorn/no-array-fill-with-reference-type -- a canvas is no array
    else context.fill(path);
  }
}
