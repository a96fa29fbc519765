import { html, nothing, type TemplateResult } from 'lit';
import { explainWord } from '@slewcurve/survey';

/** What a word of this project means, a rule's name first of all: its page, until it is put away. */
export function explanationOf(word: string | undefined, close: () => void): TemplateResult | typeof nothing {
  const [entry] = word === undefined ? [] : explainWord(word).entries;
  if (!entry) return nothing;
  const keyed = (event: KeyboardEvent): void => {
    if (event.key !== 'Escape') return;
    event.preventDefault();
    close();
  };
  return html`<div
    class="explanation"
    role="dialog"
    aria-label=${`What ${entry.name} is`}
    tabindex="-1"
    @keydown=${keyed}
  >
    ${blocksOf(entry.page).map(block)}
    <button @click=${close}>Put it away</button>
  </div>`;
}

/** Markdown as rule pages use it: headings, tables, paragraphs. */
function blocksOf(page: string): string[] {
  return page
    .trim()
    .split(/\n{2,}/)
    .filter((text) => text !== '');
}

function block(text: string): TemplateResult {
  if (text.startsWith('## ')) return html`<h3>${text.slice(3)}</h3>`;
  if (text.startsWith('# ')) return html`<h2>${text.slice(2)}</h2>`;
  return text.startsWith('|') ? table(text) : html`<p>${inline(text)}</p>`;
}

/** Names in back quotes are told from the words around them. */
function inline(text: string): (string | TemplateResult)[] {
  return text.split('`').map((part, i) => (i % 2 === 1 ? html`<code>${part}</code>` : part));
}

function table(text: string): TemplateResult {
  const [head = [], , ...rows] = text.split('\n').map((line) =>
    line
      .slice(1, -1)
      .split('|')
      .map((cell) => cell.trim()),
  );
  return html`<table>
    <thead>
      <tr>
        ${head.map((cell) => html`<th scope="col">${inline(cell)}</th>`)}
      </tr>
    </thead>
    <tbody>
      ${rows.map(
        (row) =>
          html`<tr>
            ${row.map((cell) => html`<td>${inline(cell)}</td>`)}
          </tr>`,
      )}
    </tbody>
  </table>`;
}

/** Where the keyboard is within an element, to go back there. */
export function focusedWithin(element: Element | null): HTMLElement | undefined {
  const focused = element?.shadowRoot?.activeElement;
  return focused instanceof HTMLElement ? focused : undefined;
}
