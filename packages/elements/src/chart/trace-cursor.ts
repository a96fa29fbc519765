import type { NumberedNote } from './carets.js';
import type { ChartData } from './chart-data.js';
import { chartIntent, type ChartIntent } from './chart-keys.js';
import type { FoldRow } from './fold.js';

type Span = readonly [number, number];

/** What the cursor reads and moves: the chart's own properties. */
export interface CursorHost {
  readonly data: ChartData | undefined;
  readonly rows: readonly FoldRow[];
  readonly numbered: readonly NumberedNote[];
  time: number;
  hover: number | undefined;
  span: Span | undefined;
  chosen: string | undefined;
  readonly opened: Span | undefined;
  openCloseUp(): void;
  closeCloseUp(): void;
  /** Brings the cursor's row into the window. */
  bringHere(): Promise<void>;
  /** Whether a pointer is down on the paper; `release` forgets it. */
  readonly pressed: boolean;
  release(): void;
  send(type: string, detail: unknown): void;
}

/** The cursor of the trace: where it stands, the span that it widens, the findings that it steps through. */
export class TraceCursor {
  private readonly host: CursorHost;
  /** Where a span began that is being widened. */
  private anchor: number | undefined;

  constructor(host: CursorHost) {
    this.host = host;
  }

  readonly keyed = (event: KeyboardEvent): void => {
    const { host } = this;
    if (!host.data) return;
    const intent = chartIntent(event, host.time, host.data, host.rows);
    if (!intent) return;
    if (intent.kind === 'back' && !host.opened && !host.span && host.hover === undefined) return;
    event.preventDefault();
    event.stopPropagation();
    this.act(intent);
  };

  act(intent: ChartIntent): void {
    switch (intent.kind) {
      case 'go':
        return this.go(intent.time, intent.widen);
      case 'note':
        return this.stepNote(intent.step);
      case 'open-close-up':
        return this.host.openCloseUp();
      case 'back':
        return this.back();
      case 'play':
        this.host.send('play-asked', undefined);
    }
  }

  go(asked: number, widen: boolean): void {
    const { host } = this;
    const time = this.held(asked);
    if (widen) {
      this.anchor ??= host.time;
      this.setSpan([Math.min(this.anchor, time), Math.max(this.anchor, time)]);
    } else this.anchor = undefined;
    host.hover = undefined;
    host.time = time;
    host.send('cursor-moved', { time, settled: true });
    void host.bringHere();
  }

  choose(id: string): void {
    const numbered = this.host.numbered.find(({ note }) => note.id === id);
    if (!numbered) return;
    this.host.chosen = id;
    this.host.send('note-chosen', { id });
    this.go(numbered.note.time, false);
  }

  hoverAt(time: number): void {
    this.host.hover = this.held(time);
    this.host.send('cursor-moved', { time: this.host.hover, settled: false });
  }

  readonly leave = (): void => {
    const { host } = this;
    if (host.pressed) return;
    host.hover = undefined;
    host.send('cursor-moved', { time: host.time, settled: true });
  };

  dragged([from, to]: Span, settled: boolean): void {
    const span: Span = [this.held(from), this.held(to)];
    if (settled) this.setSpan(span);
    else this.host.span = span;
  }

  private back(): void {
    const { host } = this;
    host.release();
    if (host.opened) host.closeCloseUp();
    else if (host.span) this.setSpan(undefined);
    host.hover = undefined;
  }

  private stepNote(step: 1 | -1): void {
    const { numbered, chosen, time } = this.host;
    const at = numbered.findIndex(({ note }) => note.id === chosen);
    // Without a chosen note: the next or the previous one from the cursor, one at the cursor itself first, without going round.
    const before = numbered.filter(({ note }) => note.time < time - 1e-9 * step).length;
    const from = step > 0 ? before : before - 1;
    const next = numbered[at < 0 ? from : at + step];
    if (next) this.choose(next.note.id);
  }

  private setSpan(span: Span | undefined): void {
    this.host.span = span;
    this.host.send('span-chosen', { span });
  }

  private held(time: number): number {
    const { start = 0, end = 0 } = this.host.data?.motion ?? {};
    return Math.min(end, Math.max(start, time));
  }
}
