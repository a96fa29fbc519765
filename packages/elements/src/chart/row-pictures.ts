import type { ReactiveController, ReactiveControllerHost, TemplateResult } from 'lit';

/** Milliseconds of drawing rows anew for one picture of the page; one row is always drawn. */
const DRAWING_MS = 10;

/** A row as it was drawn, and what it was drawn of. */
export interface DrawnRow {
  readonly of: readonly unknown[];
  readonly picture: TemplateResult;
}

/**
 * The rows as they are drawn. Where many are to be drawn anew, some are for the next picture of the page and the others a picture later, each as it was until
 * then; a row that never was drawn is drawn at once.
 */
export class RowPictures implements ReactiveController {
  private readonly rows = new Map<number, DrawnRow>();
  private spent = 0;
  private late = false;
  private readonly host: ReactiveControllerHost;

  constructor(host: ReactiveControllerHost) {
    this.host = host;
    host.addController(this);
  }

  /** A row drawn of `of`; the same object for as long as it stays as it is. */
  drawn(row: number, of: readonly unknown[], draw: () => TemplateResult): DrawnRow {
    const before = this.rows.get(row);
    if (before && before.of.every((one, i) => one === of[i])) return before;
    if (before && this.spent > DRAWING_MS) {
      this.late = true;
      return before;
    }
    const from = performance.now();
    const now = { of, picture: draw() };
    this.spent += performance.now() - from;
    this.rows.set(row, now);
    return now;
  }

  /** Nothing that was drawn may stand any longer. */
  forget(): void {
    this.rows.clear();
  }

  hostUpdate(): void {
    this.spent = 0;
  }

  hostUpdated(): void {
    if (!this.late) return;
    this.late = false;
    requestAnimationFrame(() => this.host.requestUpdate());
  }
}
