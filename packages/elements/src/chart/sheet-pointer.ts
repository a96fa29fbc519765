import { holdPointer, shareAcross } from '../theme/hold-pointer.js';
import type { FoldRow } from './fold.js';

type Span = readonly [number, number];

/** A drag shorter than this is a click, px. */
const DRAG = 4;

/** What mouse, pen and finger do on the paper. Times in seconds, not held to the motion. */
export interface SheetEvents {
  hover(time: number): void;
  /** A click; with Shift it widens the span. */
  go(time: number, widen: boolean): void;
  /** A drag along the row; settled when let go. */
  drag(span: Span, settled: boolean): void;
  note(id: string): void;
}

/** One pointer on the rows of the trace: hover reads, click sets the cursor, drag chooses a span, a caret chooses its note. */
export class SheetPointer {
  private press: { x: number; time: number } | undefined;
  private readonly events: SheetEvents;

  constructor(events: SheetEvents) {
    this.events = events;
  }

  /** Whether a button is down. */
  get pressed(): boolean {
    return this.press !== undefined;
  }

  move(event: PointerEvent, row: FoldRow): void {
    const time = timeAt(event, row);
    this.events.hover(time);
    if (this.press && Math.abs(event.clientX - this.press.x) >= DRAG)
      this.events.drag(between(this.press.time, time), false);
  }

  down(event: PointerEvent, row: FoldRow): void {
    if (event.button !== 0) return;
    const note = noteUnder(event);
    if (note !== undefined) return this.events.note(note);
    holdPointer(event);
    this.press = { x: event.clientX, time: timeAt(event, row) };
  }

  /** Whether something was settled. */
  up(event: PointerEvent, row: FoldRow): boolean {
    const { press } = this;
    this.press = undefined;
    if (!press) return false;
    const time = timeAt(event, row);
    if (Math.abs(event.clientX - press.x) >= DRAG) this.events.drag(between(press.time, time), true);
    else this.events.go(time, event.shiftKey);
    return true;
  }

  /** Escape, or a pointer that the browser took away. */
  cancel(): void {
    this.press = undefined;
  }
}

function timeAt(event: PointerEvent, row: FoldRow): number {
  return row.from + shareAcross(event) * (row.to - row.from);
}

function between(a: number, b: number): Span {
  return [Math.min(a, b), Math.max(a, b)];
}

function noteUnder(event: PointerEvent): string | undefined {
  for (const node of event.composedPath())
    if (node instanceof SVGElement && node.dataset['note'] !== undefined) return node.dataset['note'];
  return undefined;
}
