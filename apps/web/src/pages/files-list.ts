import { html, nothing, type TemplateResult } from 'lit';
import { sayConventions } from '@slewcurve/job';
import { houseRulesLine } from './house-rules-line.js';
import { loopOffers } from './loop-choice.js';
import { linesOf } from '../session/card-history.js';
import type { FileWork } from '../session/file-work.js';
import { acceptedOf, idleStamps } from '../session/stamped.js';

/** What the list of files may ask for. */
export interface FileActions {
  stop(id: string): void;
  goOn(id: string): void;
  close(id: string): void;
  mendAll(id: string): void;
  save(id: string, how: 'in place' | 'download'): void;
  setLoop(id: string, clip: string, on: boolean): void;
  saveStamps(file: FileWork): void;
  /** Name of the house rules that somebody opened, and how they are put away. */
  readonly house: string | undefined;
  readonly leaveHouse: () => void;
  /** What asks by which conventions a file is read. */
  askConventions(file: FileWork): TemplateResult;
}

/** The open files, each with how far it is and what can be done with it. */
export function filesList(files: readonly FileWork[], actions: FileActions): TemplateResult | typeof nothing {
  if (files.length === 0) return nothing;
  return html`<section aria-label="Open files">
    <ul class="files">
      ${files.map((file) => html`<li class=${file.status}>${oneFile(file, actions)}</li>`)}
    </ul>
  </section>`;
}

function oneFile(file: FileWork, actions: FileActions): TemplateResult {
  const { id, name, status } = file;
  if (status === 'broken') return broken(file, actions);
  if (status === 'stopped')
    return html`<p><b>${name}</b>: stopped. What was drawn so far stands below.</p>
      <button class="on-screen" @click=${() => actions.goOn(id)}>Go on with ${name}</button>
      <button class="on-screen" @click=${() => actions.close(id)}>Put ${name} away</button>`;
  if (status !== 'ready') return inProgress(file, actions);
  const steps = linesOf(file.history).filter((line) => !line.skipped).length;
  return html`<p><b>${name}</b>: ${sayFile(file)}</p>
    ${readBy(file, actions)}
    ${houseRulesLine(file.blob ? actions.house : 'its own', file.blob ? actions.leaveHouse : undefined)}
    ${loopOffers(file, (clip, on) => actions.setLoop(id, clip, on))} ${unusedStamps(file)}
    ${(file.opened?.problems ?? []).map((problem) => html`<p class="problem">${problem.message} <code>${problem.code}</code></p>`)}
    <p class="doings on-screen">
      ${
        file.stamps.length > 0
          ? html`<button @click=${() => actions.saveStamps(file)}>Save what is accepted</button>`
          : nothing
      }
      ${
        [...file.findings.values()].flat().some((finding) => finding.remedy && finding.muted === undefined)
          ? html`<button @click=${() => actions.mendAll(id)}>Mend all that is proposed</button>`
          : nothing
      }
      ${
        steps > 0
          ? html`${
                file.handle
                  ? html`<button @click=${() => actions.save(id, 'in place')}>Save over ${name}</button>`
                  : nothing
              }<button class="main" @click=${() => actions.save(id, 'download')}>Save a mended copy</button>`
          : nothing
      }
      <button @click=${() => actions.close(id)}>
        Put ${name} away${!file.saved && steps > 0 ? ', unsaved edits too' : ''}
      </button>
    </p>`;
}

function broken(file: FileWork, actions: FileActions): TemplateResult {
  const { id, name, error = { code: '', message: '' } } = file;
  const isAsked = ASKED.has(error.code);
  return html`<p role="alert">
      <b>${name}</b> can’t be read${isAsked ? ' yet' : ''}. ${withoutName(error.message, name)}
      <code>${error.code}</code>
    </p>
    ${isAsked ? actions.askConventions(file) : nothing}
    <button class="on-screen" @click=${() => actions.close(id)}>Put ${name} away</button>`;
}

/** A file that can be read once something is said of it. */
const ASKED: ReadonlySet<string> = new Set([
  'delimited.unnamed-columns',
  'delimited.column-count',
  'delimited.doubled-column',
  'delimited.unit-conflict',
]);

/** By which conventions it is read, always shown; what its format leaves open can be told. */
function readBy(file: FileWork, actions: FileActions): TemplateResult | typeof nothing {
  const { opened } = file;
  if (!opened) return nothing;
  const words = `read by: ${sayConventions(opened.conventions)}`;
  if (opened.format === 'glb' || opened.format === 'gltf') return html`<p class="read-by">${words}</p>`;
  return html`<details class="read-by">
    <summary>${words}</summary>
    ${actions.askConventions(file)}
  </details>`;
}

function inProgress({ id, name, status, progress }: FileWork, actions: FileActions): TemplateResult {
  const share = progress && progress.total > 0 ? progress.done / progress.total : undefined;
  const words = progress
    ? `${progress.done.toLocaleString('en')} of ${progress.total.toLocaleString('en')} ${progress.what}`
    : 'reading';
  return html`<p>
      <b>${name}</b>: ${status === 'opening' ? 'opening' : 'surveying'},
      <progress aria-label="Progress of ${name}" max="1" .value=${share ?? 0}></progress> ${words}
    </p>
    <button class="on-screen" @click=${() => actions.stop(id)}>Stop</button>`;
}

function sayFile({ opened, report, findings, saved, history }: FileWork): string {
  const all = [...findings.values()].flat();
  const found = all.filter(({ muted }) => muted === undefined);
  const count = (level: string): number => found.filter((finding) => finding.level === level).length;
  const places = found.reduce((sum, finding) => sum + finding.count, 0);
  const accepted = acceptedOf(all);
  const parts = [
    counted(opened?.tracks.length ?? 0, 'rotation track'),
    `in ${counted(report?.clips.length ?? 0, 'clip')};`,
    `${counted(count('error'), 'error')}, ${counted(count('warning'), 'warning')}, ${counted(count('note'), 'note')}${places > found.length ? ` at ${counted(places, 'place')}` : ''}.`,
  ];
  if (accepted.whole > 0) parts.push(`${accepted.whole.toLocaleString('en')} accepted.`);
  if (accepted.inPart > 0) parts.push(`${accepted.inPart.toLocaleString('en')} accepted in part.`);
  const steps = linesOf(history).length;
  if (steps > 0)
    parts.push(`${counted(steps, 'edit')} on the job card, ${saved ? 'saved' : 'not saved yet'}.`);
  return parts.join(' ');
}

/** Messages for the terminal begin with the file's name, which stands before it here. */
function withoutName(message: string, name: string): string {
  return message.startsWith(`${name}: `) ? message.slice(name.length + 2) : message;
}

/** What was accepted and is found no more. */
function unusedStamps({ found, stamps, history }: FileWork): TemplateResult | typeof nothing {
  // Under an edit what was accepted may be gone and come back.
  if (linesOf(history).length > 0) return nothing;
  const idle = idleStamps(found, stamps).length;
  if (idle === 0) return nothing;
  return html`<p class="problem">
    ${counted(idle, 'stamp')} ${idle === 1 ? 'fits' : 'fit'} nothing any more. <code>stamps.unused</code>
  </p>`;
}

function counted(count: number, what: string): string {
  return `${count.toLocaleString('en')} ${what}${count === 1 ? '' : 's'}`;
}
