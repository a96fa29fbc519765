import { EULER_SEQUENCES, SlewcurveError } from '@slewcurve/core';
import {
  LitElement,
  css,
  html,
  nothing,
  type CSSResult,
  type PropertyDeclarations,
  type TemplateResult,
} from 'lit';
import { sayTime } from './chart/quantity.js';
import { WHOSE, sayTurn, turnTo, type About, type Turn } from './gesture/key-turn.js';
import {
  MATRIX_ORDERS,
  matrixText,
  orientationOfMatrix,
  type MatrixOrder,
} from './gesture/orientation-matrix.js';
import {
  numberNames,
  numbersOfOrientation,
  orientationOfNumbers,
  type NumberKind,
} from './gesture/orientation-numbers.js';
import { controls } from './theme/controls.js';
import { paper } from './theme/paper.js';
import { valueOf } from './theme/value-of.js';

type Quaternion = readonly [number, number, number, number];

const ABOUTS: readonly About[] = ['own', 'parent', 'world'];
const PLAIN_KINDS = ['axis and angle', 'quaternion'] as const;

/**
 * One key's orientation: whether a drag on the globe looks round or turns the key, about whose axes a turn acts, and the orientation by numbers, to read and
 * to type.
 *
 * @fires turning-chosen - `{ turning: boolean }` what a drag on the globe does
 * @fires about-chosen - `{ about: About }`
 * @fires turn-typed - `{ turn: Turn, about: About }`
 */
export class SlewKeyTurn extends LitElement {
  static override properties: PropertyDeclarations = {
    key: { type: Number },
    time: { type: Number },
    orientation: { attribute: false },
    turn: { attribute: false },
    about: { type: String },
    turning: { type: Boolean },
    kind: { state: true },
    order: { state: true },
    problem: { state: true },
    copied: { state: true },
  };
  static override styles: CSSResult[] = [
    paper,
    controls,
    css`
      :host {
        font-size: 0.9375rem;
        line-height: 1.4;
      }
      fieldset {
        display: flex;
        flex-wrap: wrap;
        gap: 0 0.9rem;
        margin: 0.25rem 0 0;
        padding: 0;
        border: 0;
      }
      legend,
      summary {
        color: var(--_soft);
        padding: 0;
      }
      fieldset label {
        min-height: 44px;
        gap: 0.35rem;
        color: var(--_ink);
        cursor: pointer;
      }
      fieldset input {
        width: 1rem;
        height: 1rem;
        margin: 0;
        accent-color: var(--_trace);
      }
      summary {
        min-height: 44px;
        line-height: 44px;
        cursor: pointer;
      }
      .numbers {
        display: grid;
        grid-template-columns: repeat(2, minmax(0, 1fr));
        gap: 0 0.75rem;
      }
      .numbers label {
        display: block;
        font-size: 0.875rem;
      }
      .numbers input {
        width: 100%;
        box-sizing: border-box;
      }
      textarea {
        display: block;
        width: 100%;
        box-sizing: border-box;
        margin: 0.25rem 0 0;
        color: var(--_ink);
        background: var(--_sheet);
        border: 1px solid var(--_rule);
        border-radius: 3px;
        font:
          0.75rem/1.5 ui-monospace,
          'DejaVu Sans Mono',
          monospace;
        white-space: pre;
        overflow-x: auto;
      }
      .problem {
        color: var(--_limit);
        font-style: italic;
      }
      p {
        margin: 0.25rem 0 0;
      }
      .now {
        font-style: italic;
      }
      @media (pointer: fine) {
        fieldset label {
          min-height: 28px;
        }
      }
    `,
  ];

  /** Number of the key; below 0: there is none. */
  declare key: number;
  declare time: number;
  /** Before the turn at hand; own to parent. */
  declare orientation: Quaternion | undefined;
  /** The turn at hand. */
  declare turn: Turn;
  declare about: About;
  /** A drag on the globe turns the key. */
  declare turning: boolean;
  declare private kind: NumberKind;
  /** How the matrix is written, shown and read alike. */
  declare private order: MatrixOrder;
  /** Why the typed matrix tells no orientation; empty: it does. */
  declare private problem: string;
  declare private copied: boolean;

  constructor() {
    super();
    this.key = -1;
    this.time = 0;
    this.turn = [0, 0, 0];
    this.about = 'own';
    this.turning = false;
    this.kind = 'axis and angle';
    this.order = 'row by row';
    this.problem = '';
    this.copied = false;
  }

  protected override render(): TemplateResult | typeof nothing {
    const { orientation, key } = this;
    if (!orientation || key < 0) return nothing;
    return html`<fieldset class="on-screen">
        <legend>A drag on the globe</legend>
        ${this.radio('drag', !this.turning, 'looks round', () => this.send('turning-chosen', { turning: false }))}
        ${this.radio('drag', this.turning, `turns key ${key}`, () => this.send('turning-chosen', { turning: true }))}
      </fieldset>
      <fieldset class="on-screen">
        <legend>A turn is about its</legend>
        ${ABOUTS.map((about) =>
          this.radio('about', about === this.about, `${WHOSE[about]} axes`, () =>
            this.send('about-chosen', { about }),
          ),
        )}
      </fieldset>
      <p class="now" role="status">
        ${this.turning ? `Key ${key} at ${sayTime(this.time)}: ${sayTurn(this.turn, this.about)}.` : nothing}
      </p>
      <details>
        <summary>Key ${key} by numbers</summary>
        ${this.turnBy()} ${this.numbers(orientation)} ${this.matrix(orientation)}
      </details>`;
  }

  private radio(name: string, checked: boolean, says: string, choose: () => void): TemplateResult {
    return html`<label
      ><input type="radio" name=${name} .checked=${checked} @change=${choose} />${says}</label
    >`;
  }

  private turnBy(): TemplateResult {
    return html`<p>Turn it by, in degrees about its ${WHOSE[this.about]} axes</p>
      <div class="numbers">
        ${this.turn.map(
          (angle, i) =>
            html`<label
              >${'xyz'[i]}
              <input
                type="text"
                inputmode="decimal"
                autocomplete="off"
                .value=${String(angle)}
                @change=${(event: Event) => this.typeTurn(i, Number(valueOf(event)))}
            /></label>`,
        )}
      </div>`;
  }

  private numbers(orientation: Quaternion): TemplateResult {
    const { kind } = this;
    const numbers = numbersOfOrientation(orientation, kind);
    const choose = (event: Event): void => {
      const chosen = [...PLAIN_KINDS, ...EULER_SEQUENCES].find((each) => each === valueOf(event));
      if (chosen) this.kind = chosen;
    };
    return html`<p>
        <label
          >Its orientation in the parent as
          <select @change=${choose}>
            ${PLAIN_KINDS.map((each) => option(each, each, kind))}
            ${EULER_SEQUENCES.map((each) => option(each, `angles ${sayOrder(each)}`, kind))}
          </select></label
        >
      </p>
      <div class="numbers">
        ${numberNames(kind).map(
          (name, i) =>
            html`<label
              >${name}
              <input
                type="text"
                inputmode="decimal"
                autocomplete="off"
                .value=${String(Number(numbers[i].toFixed(6)))}
                @change=${(event: Event) => this.typeNumber(orientation, i, Number(valueOf(event)))}
            /></label>`,
        )}
      </div>`;
  }

  private matrix(orientation: Quaternion): TemplateResult {
    const { order, problem } = this;
    const text = matrixText(orientation, order);
    const copy = async (): Promise<void> => {
      await navigator.clipboard.writeText(text);
      this.copied = true;
    };
    const choose = (event: Event): void => {
      this.order = MATRIX_ORDERS.find((each) => each === valueOf(event)) ?? order;
    };
    return html`<p>
        <label
          >As a matrix, own to parent, for column vectors, written
          <select @change=${choose}>
            ${MATRIX_ORDERS.map((each) => option(each, each, order))}
          </select></label
        >
      </p>
      <textarea
        rows="4"
        spellcheck="false"
        autocomplete="off"
        aria-label="4 by 4 matrix, ${order}"
        aria-invalid=${problem ? 'true' : nothing}
        .value=${text}
        @change=${(event: Event) => this.typeMatrix(orientation, valueOf(event))}
      ></textarea>
      <p class="problem" role="status">${problem}</p>
      <button class="plain on-screen" @click=${() => void copy()}>
        ${this.copied ? 'Copied' : 'Copy the matrix'}
      </button>`;
  }

  private typeTurn(index: number, angle: number): void {
    if (!Number.isFinite(angle)) return this.requestUpdate();
    const [x, y, z] = this.turn.map((old, i) => (i === index ? angle : old));
    this.send('turn-typed', { turn: [x, y, z], about: this.about });
  }

  /** Typed numbers stand in the parent's axes; the turn that leads there is about own or parent's ones alike. */
  private typeNumber(orientation: Quaternion, index: number, typed: number): void {
    const numbers = numbersOfOrientation(orientation, this.kind).map((old, i) => (i === index ? typed : old));
    const wanted = orientationOfNumbers(numbers, this.kind);
    if (!wanted) return this.requestUpdate();
    this.turnInto(orientation, wanted);
  }

  private typeMatrix(orientation: Quaternion, text: string): void {
    this.problem = '';
    try {
      this.turnInto(orientation, orientationOfMatrix(text, this.order));
    } catch (error) {
      if (!(error instanceof SlewcurveError)) throw error;
      this.problem = error.message;
    }
  }

  private turnInto(orientation: Quaternion, wanted: Quaternion): void {
    const about = this.about === 'own' ? 'own' : 'parent';
    this.send('turn-typed', { turn: turnTo(orientation, wanted, about), about });
  }

  protected override willUpdate(changed: Map<PropertyKey, unknown>): void {
    if (changed.has('orientation') || changed.has('order')) this.copied = false;
    if (changed.has('key') || changed.has('order')) this.problem = '';
  }

  private send(type: string, detail: unknown): void {
    this.dispatchEvent(new CustomEvent(type, { detail, bubbles: true, composed: true }));
  }
}

function option(value: string, says: string, chosen: string): TemplateResult {
  return html`<option value=${value} ?selected=${value === chosen}>${says}</option>`;
}

/** "YXZ, turned axes": order and axes are never silent. */
function sayOrder(sequence: string): string {
  return `${sequence}, ${sequence === sequence.toUpperCase() ? 'about turned axes' : 'about fixed axes'}`;
}
