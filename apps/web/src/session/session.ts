import type { PlaybackId } from '@slewcurve/core';
import {
  addStamps,
  stampsFor,
  withoutStamps,
  type CardAnswer,
  type JobSettings,
  type MatrixSettings,
  type PlaybackMatrix,
  type SaidConventions,
  type Stamp,
  type StampWords,
  type TableTrial,
  type TrackAnswer,
  type TrialAnswer,
  type TrackName,
} from '@slewcurve/job';
import type { Step } from '@slewcurve/mend';
import { PAGE_WORDS } from '@slewcurve/elements/plot';
import { inTurn } from '@slewcurve/elements/theme/in-turn';
import { NO_HOUSE_RULES, type Finding, type Word } from '@slewcurve/survey';
import type { Chosen } from '../files/chosen-file.js';
import { stampedPath } from '../files/record.js';
import { mendedName, saveCopy, saveInPlace, type Saved } from '../files/save-file.js';
import {
  EMPTY_HISTORY,
  redone,
  stepsOf,
  undone,
  withLines,
  withSteps,
  type CardHistory,
  type CardLine,
} from './card-history.js';
import { DeskClient, DeskError } from './desk-client.js';
import { trackKey, type FileWork, type InkedRow } from './file-work.js';
import { baseName, readRecords, type NamedHouseRules, type NamedStamps } from './read-records.js';
import { newWork, savedWork } from './new-work.js';
import { keepWork, type SavedWork } from './recovery.js';
import { stamped } from './stamped.js';
import { settingsOf } from './survey-terms.js';

/** The page's work: files, their surveys and job cards. Fires `change` once a picture at most, `notice` where there is something to say. */
export class Session extends EventTarget {
  readonly desk = new DeskClient();
  files: readonly FileWork[] = [];
  /** What things are called, and what else: known soon after the start. */
  words: readonly Word[] = PAGE_WORDS;
  /** What was last said, for people. */
  notice = '';
  settings: JobSettings = {
    playbacks: ['as-written'],
    failAt: 'warning',
    allowWarnings: 0,
    houseRules: NO_HOUSE_RULES,
  };
  /** House rules that somebody opened. */
  house: NamedHouseRules | undefined;
  #next = 1;
  #stops = new Map<string, AbortController>();
  #cards = Promise.resolve();
  #surveys = Promise.resolve();
  /** A `change` is on its way. */
  #told = false;

  constructor() {
    super();
    this.desk.addEventListener('lost', () => void this.#startOver());
    void this.#learn();
  }

  file(id: string): FileWork | undefined {
    return this.files.find((file) => file.id === id);
  }

  /** Open files, one after the other; a broken one says so and the rest goes on. House rules and stamps hold before anything is surveyed. */
  async open({ files, records }: Chosen): Promise<void> {
    const read = await readRecords(records);
    const rest = read.stamps.filter(({ path }) => !files.some(({ name }) => name === stampedPath(path)));
    const works = files.map((file) => {
      const own = read.stamps.find(({ path }) => file.name === stampedPath(path));
      return newWork(`file-${this.#next++}`, own ? { ...file, stamps: own.stamps } : file);
    });
    const said = [...read.problems, ...rest.flatMap((own) => this.#stampOpen(own))];
    if (said.length > 0) this.#say(said.join(' '));
    if (read.house) await this.setHouse(read.house);
    await this.#take(works);
  }

  /** House rules for all files but the demo scene, which has its own; undefined: none. */
  async setHouse(house: NamedHouseRules | undefined): Promise<void> {
    this.house = house;
    this.settings = { ...this.settings, houseRules: house?.rules ?? NO_HOUSE_RULES };
    await this.#surveyAnew(this.files.filter(({ blob }) => blob));
  }

  /** Puts stamps on the open file that they are for; what is wrong where there is none. */
  #stampOpen({ path, stamps }: NamedStamps): string[] {
    const name = baseName(stampedPath(path));
    const file = this.files.find((other) => baseName(other.name) === name);
    if (!file) return [`${path} holds stamps for ${name}, which is not open; open both together.`];
    void this.setStamps(file.id, addStamps(file.stamps, stamps));
    return [`${stamps.length.toLocaleString('en')} accepted in ${path} are taken over.`];
  }

  async openDemo(): Promise<void> {
    await this.#take([newWork(`demo-${this.#next++}`, { name: 'kestrel-point.glb', siblings: {} })]);
  }

  /** Take up the work that an earlier visit left. */
  async resume(works: readonly SavedWork[]): Promise<void> {
    await this.#take(
      works.map((work) => ({
        ...newWork(`file-${this.#next++}`, work),
        history: withLines(EMPTY_HISTORY, work.lines, 'all that was taken up'),
      })),
    );
  }

  /** Stop what is being done with a file, or leave it out if its turn has not come. */
  stop(id: string): void {
    this.#stopOf(id).abort(new DeskError('job.stopped', 'Stopped.'));
  }

  /** Take up a file that was stopped. */
  async goOn(id: string): Promise<void> {
    this.#stops.delete(id);
    this.#put(id, { status: 'opening' });
    await this.#openAndSurvey(id);
  }

  async close(id: string): Promise<void> {
    this.stop(id);
    this.#set(this.files.filter((file) => file.id !== id));
    await this.desk.ask('close', { file: id }).catch(() => {});
    await this.#keep();
  }

  async setPlaybacks(playbacks: readonly PlaybackId[]): Promise<void> {
    this.settings = { ...this.settings, playbacks };
    await this.#surveyAnew(this.files);
  }

  /** Say that a clip plays as a loop, or that it does not; its file is surveyed anew. */
  async setLoop(id: string, clip: string, on: boolean): Promise<void> {
    const file = this.file(id);
    if (!file || file.loops.includes(clip) === on) return;
    this.#put(id, { loops: on ? [...file.loops, clip] : file.loops.filter((other) => other !== clip) });
    await this.#surveyAnew([file]);
    await this.#keep();
  }

  /** Accept what is named on a track: one place by its fingerprint, or every place of a finding by the finding's. */
  async accept(
    id: string,
    track: Pick<TrackName, 'clip' | 'track'>,
    named: string,
    words: StampWords,
  ): Promise<void> {
    const file = this.file(id);
    if (!file?.report) return;
    const findings = file.found.get(trackKey(track.clip, track.track)) ?? [];
    const added = stampsFor({ ...file.report, findings }, named, words);
    await this.setStamps(id, addStamps(file.stamps, added));
  }

  /** Who accepted last. */
  get by(): string {
    return this.files.findLast(({ stamps }) => stamps.length > 0)?.stamps.at(-1)?.by ?? '';
  }

  /** Take back what was accepted. */
  async takeBack(id: string, track: Pick<TrackName, 'clip' | 'track'>, named: string): Promise<void> {
    const file = this.file(id);
    if (!file) return;
    const findings = file.found.get(trackKey(track.clip, track.track)) ?? [];
    await this.setStamps(id, withoutStamps(file.stamps, findings, named));
  }

  /** Make these a file's stamps. */
  async setStamps(id: string, stamps: readonly Stamp[]): Promise<void> {
    const file = this.file(id);
    if (!file) return;
    this.#put(id, { stamps, findings: stamped(file.found, stamps) });
    await this.#keep();
  }

  track(id: string, clip: string, track: string): Promise<TrackAnswer> {
    return this.desk.ask('track', { file: id, clip, track });
  }

  /** What a step would make of a track as the card leaves it; nothing is kept. */
  trial(id: string, step: Step, { clip, track }: { clip: string; track: string }): Promise<TrialAnswer> {
    return this.desk.ask('try', { file: id, clip, track, step });
  }

  /** What a table of text becomes by what is said of it; nothing is opened. */
  tryTable(name: string, blob: Blob, table: NonNullable<SaidConventions['table']>): Promise<TableTrial> {
    return this.desk.ask('try-table', { name, blob, table });
  }

  /** Read a file anew by what is said of it. */
  async readBy(id: string, said: SaidConventions): Promise<void> {
    this.#stops.delete(id);
    this.#put(id, {
      said,
      status: 'opening',
      rows: new Map(),
      found: new Map(),
      findings: new Map(),
      events: [],
    });
    await this.#openAndSurvey(id);
    await this.#keep();
  }

  /** Worst speed and departure of a track by playback and tick rate. */
  async matrix(
    file: string,
    clip: string,
    track: string,
    settings: MatrixSettings,
  ): Promise<PlaybackMatrix['cells']> {
    return (await this.desk.ask('matrix', { file, clip, track, settings })).cells;
  }

  /** Put steps on a file's card. */
  apply(id: string, steps: readonly Step[]): Promise<boolean> {
    return this.#changeCard(id, (history) => withSteps(history, steps));
  }

  setLines(id: string, lines: readonly CardLine[], change: string): Promise<boolean> {
    return this.#changeCard(id, (history) => withLines(history, lines, change));
  }

  undo(id: string): Promise<boolean> {
    return this.#changeCard(id, undone);
  }

  redo(id: string): Promise<boolean> {
    return this.#changeCard(id, redone);
  }

  /** Put the remedy of every finding on the card. */
  async mendAll(id: string): Promise<void> {
    const stamps = this.file(id)?.stamps ?? [];
    const { steps, declined } = await this.desk.ask('propose', { file: id, allow: [], stamps });
    if (steps.length > 0) await this.apply(id, steps);
    this.#say(
      [
        steps.length === 0 ? 'There is nothing to mend by a proposed remedy.' : '',
        ...new Set(declined.map(({ step, why }) => leftOut(step, why))),
      ].join(' '),
    );
  }

  /** Save over the file (`in place`) or as a copy. */
  async save(id: string, how: Saved['how']): Promise<void> {
    const file = this.file(id);
    if (!file) return;
    try {
      const answer = await this.desk.ask('bytes', { file: id });
      const bytes = new Uint8Array(answer.bytes);
      const order = {
        name: file.name,
        bytes,
        onDisk: file.onDisk ?? answer.original,
        ...(file.handle && { handle: file.handle }),
      };
      const saved =
        how === 'in place' ? await saveInPlace(order, this.desk) : saveCopy(mendedName(file.name), bytes);
      const written = { size: bytes.length, sha256: answer.sha256 };
      this.#put(id, { saved: true, ...(how === 'in place' && { onDisk: written }) });
      this.#say(
        how === 'in place'
          ? `${saved.name} is written.`
          : `${saved.name} is handed to the browser as a download.`,
      );
    } catch (error) {
      this.#say(messageOf(error));
    }
  }

  async #learn(): Promise<void> {
    // Where the desk is lost meanwhile, the page's own words must do.
    const words = await this.desk.ask('words', {}).catch(() => []);
    this.words = [...PAGE_WORDS, ...words];
    this.#set(this.files);
  }

  async #take(works: readonly FileWork[]): Promise<void> {
    for (const work of works) this.#set([...this.files, { ...work, name: freeName(work.name, this.files) }]);
    for (const work of works) await this.#openAndSurvey(work.id);
    await this.#keep();
  }

  async #openAndSurvey(id: string): Promise<void> {
    const file = this.file(id);
    if (!file) return;
    const { name, blob, siblings, said } = file;
    const { signal } = this.#stopOf(id);
    try {
      signal.throwIfAborted();
      const opened = blob
        ? await this.desk.ask('open', { file: id, name, blob, siblings, ...(said && { said }) })
        : await this.desk.ask('open-demo', { file: id });
      signal.throwIfAborted();
      this.#put(id, { opened, status: 'surveying' });
      await this.#survey(id);
    } catch (error) {
      this.#fail(id, error);
    }
  }

  #stopOf(id: string): AbortController {
    const stop = this.#stops.get(id) ?? new AbortController();
    this.#stops.set(id, stop);
    return stop;
  }

  async #survey(id: string): Promise<void> {
    const { signal } = this.#stopOf(id);
    const rows = new Map(this.file(id)?.rows);
    const { settings } = this;
    const loops = this.file(id)?.loops;
    const report = await this.desk.ask(
      'survey',
      { file: id, settings: settingsOf(this.file(id), settings) },
      {
        signal,
        onProgress: (progress) => this.#put(id, { progress }),
        onRow: (row) => {
          rows.set(trackKey(row.clip, row.track), row);
          this.#put(id, { rows });
        },
      },
    );
    // What was asked for meanwhile is surveyed next.
    if (settings !== this.settings || loops !== this.file(id)?.loops) return;
    const found = new Map<string, Finding[]>();
    for (const finding of report.findings) {
      const key = trackKey(finding.clip, finding.track);
      const own = found.get(key);
      if (own) own.push(finding);
      else found.set(key, [finding]);
    }
    const findings = stamped(found, this.file(id)?.stamps ?? []);
    this.#put(id, { report, found, findings, events: report.events ?? [], status: 'ready' });
    const history = this.file(id)?.history ?? EMPTY_HISTORY;
    if (stepsOf(history).length > 0) await this.#changeCard(id, () => history);
  }

  /** One after the other, so that the last word counts. */
  #surveyAnew(files: readonly FileWork[]): Promise<void> {
    const open = files.flatMap(({ id, opened }) => (opened ? [id] : []));
    for (const id of open) this.#put(id, { status: 'surveying' });
    this.#surveys = this.#surveys.then(async () => {
      for (const id of open) {
        this.#put(id, { status: 'surveying' });
        await this.#survey(id).catch((error: unknown) => this.#fail(id, error));
      }
    });
    return this.#surveys;
  }

  #fail(id: string, error: unknown): void {
    const code = error instanceof DeskError ? error.code : 'page.fault';
    if (code === 'desk.lost') return;
    this.#put(id, {
      status: code === 'job.stopped' ? 'stopped' : 'broken',
      error: { code, message: messageOf(error) },
    });
  }

  /** Cards are changed one after the other, so that two quick presses can't cross. */
  #changeCard(id: string, change: (history: CardHistory) => CardHistory): Promise<boolean> {
    const done = this.#cards.then(() => this.#makeCardTrue(id, change));
    this.#cards = done.then(() => {});
    return done;
  }

  async #makeCardTrue(id: string, change: (history: CardHistory) => CardHistory): Promise<boolean> {
    const file = this.file(id);
    if (!file) return false;
    const history = change(file.history);
    try {
      this.#applyAnswer(id, await this.desk.ask('card', { file: id, steps: stepsOf(history) }));
      this.#put(id, { history, saved: stepsOf(history).length === 0 });
      await this.#keep();
      return true;
    } catch (error) {
      this.#say(messageOf(error));
      return false;
    }
  }

  #applyAnswer(id: string, { tracks, steps, raised, events }: CardAnswer<InkedRow>): void {
    const file = this.file(id);
    if (!file) return;
    const rows = new Map(file.rows);
    const found = new Map(file.found);
    for (const { row, findings } of tracks) {
      rows.set(trackKey(row.clip, row.track), row);
      found.set(trackKey(row.clip, row.track), findings);
    }
    this.#put(id, { rows, found, findings: stamped(found, file.stamps), events, proofs: steps, raised });
  }

  async #startOver(): Promise<void> {
    this.#say(
      'The work behind the page stopped. It was started again, and your files and job cards are taken up where they were.',
    );
    for (const { id } of this.files) {
      this.#put(id, { status: 'opening' });
      await this.#openAndSurvey(id);
    }
  }

  #keep(): Promise<void> {
    return keepWork(this.files.filter((file) => file.status !== 'broken').map(savedWork));
  }

  #put(id: string, change: Partial<FileWork>): void {
    this.#set(this.files.map((file) => (file.id === id ? { ...file, ...change } : file)));
  }

  #set(files: readonly FileWork[]): void {
    this.files = files;
    if (this.#told) return;
    this.#told = true;
    inNextPicture(() => {
      this.#told = false;
      this.dispatchEvent(new Event('change'));
    });
  }

  #say(words: string): void {
    this.notice = words;
    this.dispatchEvent(new Event('notice'));
  }
}

/** Two files of one name are told apart: `walk.glb`, `walk (2).glb`. */
function freeName(name: string, files: readonly FileWork[]): string {
  const taken = (other: string): boolean => files.some((file) => file.name === other);
  for (let number = 2, free = name; ; number++) {
    if (!taken(free)) return free;
    free = name.replace(/(\.[^./]*)?$/, ` (${number})$1`);
  }
}

/** The survey's reasons are worded for the terminal; a choice is made on the chart here. */
function leftOut({ verb, clip }: Step, why: string): string {
  const reason = why.includes('--allow') ? `to ${verb} is a choice of yours; make it on its chart` : why;
  return `Left out in ${clip}: ${reason}.`;
}

/** Pages out of sight draw no pictures, and must go on all the same. */
function inNextPicture(work: () => void): void {
  if (document.hidden) setTimeout(work);
  else requestAnimationFrame(() => void inTurn(work));
}

function messageOf(error: unknown): string {
  return error instanceof Error ? error.message : String(error);
}
