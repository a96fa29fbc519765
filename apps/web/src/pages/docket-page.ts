import { html, type TemplateResult } from 'lit';
import { docketOf, withStamps, type DocketBlock, type JobSettings } from '@slewcurve/job';
import { linesOf, stepsOf } from '../session/card-history.js';
import type { FileWork } from '../session/file-work.js';

/** What the docket page needs of the page around it. */
interface DocketDoings {
  settingsOf(file: FileWork): JobSettings;
  saveText(name: string, text: string): void;
  saveStamps(file: FileWork): void;
}

/** Docket: report. The record that is handed on, one printable page a file. */
export function docketPage(files: readonly FileWork[], doings: DocketDoings): TemplateResult {
  const ready = files.filter((file) => file.report);
  if (ready.length === 0)
    return html`<p class="empty">
      No file is surveyed yet. What is found and what is mended will stand here, to be printed or handed on.
    </p>`;
  return html`${ready.map((file) => pageOf(file, doings))}`;
}

function pageOf(file: FileWork, doings: DocketDoings): TemplateResult {
  const { history, proofs, opened, stamps } = file;
  if (!file.report) return html``;
  const report = withStamps(file.report, stamps);
  const { playbacks, houseRules } = doings.settingsOf(file);
  const steps = stepsOf(history);
  const card = { schemaVersion: 1, steps };
  const blocks = docketOf({
    before: { size: opened?.size ?? 0, report },
    after: { findings: [...file.findings.values()].flat(), tracks: [] },
    playbacks,
    houseRules,
    lines: linesOf(history),
    proofs,
    command: commandOf(file),
  });
  const cautions = blocks.filter(({ kind }) => kind === 'caution');
  return html`<article class="docket" aria-label="Docket of ${file.name}">
    <h2>${file.name}</h2>
    ${blocks
      .slice(1)
      .filter(({ kind }) => kind !== 'caution')
      .map(blockOf)}
    <p class="doings on-screen">
      <button @click=${() => print()}>Print this page</button>
      <button @click=${() => doings.saveText('report.json', `${JSON.stringify(report, null, 2)}\n`)}>
        Save the report as JSON
      </button>
      <button
        ?disabled=${steps.length === 0}
        @click=${() => doings.saveText('card.json', `${JSON.stringify(card, null, 2)}\n`)}
      >
        Save the job card as JSON
      </button>
      <button ?disabled=${stamps.length === 0} @click=${() => doings.saveStamps(file)}>
        Save what is accepted
      </button>
    </p>
    ${cautions.map(blockOf)}
  </article>`;
}

/** A piece of the docket on the page. */
function blockOf(block: DocketBlock): TemplateResult {
  switch (block.kind) {
    case 'heading':
      return html`<h3>${block.text}</h3>`;
    case 'paragraph':
      return html`<p>${block.text}</p>`;
    case 'caution':
      return html`<p class="caution">${block.text}</p>`;
    case 'code':
      return html`<p><code>${block.text}</code></p>`;
    case 'list': {
      const items = block.items.map(({ text, struck }) =>
        struck ? html`<li><s>${text}</s></li>` : html`<li>${text}</li>`,
      );
      return block.ordered
        ? html`<ol>
            ${items}
          </ol>`
        : html`<ul>
            ${items}
          </ul>`;
    }
    default:
      return tableOf(block);
  }
}

function tableOf({ head, rows, short = [] }: Extract<DocketBlock, { kind: 'table' }>): TemplateResult {
  return html`<table>
    <thead>
      <tr>
        ${head.map((cell) => html`<th scope="col">${cell}</th>`)}
      </tr>
    </thead>
    <tbody>
      ${rows.map(
        (row) =>
          html`<tr>
            ${row.map((cell, at) => html`<td class=${short.includes(at) ? 'whole' : ''}>${cell}</td>`)}
          </tr>`,
      )}
    </tbody>
  </table>`;
}

function commandOf({ name, history }: FileWork): string {
  return stepsOf(history).length === 0
    ? `npx slewcurve check ${name}`
    : `npx slewcurve mend ${name} --card card.json -o mended.glb`;
}
