import {
  LitElement,
  html,
  nothing,
  type PropertyDeclarations,
  type PropertyValues,
  type TemplateResult,
} from 'lit';
import type { PlaybackId } from '@slewcurve/core';
import type { SlewChart } from '@slewcurve/elements/chart';
import type { MatrixWish } from '@slewcurve/elements/playback-matrix';
import type { SlewPorthole } from '@slewcurve/elements/porthole';
import type { SlewSentence } from '@slewcurve/elements/sentence';
import { rowAt, type About, type ChartData, type HandEdit, type Turn } from '@slewcurve/elements/plot';
import { inTurn } from '@slewcurve/elements/theme/in-turn';
import type { TrackAnswer } from '@slewcurve/job';
import { sayStep, type Step } from '@slewcurve/mend';
import { allowedSpeed, type HouseRules } from '@slewcurve/survey';
import type { FileWork } from '../session/file-work.js';
import { trackKey } from '../session/file-work.js';
import { SentenceTrial } from '../session/sentence-trial.js';
import type { Session } from '../session/session.js';
import { playsAsLoop, settingsOf } from '../session/survey-terms.js';
import { turnSketch } from '../session/turn-sketch.js';
import type { Accepted, SlewAcceptForm, ToAccept } from './accept-form.js';
import {
  chartDataOf,
  drawsTheSame,
  acceptedAs,
  measureAhead,
  placeOfNote,
  wholeClip,
  type ChartSubject,
} from './chart-data-of.js';
import { clockChoice, type Clock } from './clock-choice.js';
import { cautionsOf } from './cautions-of.js';
import { chartPageStyles } from './chart-page-styles.js';
import { explanationOf, focusedWithin } from './explanation-of.js';
import { jobCardOf } from './job-card-of.js';
import { NOT_TURNING, keyTurnOf, layOverEdit, turnAtHand, turnedKey, type Turning } from './key-turn-of.js';
import { loopChoice } from './loop-choice.js';
import { playbackChoice } from './playback-choice.js';
import { pageStyles } from './page-styles.js';
import type { ChosenTrack } from './roster-rows.js';
import { sentenceOf } from './sentence-of.js';
import { sketchedData, type Sketched } from './sketched.js';

/**
 * Chart: one track, with its 3-D view, the sentence that edits it, and the job card of its file.
 *
 * @fires playback-chosen - `{ playback: PlaybackId }`
 */
export class SlewChartPage extends LitElement {
  static override properties: PropertyDeclarations = {
    session: { attribute: false },
    file: { attribute: false },
    chosen: { attribute: false },
    second: { state: true },
    answer: { state: true },
    time: { state: true },
    span: { state: true },
    edit: { state: true },
    turning: { state: true },
    word: { state: true },
    note: { state: true },
    accepting: { state: true },
    busy: { state: true },
    fold: { state: true },
    narrow: { state: true },
    clock: { state: true },
  };
  static override styles = [pageStyles, chartPageStyles];

  declare session: Session;
  declare file: FileWork | undefined;
  declare chosen: ChosenTrack | undefined;
  /** Playback to compare with. */
  declare private second: PlaybackId | undefined;
  declare private answer: TrackAnswer | undefined;
  declare private time: number;
  declare private span: readonly [number, number] | undefined;
  /** The step of the sentence, or of the hand that is making one. */
  declare private edit: HandEdit | undefined;
  declare private turning: Turning;
  /** A word that is being explained. */
  declare private word: string | undefined;
  declare private clock: Clock;
  declare private note: string | undefined;
  /** Id of the note whose finding is being accepted. */
  declare private accepting: string | undefined;
  declare private busy: boolean;
  /** Seconds a row, where somebody chose. */
  declare private fold: number | undefined;
  /** The 3-D view is folded away, above the trace. */
  declare private narrow: boolean;
  private readonly trial = new SentenceTrial({
    ground: () =>
      this.answer && { track: this.answer.after, frameRate: this.clock.frameRate ?? this.gridFound },
    ask: async (step) => {
      const { chosen, session } = this;
      if (!chosen) throw new Error('No track is chosen.');
      return session.trial(chosen.file, step, chosen);
    },
    measure: (preview) => measureAhead(preview, this.playback, () => this.chosen !== undefined),
    requestUpdate: () => this.requestUpdate(),
  });
  private readonly width = matchMedia('(width < 40rem)');
  /** Where the keyboard was when a word was asked for. */
  private asked: HTMLElement | undefined;
  private data: ChartData | undefined;
  /** The keyboard waits for the trace. */
  private awaited = false;
  /** What `data` was made of. */
  private subject: ChartSubject | undefined;
  /** State of the card that the answer belongs to. */
  private fetchedAt: FileWork['proofs'] | undefined;

  constructor() {
    super();
    this.time = 0;
    this.busy = false;
    this.clock = { form: 'seconds' };
    this.turning = NOT_TURNING;
    this.narrow = this.width.matches;
    this.width.addEventListener('change', () => (this.narrow = this.width.matches));
  }

  protected override willUpdate(changed: PropertyValues<this>): void {
    const { chosen, file } = this;
    if (changed.has('chosen') && JSON.stringify(changed.get('chosen')) !== JSON.stringify(chosen))
      this.forget();
    if (chosen && file?.opened && (changed.has('chosen') || this.fetchedAt !== file.proofs)) {
      this.fetchedAt = file.proofs;
      void this.fetch(chosen);
    }
    this.data = this.makeData();
  }

  private forget(): void {
    this.time = 0;
    this.answer = undefined;
    this.trial.leave();
    this.edit = undefined;
    this.span = undefined;
    this.note = undefined;
    this.accepting = undefined;
    this.fold = undefined;
  }

  private async fetch(chosen: ChosenTrack): Promise<void> {
    const answer = await this.session.track(chosen.file, chosen.clip, chosen.track).catch(() => undefined);
    if (!answer) return;
    for (const track of new Set([answer.before, answer.after]))
      await measureAhead(track, this.playback, () => this.chosen === chosen);
    if (this.chosen !== chosen) return;
    this.answer = answer;
    // One that is being applied leaves by itself.
    if (this.trial.sentence && !this.busy) this.rewrite(this.trial.sentence.text);
  }

  private get playback(): PlaybackId {
    return this.session.settings.playbacks[0] ?? 'as-written';
  }

  private get houseRules(): HouseRules {
    return settingsOf(this.file, this.session.settings).houseRules;
  }

  private makeData(): ChartData | undefined {
    const { answer, chosen, file, second, playback } = this;
    const { sentence } = this.trial;
    if (!answer || !chosen || !file) return undefined;
    const kept = sentence?.step?.keep;
    const subject: ChartSubject = {
      chosen,
      file,
      before: answer.before,
      after: answer.after,
      playback,
      ...(sentence?.preview && { preview: sentence.preview }),
      ...(second && second !== playback && { second }),
      ...(kept && { kept }),
      clock: this.clock,
      limit: file.opened && allowedSpeed(this.houseRules, answer.after, file.opened),
      looped: playsAsLoop(this.houseRules, chosen.clip),
    };
    // Compiling a curve of an hour costs; moving the cursor must not.
    if (this.data && this.subject && drawsTheSame(this.subject, subject)) return this.data;
    this.subject = subject;
    return chartDataOf(subject);
  }

  /** Put the keyboard on the trace, as soon as there is one. */
  override focus(): void {
    this.awaited = !this.chart;
    this.chart?.focus();
  }

  protected override scheduleUpdate(): Promise<void> {
    return inTurn(() => this.performUpdate());
  }

  protected override updated(): void {
    if (this.awaited && this.chart) void this.chart.updateComplete.then(() => this.focus());
  }

  private get chart(): SlewChart | null {
    return this.renderRoot.querySelector<SlewChart>('slew-chart');
  }

  protected override render(): TemplateResult {
    const { data, file, chosen } = this;
    if (!chosen)
      return html`<p class="empty">
        Choose a track on the roster, and its angular speed over time is drawn here.
      </p>`;
    if (!data || !file) return html`<p class="empty" role="status">Drawing ${chosen.track}.</p>`;
    return html`${cautionsOf(file)} ${this.playbacks()} ${explanationOf(this.word, () => this.explained())}
      <div class="sheet" @keydown=${this.keyed}>
        <slew-chart
          .data=${data}
          .fold=${this.fold ?? data.loop ?? wholeClip(data)}
          .time=${this.time}
          .span=${this.span}
          .chosen=${this.note}
          .edit=${this.edit}
          @edit-sketched=${(event: CustomEvent<Sketched>) => this.follow(event.detail)}
          @edit-taken=${() => void this.applySentence()}
          @edit-dropped=${() => this.leaveSentence()}
          @fold-chosen=${(event: CustomEvent<{ fold: number }>) => (this.fold = event.detail.fold)}
          @cursor-moved=${(event: CustomEvent<{ time: number }>) => (this.time = event.detail.time)}
          @span-chosen=${(event: CustomEvent<{ span: [number, number] | undefined }>) => (this.span = event.detail.span)}
          @note-chosen=${(event: CustomEvent<{ id: string }>) => (this.note = event.detail.id)}
          @remedy-chosen=${(event: CustomEvent<{ id: string; way: number }>) => this.openRemedy(event.detail.id, event.detail.way)}
          @rule-asked=${(event: CustomEvent<{ rule: string }>) => this.explain(event.detail.rule)}
          @accept-asked=${(event: CustomEvent<{ id: string }>) => this.openAccept(event.detail.id)}
          @take-back-asked=${(event: CustomEvent<{ id: string }>) => void this.takeBack(event.detail.id)}
          @play-asked=${() => this.renderRoot.querySelector<SlewPorthole>('slew-porthole')?.toggle()}
          >${this.sentenceAt()}${this.acceptAt()}</slew-chart
        >
        <details class="figure" ?open=${!this.narrow}>
          <summary>3-D view</summary>
          <slew-porthole
            .data=${sketchedData(data, this.trial.sketch)}
            .time=${this.time}
            .span=${this.span}
            ?camera=${data.rateNames[0] === 'tilt'}
            ?turning=${this.turning.on}
            .turn=${turnAtHand(this.edit)}
            @key-turned=${(event: CustomEvent<{ turn: Turn; settled: boolean }>) => this.turnKey(event.detail.turn, this.turning.about, event.detail.settled)}
            @edit-taken=${() => void this.applySentence()}
            @edit-dropped=${() => this.leaveSentence()}
            @time-changed=${(event: CustomEvent<{ time: number }>) => (this.time = event.detail.time)}
          ></slew-porthole>
          ${keyTurnOf(data, turnedKey(data, this.time, this.edit), this.turning, this.edit, {
            turning: (next) => this.chooseTurning(next),
            turn: (turn, about) => this.turnKey(turn, about, true),
          })}
        </details>
      </div>
      <slew-playback-matrix
        class="on-screen"
        .subject=${this.answer}
        .load=${(wish: MatrixWish) => this.session.matrix(chosen.file, chosen.clip, chosen.track, wish)}
        @place-chosen=${(event: CustomEvent<{ time: number; playback: PlaybackId }>) => this.comparePlace(event.detail)}
      ></slew-playback-matrix>
      ${jobCardOf(file, this.session)}`;
  }

  private playbacks(): TemplateResult {
    return html`<p class="playbacks on-screen">
      ${playbackChoice(this.answer?.after, this.playback, this.second, {
        play: (id) => this.choosePlayback(id),
        compare: (id) => (this.second = id),
      })}
      ${clockChoice(this.clock, this.gridFound, (clock) => (this.clock = clock))} ${this.loop()}
    </p>`;
  }

  private loop(): TemplateResult | typeof nothing {
    const { file, chosen } = this;
    if (!file || !chosen) return nothing;
    return loopChoice(file, chosen.clip, playsAsLoop(this.houseRules, chosen.clip), (clip, on) => {
      void this.session.setLoop(file.id, clip, on);
    });
  }

  /** Frames per second that the clip was found to have. */
  private get gridFound(): number | undefined {
    return this.file?.opened?.clips.find(({ clip }) => clip === this.chosen?.clip)?.frameRate;
  }

  /** A place of the matrix: the playback's trace beside the first, and the cursor there. */
  private comparePlace({ time, playback }: { time: number; playback: PlaybackId }): void {
    this.second = playback;
    this.time = time;
    this.focus();
  }

  private choosePlayback(playback: PlaybackId | undefined): void {
    if (!playback) return;
    this.dispatchEvent(
      new CustomEvent('playback-chosen', { detail: { playback }, bubbles: true, composed: true }),
    );
  }

  private sentenceAt(): TemplateResult | typeof nothing {
    const { chart, data } = this;
    const { sentence } = this.trial;
    if (!sentence || !data) return nothing;
    const row = chart ? (chart.rows[rowAt(chart.rows, sentence.time)]?.index ?? 0) : 0;
    return sentenceOf(sentence, row, this.busy, {
      rewrite: (text) => this.rewrite(text),
      apply: () => void this.applySentence(),
      leave: () => this.leaveSentence(),
    });
  }

  /** The finding and the place that a note stands for. */
  private noted(id: string | undefined): ToAccept | undefined {
    const { file, chosen } = this;
    if (!file || !chosen || id === undefined) return undefined;
    return placeOfNote(file.findings.get(trackKey(chosen.clip, chosen.track)) ?? [], id);
  }

  private acceptAt(): TemplateResult | typeof nothing {
    const { chart, chosen } = this;
    const noted = this.noted(this.accepting);
    if (!noted || !chosen) return nothing;
    const row = chart ? (chart.rows[rowAt(chart.rows, noted.place.time)]?.index ?? 0) : 0;
    return html`<slew-accept-form
      slot=${`row-${row}`}
      .subject=${noted}
      .by=${this.session.by}
      @accepted=${(event: CustomEvent<Accepted>) => void this.accept(event.detail)}
      @left-alone=${() => this.leaveAccept()}
    ></slew-accept-form>`;
  }

  private openAccept(id: string): void {
    this.note = id;
    this.accepting = id;
    void this.updateComplete.then(async () => {
      const form = this.renderRoot.querySelector<SlewAcceptForm>('slew-accept-form');
      await form?.updateComplete;
      form?.focus();
    });
  }

  private async accept({ named, words }: Accepted): Promise<void> {
    if (!this.chosen) return;
    await this.session.accept(this.chosen.file, this.chosen, named, words);
    this.leaveAccept();
  }

  private async takeBack(id: string): Promise<void> {
    const noted = this.noted(id);
    if (!noted || !this.chosen) return;
    await this.session.takeBack(this.chosen.file, this.chosen, acceptedAs(noted));
    this.focus();
  }

  private leaveAccept(): void {
    this.accepting = undefined;
    void this.updateComplete.then(() => this.focus());
  }

  /** Ctrl+Enter on the trace opens the remedy of the chosen finding; the sentence has the keyboard then. */
  private readonly keyed = (event: KeyboardEvent): void => {
    if (event.key !== 'Enter' || !(event.ctrlKey || event.metaKey) || event.defaultPrevented) return;
    event.preventDefault();
    if (this.trial.sentence) void this.applySentence();
    else if (this.note !== undefined) this.openRemedy(this.note);
  };

  private openRemedy(id: string, way = 0): void {
    const { file, chosen, answer } = this;
    if (!file || !chosen || !answer) return;
    const found = placeOfNote(file.findings.get(trackKey(chosen.clip, chosen.track)) ?? [], id);
    const remedy = way === 0 ? found?.place.remedy : found?.place.alternatives?.[way - 1];
    if (!found || !remedy) return;
    this.note = id;
    this.time = found.place.time;
    this.trial.begin(sayStep(remedy), found.place.time);
    void this.updateComplete.then(() =>
      this.renderRoot.querySelector<SlewSentence>('slew-sentence')?.focus(),
    );
  }

  /** Opens what a rule is; the keyboard goes there, and back when it is put away. */
  private explain(rule: string): void {
    this.word = rule;
    this.asked = focusedWithin(this.chart);
    void this.updateComplete.then(() => this.renderRoot.querySelector<HTMLElement>('.explanation')?.focus());
  }

  private explained(): void {
    this.word = undefined;
    this.asked?.focus({ preventScroll: true });
  }

  private rewrite(text: string): void {
    const { sentence } = this.trial;
    if (!sentence || !this.answer) return;
    this.trial.begin(text, sentence.time);
    const { step } = this.trial.sentence ?? {};
    if (step) this.edit = step;
  }

  /** The key under the cursor is turned; the globe follows at once. */
  private turnKey(turn: Turn, about: About, settled: boolean): void {
    const { data, answer, chosen, file } = this;
    if (!data || !answer || !chosen) return;
    const edit = layOverEdit(turnedKey(data, this.time, this.edit), turn, about);
    const step: Step = { ...edit, clip: chosen.clip, track: chosen.track };
    const base = (data.tried && data.before?.motion) || data.motion;
    const nodes = file?.opened?.nodes ?? [];
    const motion = turnSketch(base, answer, nodes, step, edit.keys?.[0] ?? 0);
    if (!settled) this.edit = edit;
    const idle = turn.every((angle) => angle === 0);
    this.follow({ edit, settled, idle, ...(motion && { motion }) });
  }

  private chooseTurning(next: Turning): void {
    const turn = turnAtHand(this.edit);
    const about = next.about !== this.turning.about;
    this.turning = next;
    if (about && turn.some((angle) => angle !== 0)) this.turnKey(turn, next.about, true);
  }

  /** An edit is made by hand: the porthole follows it, and at rest it is a sentence. */
  private follow({ edit, settled, idle, motion }: Sketched): void {
    const { answer, chosen } = this;
    if (!answer || !chosen) return;
    if (!settled) return this.trial.sketching(motion);
    this.edit = edit;
    const step: Step = { ...edit, clip: chosen.clip, track: chosen.track };
    if (idle) this.trial.leave();
    else this.trial.begin(sayStep(step), edit.at ?? this.time, motion);
  }

  /** Apply what is written, as it was tried. The keyboard goes back to the trace. */
  async applySentence(): Promise<void> {
    const { chosen, trial } = this;
    if (!trial.sentence?.step || !chosen || this.busy) return;
    this.busy = true;
    const sentence = await trial.settled;
    const step = chosen === this.chosen ? sentence?.step : undefined;
    const done = step !== undefined && (await this.session.apply(chosen.file, [step]));
    this.busy = false;
    // Another may have been begun meanwhile.
    if (done && trial.sentence === sentence) this.leaveSentence();
    else if (step && trial.sentence) this.rewrite(trial.sentence.text);
  }

  private leaveSentence(): void {
    this.trial.leave();
    this.edit = undefined;
    void this.updateComplete.then(() => this.focus());
  }
}
