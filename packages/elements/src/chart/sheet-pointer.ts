import { holdPointer, shareAcross } from '../theme/hold-pointer.js';
import type { FoldRow } from './fold.js';

type Span = readonly [number, number];

/** A drag shorter than this is a click, px. */
const DRAG = 4;

/** A point on a row's paper, px. */
export interface Point {
  readonly x: number;
  readonly y: number;
}

/** What mouse, pen and finger do on the paper. Times in seconds, not held to the motion. */
export interface SheetEvents {
  hover(time: number): void;
  /** A click; with Shift it widens the span. */
  go(time: number, widen: boolean): void;
  /** A drag along the row; settled when let go. */
  drag(span: Span, settled: boolean): void;
  note(id: string): void;
  /** Whether a drag from a point takes hold there: one that sets out upright, or any. */
  catches(row: FoldRow, point: Point): 'upright' | 'any' | undefined;
  /** A drag takes hold: of a handle by its name, or of the trace. */
  grab(row: FoldRow, grip: string | undefined, point: Point): void;
  pull(row: FoldRow, point: Point): void;
  /** What was held is at rest, or, `lost`, was taken away by the browser. */
  rest(lost: boolean): void;
}

/**
 * One pointer on the rows of the trace: hover reads, click sets the cursor, a drag along the row chooses a span, one up or down presses the trace,
 * a handle is drawn wherever it leads, a caret chooses its note.
 */
export class SheetPointer {
  private press: { from: Point; time: number; grip: string | undefined } | undefined;
  private doing: 'span' | 'hand' | undefined;
  private readonly events: SheetEvents;

  constructor(events: SheetEvents) {
    this.events = events;
  }

  /** Whether a button is down. */
  get pressed(): boolean {
    return this.press !== undefined;
  }

  move(event: PointerEvent, row: FoldRow): void {
    const { press } = this;
    const time = timeAt(event, row);
    if (!press) return this.events.hover(time);
    const point = pointAt(event);
    this.doing ??= this.begun(press, point, row);
    if (this.doing === 'hand') this.events.pull(row, point);
    else this.events.hover(time);
    if (this.doing === 'span') this.events.drag(between(press.time, time), false);
  }

  down(event: PointerEvent, row: FoldRow): void {
    if (event.button !== 0) return;
    const note = noteUnder(event);
    const grip = gripUnder(event);
    if (note !== undefined && grip === undefined) return this.events.note(note);
    holdPointer(event);
    this.doing = undefined;
    this.press = { from: pointAt(event), time: timeAt(event, row), grip };
  }

  /** Whether something was settled. */
  up(event: PointerEvent, row: FoldRow): boolean {
    const { press, doing } = this;
    this.press = undefined;
    this.doing = undefined;
    if (!press) return false;
    const time = timeAt(event, row);
    if (doing === 'span') this.events.drag(between(press.time, time), true);
    else if (doing === 'hand') this.events.rest(false);
    else this.events.go(time, event.shiftKey);
    return doing !== 'hand';
  }

  /** Escape, or a pointer that the browser took away. */
  cancel(): void {
    if (this.doing === 'hand') this.events.rest(true);
    this.press = undefined;
    this.doing = undefined;
  }

  /** What a drag turns out to be, once it is one. */
  private begun(
    { from, grip }: NonNullable<SheetPointer['press']>,
    point: Point,
    row: FoldRow,
  ): 'span' | 'hand' | undefined {
    const across = Math.abs(point.x - from.x);
    const upright = Math.abs(point.y - from.y);
    if (Math.max(across, upright) < DRAG) return undefined;
    const caught = grip === undefined ? this.events.catches(row, from) : 'any';
    if (!caught || (caught === 'upright' && across >= upright)) return 'span';
    this.events.grab(row, grip, from);
    return 'hand';
  }
}

function timeAt(event: PointerEvent, row: FoldRow): number {
  return row.from + shareAcross(event) * (row.to - row.from);
}

/** From the top left of the element that listens. */
function pointAt({ currentTarget, clientX, clientY }: PointerEvent): Point {
  if (!(currentTarget instanceof Element)) return { x: 0, y: 0 };
  const { left, top } = currentTarget.getBoundingClientRect();
  return { x: clientX - left, y: clientY - top };
}

function between(a: number, b: number): Span {
  return [Math.min(a, b), Math.max(a, b)];
}

function noteUnder(event: PointerEvent): string | undefined {
  return named(event, 'note');
}

function gripUnder(event: PointerEvent): string | undefined {
  return named(event, 'grip');
}

function named(event: PointerEvent, name: string): string | undefined {
  for (const node of event.composedPath())
    if ((node instanceof SVGElement || node instanceof HTMLElement) && node.dataset[name] !== undefined)
      return node.dataset[name];
  return undefined;
}
