import { LitElement, html, nothing, type PropertyDeclarations, type TemplateResult } from 'lit';
import { inTurn } from '@slewcurve/elements/theme/in-turn';
import { valueOf } from '@slewcurve/elements/theme/value-of';
import type { ReportedFinding, ReportedOccurrence, StampWords } from '@slewcurve/job';
import { pageStyles } from './page-styles.js';

/** What is accepted: the finding, and its place that the note stands for. */
export interface ToAccept {
  readonly finding: ReportedFinding;
  readonly place: ReportedOccurrence;
}

/** By which fingerprint something is accepted, and with what words. */
export interface Accepted {
  readonly named: string;
  readonly words: StampWords;
}

/**
 * "Accept with a reason", under the row of its finding: one place or all of them, why, and who says so.
 *
 * @fires accepted - `Accepted`
 * @fires left-alone
 */
export class SlewAcceptForm extends LitElement {
  static override properties: PropertyDeclarations = {
    subject: { attribute: false },
    by: { type: String },
    whole: { state: true },
    problem: { state: true },
  };
  static override styles = pageStyles;

  declare subject: ToAccept | undefined;
  /** Who accepted last. */
  declare by: string;
  /** Every place of the finding, not the one alone. */
  declare private whole: boolean;
  declare private problem: string;

  constructor() {
    super();
    this.by = '';
    this.whole = true;
    this.problem = '';
  }

  protected override scheduleUpdate(): Promise<void> {
    return inTurn(() => this.performUpdate());
  }

  /** Puts the keyboard on the reason. */
  override focus(options?: FocusOptions): void {
    this.field('reason')?.focus(options);
  }

  protected override render(): TemplateResult | typeof nothing {
    const { subject } = this;
    if (!subject) return nothing;
    const { rule, count } = subject.finding;
    return html`<form
      aria-label="Accept with a reason"
      @submit=${this.submitted}
      @keydown=${(event: KeyboardEvent) => this.keyed(event)}
    >
      <p class="doings">
        ${count > 1 ? this.which(subject) : html`<span>Accept this finding of ${rule}</span>`}
        <label>because <input name="reason" size="32" autocomplete="off" aria-describedby="problem" /></label>
        <label
          >says
          <input
            name="by"
            size="12"
            autocomplete="name"
            placeholder="your name"
            .value=${this.by}
            aria-describedby="problem"
        /></label>
        <button class="main">Accept it</button>
        <button type="button" @click=${() => this.leave()}>Leave it</button>
      </p>
      <p class="problem" id="problem" role="status">${this.problem}</p>
    </form>`;
  }

  private which({ finding, place }: ToAccept): TemplateResult {
    return html`<label
      >Accept
      <select @change=${(event: Event) => (this.whole = valueOf(event) === 'whole')}>
        <option value="whole" ?selected=${this.whole}>
          all ${finding.count.toLocaleString('en')} places of ${finding.rule}
        </option>
        <option value="place" ?selected=${!this.whole}>the place at ${place.time.toFixed(3)} s alone</option>
      </select></label
    >`;
  }

  private field(name: string): HTMLInputElement | null {
    return this.renderRoot.querySelector<HTMLInputElement>(`input[name=${name}]`);
  }

  private keyed(event: KeyboardEvent): void {
    if (event.key !== 'Escape') return;
    event.preventDefault();
    event.stopPropagation();
    this.leave();
  }

  private leave(): void {
    this.dispatchEvent(new CustomEvent('left-alone'));
  }

  private readonly submitted = (event: SubmitEvent): void => {
    event.preventDefault();
    const { subject } = this;
    const reason = this.field('reason')?.value.trim() ?? '';
    const by = this.field('by')?.value.trim() ?? '';
    const missing = reason === '' ? 'reason' : by === '' ? 'by' : undefined;
    if (!subject) return;
    if (missing) {
      this.problem =
        missing === 'reason'
          ? 'Say why it is as it should be.'
          : 'Say who accepts it: a name goes with each stamp.';
      this.field(missing)?.focus();
      return;
    }
    const { finding, place } = subject;
    const whole = this.whole || finding.count === 1;
    // The day as the command writes it.
    const words: StampWords = { reason, by, date: new Date().toISOString().slice(0, 10) };
    const named = whole ? finding.fingerprint : place.fingerprint;
    this.dispatchEvent(new CustomEvent('accepted', { detail: { named, words } }));
  };
}
