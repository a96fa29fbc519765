import {
  LitElement,
  css,
  html,
  nothing,
  type CSSResult,
  type PropertyDeclarations,
  type TemplateResult,
} from 'lit';
import { fillSlot, nudge, sentencePieces } from './sentence/slots.js';
import { controls } from './theme/controls.js';
import { paper } from './theme/paper.js';
import { valueOf } from './theme/value-of.js';

/**
 * One sentence is the editor: an edit in prose, its numbers as slots that can be filled otherwise, its price underneath. Filling
 * a slot changes the sentence; the page reads the sentence and says what it costs, or why it can't be read.
 *
 * @fires sentence-changed - `{ text: string }`
 * @fires apply-asked - `{ text: string }` the button, or Ctrl+Enter
 * @fires left-alone - the button, or Escape
 */
export class SlewSentence extends LitElement {
  static override properties: PropertyDeclarations = {
    text: { type: String },
    price: { type: String },
    problem: { type: String },
    busy: { type: Boolean, reflect: true },
    whole: { state: true },
  };
  static override styles: CSSResult[] = [
    paper,
    controls,
    css`
      :host {
        padding: 0.75rem 0 0.5rem;
        border: solid var(--_rule);
        border-width: 1px 0;
      }
      p {
        margin: 0;
        max-width: 46rem;
      }
      .sentence {
        font-size: 1.25rem;
        line-height: 1.75;
        text-wrap: pretty;
      }
      .sentence input {
        min-height: 0;
        height: 1.5em;
        padding: 0 0.1em;
        font-size: inherit;
        line-height: inherit;
        text-align: center;
        border-bottom: 2px solid var(--_trace);
        field-sizing: content;
        min-width: 1.2em;
        /* Fingers get 44 px without the lines of the sentence moving apart. */
        background-clip: padding-box;
        margin: 0 0.05em;
      }
      .sentence textarea {
        display: block;
        width: 100%;
        box-sizing: border-box;
        min-height: 4rem;
        font: inherit;
        color: inherit;
        background: var(--_sheet);
        border: 1px solid var(--_rule);
        border-radius: 3px;
      }
      .price {
        color: var(--_soft);
        font-style: italic;
        min-height: 1.5em;
      }
      .problem {
        color: var(--_limit);
        font-style: italic;
      }
      .buttons {
        display: flex;
        flex-wrap: wrap;
        gap: 0.5rem;
        margin-top: 0.5rem;
      }
    `,
  ];

  /** The sentence, as the job card would say it. */
  declare text: string;
  /** What it would do: "6.0° becomes 0.1°; 1 key changes." */
  declare price: string;
  /** Why it can't be done as it stands; empty: it can. */
  declare problem: string;
  /** While it is being applied. */
  declare busy: boolean;
  declare private whole: boolean;

  constructor() {
    super();
    this.text = '';
    this.price = '';
    this.problem = '';
    this.busy = false;
    this.whole = false;
  }

  /** Puts the keyboard on the first slot, or on the button where there is none. */
  override focus(options?: FocusOptions): void {
    this.renderRoot
      .querySelector<HTMLElement>('.sentence input, .sentence textarea, button.main')
      ?.focus(options);
  }

  protected override render(): TemplateResult {
    return html`<section aria-label="The edit, in a sentence" @keydown=${this.keyed}>
      <div class="sentence">${this.whole ? this.wholeText() : html`<p>${this.pieces()}</p>`}</div>
      <p class=${this.problem ? 'problem' : 'price'} role="status">${this.problem || this.price}</p>
      <div class="buttons on-screen">
        <button class="main" ?disabled=${this.busy || this.problem !== ''} @click=${this.apply}>
          ${this.busy ? 'Applying it' : 'Apply it'}
        </button>
        <button @click=${() => this.send('left-alone', undefined)}>Leave it</button>
        <button class="plain" @click=${this.turnOver}>
          ${this.whole ? 'Show the slots' : 'Write the whole sentence'}
        </button>
      </div>
    </section>`;
  }

  /** The other way to write it; the keyboard goes into it. */
  private readonly turnOver = (): void => {
    this.whole = !this.whole;
    void this.updateComplete.then(() => this.focus());
  };

  private pieces(): unknown {
    let slot = -1;
    return sentencePieces(this.text).map((piece) => {
      if (piece.kind === 'words') return piece.text;
      const index = ++slot;
      return html`<input
        type="text"
        inputmode="decimal"
        autocomplete="off"
        aria-label=${piece.label}
        aria-invalid=${this.problem ? 'true' : nothing}
        size=${Math.max(1, piece.text.length)}
        .value=${piece.text}
        @change=${(event: Event) => this.fill(index, valueOf(event))}
        @keydown=${(event: KeyboardEvent) => this.slotKeyed(event, index)}
      />`;
    });
  }

  private wholeText(): TemplateResult {
    return html`<textarea
      aria-label="The whole sentence"
      rows="3"
      .value=${this.text}
      @change=${(event: Event) => this.say(valueOf(event).trim())}
    ></textarea>`;
  }

  private fill(slot: number, value: string): void {
    this.say(fillSlot(this.text, slot, value));
  }

  private say(text: string): void {
    if (text === this.text) return;
    this.text = text;
    this.send('sentence-changed', { text });
  }

  /** Up and Down nudge the last digit written, ten times with Shift. */
  private slotKeyed(event: KeyboardEvent, slot: number): void {
    const step = { ArrowUp: 1, ArrowDown: -1 }[event.key];
    if (step !== undefined) {
      event.preventDefault();
      this.fill(slot, nudge(valueOf(event), event.shiftKey ? step * 10 : step));
    } else if (event.key === 'Enter' && !event.ctrlKey && !event.metaKey) this.fill(slot, valueOf(event));
  }

  private readonly keyed = (event: KeyboardEvent): void => {
    if (event.key === 'Enter' && (event.ctrlKey || event.metaKey)) {
      event.preventDefault();
      const field = event.composedPath()[0];
      // What is still being typed counts: a change event comes only when the field is left.
      if (field instanceof HTMLInputElement || field instanceof HTMLTextAreaElement)
        field.dispatchEvent(new Event('change'));
      this.apply();
    } else if (event.key === 'Escape') {
      event.preventDefault();
      event.stopPropagation();
      this.send('left-alone', undefined);
    }
  };

  private readonly apply = (): void => {
    if (!this.busy && this.problem === '') this.send('apply-asked', { text: this.text });
  };

  private send(type: string, detail: unknown): void {
    this.dispatchEvent(new CustomEvent(type, { detail, bubbles: true, composed: true }));
  }
}
