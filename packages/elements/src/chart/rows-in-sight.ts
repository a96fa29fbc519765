import type { ReactiveController, ReactiveControllerHost } from 'lit';

/** Rows put on the page at once, and drawn at once. */
const BUILT_A_PICTURE = 6;
const DRAWN_A_PICTURE = 3;

/**
 * Which rows are on the page: a few at first and more with every picture, as a long take has many and the page must go on. And which of
 * them are drawn: those that came near the window.
 */
export class RowsInSight implements ReactiveController {
  private drawn: ReadonlySet<number> = new Set();
  private built = BUILT_A_PICTURE;
  private wanted = 0;
  private building = false;
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

  /** Of so many rows, how many are on the page now. */
  builtOf(rows: number): number {
    this.wanted = rows;
    return Math.min(rows, this.built);
  }

  /** Draws all of so many rows, however far away. */
  showAll(rows: number): void {
    this.built = Math.max(this.built, rows);
    this.show(Array.from({ length: rows }, (_, row) => row));
  }

  private show(rows: Iterable<number>): void {
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
    if (this.built < this.wanted && !this.building) {
      this.building = true;
      this.nextPicture(() => this.build());
    }
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
    const next = [...this.waiting].slice(0, DRAWN_A_PICTURE);
    if (next.length === 0) return;
    for (const row of next) this.waiting.delete(row);
    if (next.some((row) => !this.drawn.has(row))) this.show([...this.drawn, ...next]);
    if (this.waiting.size > 0) this.nextPicture(() => this.drawWaiting());
  }

  private build(): void {
    this.building = false;
    this.built += BUILT_A_PICTURE;
    this.host.requestUpdate();
  }

  /** After what is being drawn now. */
  private nextPicture(work: () => void): void {
    void this.host.updateComplete.then(() => requestAnimationFrame(work));
  }
}
