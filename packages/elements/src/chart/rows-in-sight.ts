import type { ReactiveController, ReactiveControllerHost } from 'lit';

const ROWS_A_PICTURE = 3;

/** Which rows are drawn: those that came near the window, a few a picture, as a long take has many and the page must go on. */
export class RowsInSight implements ReactiveController {
  private drawn: ReadonlySet<number> = new Set();
  /** Rows that came into sight and are not drawn yet. */
  private readonly waiting = new Set<number>();
  private sight: IntersectionObserver | undefined;
  private readonly host: ReactiveControllerHost;
  private readonly rows: () => Iterable<Element>;

  /** `rows`: the rows on the page now, each with its number as `data-row`. */
  constructor(host: ReactiveControllerHost, rows: () => Iterable<Element>) {
    this.host = host;
    this.rows = rows;
    host.addController(this);
  }

  has(row: number): boolean {
    return this.drawn.has(row);
  }

  /** Draws these, however far away. */
  show(rows: Iterable<number>): void {
    this.drawn = new Set(rows);
    this.host.requestUpdate();
  }

  /** The rows are others now. */
  forget(): void {
    this.drawn = new Set();
    this.hostDisconnected();
    this.host.requestUpdate();
  }

  hostUpdated(): void {
    this.sight ??= new IntersectionObserver((entries) => this.see(entries), { rootMargin: '400px' });
    for (const row of this.rows()) this.sight.observe(row);
  }

  hostDisconnected(): void {
    this.sight?.disconnect();
    this.sight = undefined;
  }

  private see(entries: readonly IntersectionObserverEntry[]): void {
    for (const { target, isIntersecting } of entries)
      if (isIntersecting && target instanceof HTMLElement) this.waiting.add(Number(target.dataset['row']));
    this.drawWaiting();
  }

  private drawWaiting(): void {
    const next = [...this.waiting].slice(0, ROWS_A_PICTURE);
    if (next.length === 0) return;
    for (const row of next) this.waiting.delete(row);
    if (next.some((row) => !this.drawn.has(row))) this.show([...this.drawn, ...next]);
    if (this.waiting.size > 0)
      void this.host.updateComplete.then(() => requestAnimationFrame(() => this.drawWaiting()));
  }
}
