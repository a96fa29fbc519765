import { html, nothing, type TemplateResult } from 'lit';
import { trackName } from '@slewcurve/elements/plot';
import { LEVELS } from '@slewcurve/job';
import { sayStep } from '@slewcurve/mend';
import type { Finding } from '@slewcurve/survey';
import { linesOf, stepsOf } from '../session/card-history.js';
import type { FileWork } from '../session/file-work.js';

/** Docket: report. The record that is handed on, one printable page a file. */
export function docketPage(
  files: readonly FileWork[],
  saveText: (name: string, text: string) => void,
): TemplateResult {
  const ready = files.filter((file) => file.report);
  if (ready.length === 0)
    return html`<p class="empty">
      No file is surveyed yet. What is found and what is mended will stand here, to be printed or handed on.
    </p>`;
  return html`${ready.map((file) => docketOf(file, saveText))}`;
}

function docketOf(file: FileWork, saveText: (name: string, text: string) => void): TemplateResult {
  const { report, history, proofs } = file;
  const findings = [...file.findings.values()]
    .flat()
    .toSorted((a, b) => LEVELS.indexOf(a.level) - LEVELS.indexOf(b.level));
  const steps = stepsOf(history);
  const card = { schemaVersion: 1, steps };
  return html`<article class="docket" aria-label="Docket of ${file.name}">
    <h2>${file.name}</h2>
    <p>
      ${file.opened?.size.toLocaleString('en')} bytes, ${report?.tracks.length ?? 0} rotation tracks.
      Slewcurve measured every motion exactly, as played by the playback named in each line; degrees, seconds
      of the file’s own clock.
    </p>
    <h3>Job card</h3>
    ${
      steps.length === 0
        ? html`<p>Nothing was edited.</p>`
        : html`<ol>
            ${linesOf(history).map((line) =>
              line.skipped
                ? html`<li><s>${sayStep(line.step)}</s> Skipped.</li>`
                : html`<li>${sayStep(line.step)} ${proofWords(file, line.step)}</li>`,
            )}
          </ol>`
    }
    ${
      proofs.length > 0
        ? html`<p>
            Proof: outside the spans of these steps the motion changes by at most
            ${Math.max(...proofs.map((proof) => proof.outside))}°; tracks that no step names keep every
            number.
          </p>`
        : nothing
    }
    <h3>Open findings</h3>
    ${findings.length === 0 ? html`<p>None.</p>` : findingsTable(findings)}
    <h3>The same by command</h3>
    <p><code>${commandOf(file)}</code></p>
    <p class="doings on-screen">
      <button @click=${() => print()}>Print this page</button>
      <button @click=${() => saveText('report.json', `${JSON.stringify(report, null, 2)}\n`)}>
        Save the report as JSON
      </button>
      <button
        ?disabled=${steps.length === 0}
        @click=${() => saveText('card.json', `${JSON.stringify(card, null, 2)}\n`)}
      >
        Save the job card as JSON
      </button>
    </p>
    <p class="caution">
      With motorised heads and cranes, check limits and stops against the maker’s data and local rules, by a
      licensed or responsible operator, at reduced speed first. Comfort numbers for headsets are guidance, not
      a standard. No figure here calls a motion safe.
    </p>
  </article>`;
}

function findingsTable(findings: readonly Finding[]): TemplateResult {
  return html`<table>
    <thead>
      <tr>
        <th scope="col">level</th>
        <th scope="col">track</th>
        <th scope="col">at</th>
        <th scope="col">what</th>
        <th scope="col">rule, as played</th>
      </tr>
    </thead>
    <tbody>
      ${findings.map(
        (finding) =>
          html`<tr>
            <td class="whole">${finding.level}</td>
            <td>${trackName(finding.track)} <i>${finding.clip}</i></td>
            <td class="whole">${finding.keys.length === 0 ? 'all along' : `${finding.time.toFixed(3)} s`}</td>
            <td>${finding.message}${finding.count > 1 ? ` (the worst of ${finding.count} places)` : ''}</td>
            <td>${finding.rule}, ${finding.playback.replaceAll('-', ' ')}</td>
          </tr>`,
      )}
    </tbody>
  </table>`;
}

function proofWords(file: FileWork, step: unknown): string {
  const proof = file.proofs.find((other) => JSON.stringify(other.step) === JSON.stringify(step));
  if (!proof) return '';
  const keys = proof.changed === 1 ? '1 key' : `${proof.changed} keys`;
  return `${keys} changed, the largest by ${proof.largest}°; ${proof.added} s added.`;
}

function commandOf({ name, history }: FileWork): string {
  return stepsOf(history).length === 0
    ? `npx slewcurve check ${name}`
    : `npx slewcurve mend ${name} --card card.json -o mended.glb`;
}
