import { LitElement, html, nothing, type PropertyDeclarations, type TemplateResult } from 'lit';
import type { PlaybackId } from '@slewcurve/core';
import { rankRows, type RosterEvent, type RosterRow } from '@slewcurve/elements/plot';
import type { SlewRoster } from '@slewcurve/elements/roster';
import { stampsFileName, stampsJson, type SaidConventions } from '@slewcurve/job';
import { inTurn } from '@slewcurve/elements/theme/in-turn';
import { askForFiles, droppedFiles, pickedFiles, type Chosen } from '../files/chosen-file.js';
import { saveCopy } from '../files/save-file.js';
import { stepsOf } from '../session/card-history.js';
import type { FileWork } from '../session/file-work.js';
import { keptWork, type SavedWork } from '../session/recovery.js';
import { baseName } from '../session/read-records.js';
import { Session } from '../session/session.js';
import { settingsOf } from '../session/survey-terms.js';
import { appStyles } from './app-styles.js';
import type { SlewChartPage } from './chart-page.js';
import { docketPage } from './docket-page.js';
import { filesList, type FileActions } from './files-list.js';
import { isWorthKeeping, keptOffer } from './kept-offer.js';
import { keysHelp } from './keys-help.js';
import { welcome } from './welcome.js';
import { rosterEvents } from './roster-events.js';
import { rosterRows, rowId, trackOfRow, type ChosenTrack } from './roster-rows.js';

type PageName = 'roster' | 'chart' | 'docket';

const PAGES: readonly { readonly page: PageName; readonly says: string }[] = [
  { page: 'roster', says: 'Roster: all tracks' },
  { page: 'chart', says: 'Chart: one track' },
  { page: 'docket', says: 'Docket: report' },
];

/** Milliseconds: while rows arrive, the roster is drawn anew some times a second. */
const DRAWN_EVERY = 150;

/** The whole page: files, and the words at its head that lead to roster, chart and docket. */
export class SlewApp extends LitElement {
  static override properties: PropertyDeclarations = {
    page: { state: true },
    files: { state: true },
    rows: { state: true },
    events: { state: true },
    chosen: { state: true },
    notice: { state: true },
    kept: { state: true },
    over: { state: true },
  };
  static override styles = appStyles;

  declare private page: PageName;
  declare private files: readonly FileWork[];
  declare private rows: readonly RosterRow[];
  declare private events: readonly RosterEvent[];
  declare private chosen: ChosenTrack | undefined;
  declare private notice: string;
  declare private kept: readonly SavedWork[];
  /** Something is held over the page to be dropped. */
  declare private over: boolean;
  private readonly session = new Session();
  private drawnAt = 0;
  private later: ReturnType<typeof setTimeout> | undefined;
  /** Somebody chose the track; the page chooses no other. */
  private byHand = false;

  constructor() {
    super();
    this.page = 'roster';
    this.files = [];
    this.rows = [];
    this.events = [];
    this.notice = '';
    this.kept = [];
    this.over = false;
    this.session.addEventListener('change', () => this.follow());
    this.session.addEventListener('notice', () => (this.notice = this.session.notice));
  }

  override connectedCallback(): void {
    super.connectedCallback();
    addEventListener('keydown', this.keyed);
    for (const name of ['dragover', 'dragleave', 'drop'] as const) addEventListener(name, this.dragged);
    void this.begin();
  }

  override disconnectedCallback(): void {
    super.disconnectedCallback();
    removeEventListener('keydown', this.keyed);
    for (const name of ['dragover', 'dragleave', 'drop'] as const) removeEventListener(name, this.dragged);
  }

  protected override scheduleUpdate(): Promise<void> {
    return inTurn(() => this.performUpdate());
  }

  /** The demo scene where the address says so; work that an earlier visit left is offered. */
  private async begin(): Promise<void> {
    const left = await keptWork();
    this.kept = left.filter(isWorthKeeping);
    if (new URLSearchParams(location.search).has('demo') && this.kept.length === 0)
      await this.session.openDemo();
  }

  private follow(): void {
    this.files = this.session.files;
    this.events = rosterEvents(this.files, this.events);
    this.drawRows();
    const { chosen } = this;
    if (chosen && !this.files.some((file) => file.id === chosen.file))
      [this.chosen, this.byHand] = [undefined, false];
    if (this.byHand) return;
    const next = this.worstTrack() ?? this.chosen ?? this.firstTrack();
    // The same track is the same object, so that it is not fetched again.
    if (JSON.stringify(next) !== JSON.stringify(this.chosen)) this.chosen = next;
  }

  private drawRows(): void {
    const early = this.drawnAt + DRAWN_EVERY - performance.now();
    if (early > 0) {
      this.later ??= setTimeout(() => {
        this.later = undefined;
        this.follow();
      }, early);
      return;
    }
    const rows = rosterRows(this.files);
    if (rows.length === this.rows.length && rows.every((row, i) => row === this.rows[i])) return;
    this.rows = rows;
    this.drawnAt = performance.now();
  }

  /** Drawn before the survey is through. */
  private firstTrack(): ChosenTrack | undefined {
    const file = this.files.find((other) => other.opened?.tracks[0]);
    const track = file?.opened?.tracks[0];
    return file && track && { file: file.id, clip: track.clip, track: track.track };
  }

  /** What the roster puts first, once a survey is through. */
  private worstTrack(): ChosenTrack | undefined {
    if (!this.files.some((file) => file.status === 'ready')) return undefined;
    const [first] = rankRows(this.rows, 'wrong');
    return first && trackOfRow(first.id);
  }

  private async take(chosen: Chosen): Promise<void> {
    if (chosen.files.length + chosen.records.length === 0) return;
    if (chosen.files.length > 0) this.kept = [];
    this.notice = '';
    await this.session.open(chosen);
  }

  private readonly dragged = (event: DragEvent): void => {
    if (!event.dataTransfer?.types.includes('Files')) return;
    event.preventDefault();
    this.over = event.type === 'dragover';
    if (event.type === 'drop') void droppedFiles(event.dataTransfer).then((files) => this.take(files));
  };

  private readonly keyed = (event: KeyboardEvent): void => {
    const command = event.ctrlKey || event.metaKey;
    const key = event.key.toLowerCase();
    const typing = event
      .composedPath()
      .some((node) => node instanceof HTMLInputElement || node instanceof HTMLTextAreaElement);
    if (!command || !this.chosen) return;
    if (key === 's' && !event.shiftKey) {
      // Saving the page itself would keep nothing of the work.
      event.preventDefault();
      this.save(this.chosen.file);
    } else if (key === 'z' && !typing) {
      event.preventDefault();
      void (event.shiftKey ? this.session.redo(this.chosen.file) : this.session.undo(this.chosen.file));
    }
  };

  /** A copy, until the file itself was chosen to be written over. */
  private save(id: string): void {
    const file = this.files.find((other) => other.id === id);
    if (file?.status !== 'ready') return;
    if (stepsOf(file.history).length === 0) this.notice = `There is no edit of ${file.name} to save.`;
    else void this.session.save(id, file.handle && file.onDisk ? 'in place' : 'download');
  }

  private async pick(): Promise<void> {
    const chosen = await askForFiles();
    if (chosen) await this.take(chosen);
    else this.openField('input.files');
  }

  private openField(which: string): void {
    this.renderRoot.querySelector<HTMLInputElement>(which)?.click();
  }

  private choose(chosen: ChosenTrack): void {
    this.byHand = true;
    this.chosen = chosen;
    this.go('chart');
  }

  private go(page: PageName): void {
    this.page = page;
    void this.updateComplete.then(() => {
      const chart = this.renderRoot.querySelector<SlewChartPage>('slew-chart-page');
      if (page === 'chart') chart?.focus();
      else if (page === 'roster') this.renderRoot.querySelector<SlewRoster>('slew-roster')?.focus();
    });
  }

  protected override render(): TemplateResult {
    return html`<header>
        <h1>Slewcurve</h1>
        <nav aria-label="Pages">
          ${PAGES.map(
            ({ page, says }) =>
              html`<button
                class="word"
                aria-current=${this.page === page ? 'page' : nothing}
                @click=${() => this.go(page)}
              >
                ${says}
              </button>`,
          )}
        </nav>
        ${this.openers()}
      </header>
      <p class="notice" role="status">${this.notice}</p>
      ${this.keptOffer()} ${filesList(this.files, this.fileActions)}
      <main class=${this.page}>${this.files.length === 0 ? this.welcome() : this.pages()}</main>
      ${keysHelp()}
      ${this.over ? html`<p class="over">Let go to open it here. Nothing leaves this machine.</p>` : nothing}`;
  }

  private openers(): TemplateResult {
    const picked = ({ target }: Event): void => {
      if (!(target instanceof HTMLInputElement)) return;
      const chosen = pickedFiles(target.files ?? []);
      // Else the same file, changed meanwhile, could not be chosen again.
      target.value = '';
      void this.take(chosen);
    };
    return html`<div class="openers on-screen">
      <button @click=${() => void this.pick()}>Open files</button>
      <button @click=${() => this.openField('input.folder')}>Open a folder</button>
      <button @click=${() => void this.session.openDemo()}>Open the demo scene</button>
      <input class="files" type="file" multiple hidden aria-hidden="true" tabindex="-1" @change=${picked} />
      <input
        class="folder"
        type="file"
        webkitdirectory
        hidden
        aria-hidden="true"
        tabindex="-1"
        @change=${picked}
      />
    </div>`;
  }

  private keptOffer(): TemplateResult | typeof nothing {
    return keptOffer(this.kept, {
      resume: () => {
        const works = this.kept;
        this.kept = [];
        void this.session.resume(works);
      },
      leave: () => (this.kept = []),
    });
  }

  private welcome(): TemplateResult {
    return welcome();
  }

  private pages(): TemplateResult {
    const { chosen } = this;
    return html`<section class="roster" aria-label="Roster: all tracks">
        <slew-roster
          .rows=${this.rows}
          .events=${this.events}
          .book=${this.session.words}
          .chosen=${chosen ? rowId(chosen) : undefined}
          .message=${this.files.some((file) => file.status === 'ready') ? 'There is no rotation track in these files.' : 'Reading.'}
          @track-chosen=${(event: CustomEvent<{ id: string }>) => this.choose(trackOfRow(event.detail.id))}
        ></slew-roster>
      </section>
      <section class="chart" aria-label="Chart: one track">
        <slew-chart-page
          .session=${this.session}
          .file=${chosen ? this.files.find((file) => file.id === chosen.file) : undefined}
          .chosen=${chosen}
          @playback-chosen=${(event: CustomEvent<{ playback: PlaybackId }>) => void this.session.setPlaybacks([event.detail.playback])}
        ></slew-chart-page>
      </section>
      <section class="docket" aria-label="Docket: report">
        ${this.page === 'docket' ? docketPage(this.files, this.docketDoings) : nothing}
      </section>`;
  }

  private readonly docketDoings = {
    settingsOf: (file: FileWork) => settingsOf(file, this.session.settings),
    saveText: (name: string, text: string) => void saveCopy(name, text, 'application/json'),
    saveStamps,
  };

  private get fileActions(): FileActions {
    return { ...this.doings, house: this.session.house?.name };
  }

  private readonly doings = {
    setLoop: (id: string, clip: string, on: boolean): void => void this.session.setLoop(id, clip, on),
    saveStamps,
    leaveHouse: (): void => void this.session.setHouse(undefined),
    askConventions: (file: FileWork): TemplateResult =>
      html`<slew-ask-conventions
        .session=${this.session}
        .file=${file}
        @conventions-said=${(event: CustomEvent<{ said: SaidConventions }>) => void this.session.readBy(file.id, event.detail.said)}
      ></slew-ask-conventions>`,
    stop: (id: string): void => this.session.stop(id),
    goOn: (id: string): void => void this.session.goOn(id),
    close: (id: string): void => void this.session.close(id),
    mendAll: (id: string): void => void this.session.mendAll(id),
    save: (id: string, how: 'in place' | 'download'): void => void this.session.save(id, how),
  };
}

/** As the command writes it beside the file. */
function saveStamps({ name, stamps }: FileWork): void {
  saveCopy(stampsFileName(baseName(name)), stampsJson(stamps), 'application/json');
}
