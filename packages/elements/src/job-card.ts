import {
  LitElement,
  css,
  html,
  nothing,
  type CSSResult,
  type PropertyDeclarations,
  type TemplateResult,
} from 'lit';
import { repeat } from 'lit/directives/repeat.js';
import { sayCount } from './chart/quantity.js';
import { controls } from './theme/controls.js';
import { paper } from './theme/paper.js';

/** One line of the job card, as it is shown. */
export interface JobLine {
  /** A name that stays the same while lines move. */
  readonly id: string;
  /** The step in a sentence. */
  readonly sentence: string;
  /** What it did: "6.0° becomes 0.1°". */
  readonly price?: string;
  readonly skipped: boolean;
  /** Why it could not be done; the lines after it were not tried. */
  readonly problem?: string;
}

/**
 * The job card: applied sentences in order, each of which can be moved, skipped or removed.
 *
 * @fires line-moved - `{ id: string, to: number }` new place, counted from 0
 * @fires line-skipped - `{ id: string, skipped: boolean }`
 * @fires line-removed - `{ id: string }`
 * @fires line-chosen - `{ id: string }`
 * @fires undo-asked
 * @fires redo-asked
 */
export class SlewJobCard extends LitElement {
  static override properties: PropertyDeclarations = {
    lines: { attribute: false },
    undo: { type: String },
    redo: { type: String },
    said: { state: true },
  };
  static override styles: CSSResult[] = [
    paper,
    controls,
    css`
      .head {
        display: flex;
        flex-wrap: wrap;
        align-items: center;
        gap: 0 1rem;
      }
      h2 {
        flex: 1 1 auto;
        margin: 0;
        font-size: 1.25rem;
        font-weight: 400;
      }
      ol {
        list-style: none;
        margin: 0.5rem 0 0;
        padding: 0;
        counter-reset: line;
      }
      li {
        counter-increment: line;
        position: relative;
        padding: 0.6rem 0 0.25rem 2.25rem;
        border-top: 1px solid var(--_hairline);
      }
      li::before {
        content: counter(line) '.';
        position: absolute;
        left: 0;
        width: 1.5rem;
        text-align: right;
        color: var(--_soft);
      }
      p {
        margin: 0;
        max-width: 46rem;
      }
      .skipped .sentence {
        color: var(--_soft);
        text-decoration: line-through;
        text-decoration-thickness: 1px;
      }
      .price {
        color: var(--_soft);
        font-style: italic;
        font-size: 0.9375rem;
      }
      .problem {
        color: var(--_limit);
        font-style: italic;
      }
      .moves {
        display: flex;
        flex-wrap: wrap;
        gap: 0 0.75rem;
        margin-left: -0.25rem;
      }
      .empty {
        color: var(--_soft);
        font-style: italic;
        padding: 0.5rem 0;
      }
    `,
  ];

  declare lines: readonly JobLine[];
  /** What would be undone: "lift out key 19"; empty: nothing. */
  declare undo: string;
  /** What would be done again; empty: nothing. */
  declare redo: string;
  declare private said: string;

  constructor() {
    super();
    this.lines = [];
    this.undo = '';
    this.redo = '';
    this.said = '';
  }

  protected override render(): TemplateResult {
    return html`<section aria-labelledby="head">
      <div class="head">
        <h2 id="head">Job card, ${sayCount(this.lines.length, 'edit')}</h2>
        <div class="on-screen">
          <button
            class="plain"
            ?disabled=${!this.undo}
            aria-keyshortcuts="Control+Z"
            @click=${() => this.send('undo-asked')}
          >
            ${this.undo ? `Undo: ${this.undo}` : 'Nothing to undo'}
          </button>
          <button
            class="plain"
            ?disabled=${!this.redo}
            aria-keyshortcuts="Control+Shift+Z"
            @click=${() => this.send('redo-asked')}
          >
            ${this.redo ? `Redo: ${this.redo}` : 'Nothing to redo'}
          </button>
        </div>
      </div>
      ${
        this.lines.length === 0
          ? html`<p class="empty">
              No edits yet. A finding's remedy becomes a line here when it is applied.
            </p>`
          : html`<ol>
              ${repeat(
                this.lines,
                (line) => line.id,
                (line, index) => this.line(line, index),
              )}
            </ol>`
      }
      <p class="unseen" role="status">${this.said}</p>
    </section>`;
  }

  private line(line: JobLine, index: number): TemplateResult {
    const of = html`<span class="unseen"> edit ${index + 1}</span>`;
    const last = index === this.lines.length - 1;
    return html`<li class=${line.skipped ? 'skipped' : ''} data-line=${line.id}>
      <p class="sentence">
        ${line.sentence}${line.skipped ? html`<span class="unseen"> (skipped)</span>` : nothing}
      </p>
      ${line.price ? html`<p class="price">${line.price}</p>` : nothing}
      ${line.problem ? html`<p class="problem">${line.problem}</p>` : nothing}
      <div class="moves on-screen">
        <button class="plain" @click=${() => this.send('line-chosen', { id: line.id })}>Show it${of}</button>
        <button class="plain" ?disabled=${index === 0} @click=${() => this.move(line, index - 1)}>
          Move up${of}
        </button>
        <button class="plain" ?disabled=${last} @click=${() => this.move(line, index + 1)}>
          Move down${of}
        </button>
        <button class="plain" @click=${() => this.skip(line)}>
          ${line.skipped ? 'Use again' : 'Skip'}${of}
        </button>
        <button class="plain" @click=${() => this.takeOut(line, index)}>Remove${of}</button>
      </div>
    </li>`;
  }

  private move(line: JobLine, to: number): void {
    this.said = `Edit moved to place ${to + 1} of ${this.lines.length}.`;
    this.send('line-moved', { id: line.id, to });
  }

  private skip(line: JobLine): void {
    this.said = line.skipped ? 'Edit used again.' : 'Edit skipped.';
    this.send('line-skipped', { id: line.id, skipped: !line.skipped });
  }

  private takeOut(line: JobLine, index: number): void {
    this.said = `Edit ${index + 1} removed.`;
    this.send('line-removed', { id: line.id });
  }

  private send(type: string, detail?: unknown): void {
    this.dispatchEvent(new CustomEvent(type, { detail, bubbles: true, composed: true }));
  }
}
