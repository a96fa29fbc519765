import { html, nothing, type TemplateResult } from 'lit';
import type { NumberedNote } from './carets.js';
import type { MarginNote } from './chart-data.js';
import { acceptedWords, effectWords, eventWords } from './note-words.js';
import { packMargin } from './pack-margin.js';
import { sayTime } from './quantity.js';

/** Notes beside one row before "and 12 more". */
const NOTES_AT_FIRST = 4;
/** Between two blocks of notes, px. */
const NOTE_GAP = 6;

/** What the margin tells the chart. */
export interface MarginEvents {
  choose(note: MarginNote): void;
  /** `way`: 0 the proposed remedy, from 1 on the others. */
  mend(note: MarginNote, way: number): void;
  explain(rule: string): void;
  /** Accept it with a reason. */
  readonly accept: (note: MarginNote) => void;
  /** Take back what was accepted of it. */
  readonly takeBack: (note: MarginNote) => void;
  unfold(row: number): void;
}

/** The notes of a row: findings whose worst place stands in it, each with its remedy and a button that says what it does. */
export function marginOf(
  row: number,
  notes: readonly NumberedNote[],
  chosen: string | undefined,
  unfolded: boolean,
  events: MarginEvents,
): TemplateResult | typeof nothing {
  if (notes.length === 0) return nothing;
  const shown = unfolded ? notes : notes.slice(0, NOTES_AT_FIRST);
  const hidden = notes.length - shown.length;
  return html`<ol aria-label="Findings in this row">
      ${shown.map((note) => noteItem(note, chosen, events))}
    </ol>
    ${
      hidden > 0
        ? html`<button class="plain on-screen" @click=${() => events.unfold(row)}>
            Show ${hidden.toLocaleString('en')} more in this row
          </button>`
        : nothing
    }`;
}

function noteItem(
  { note, number }: NumberedNote,
  chosen: string | undefined,
  events: MarginEvents,
): TemplateResult {
  const places = note.count > 1 ? `, the worst of ${note.count.toLocaleString('en')} places` : '';
  return html`<li
    class="${note.status} ${note.id === chosen ? 'chosen' : ''}"
    data-note=${note.id}
    data-level=${note.level}
    aria-current=${note.id === chosen ? 'true' : nothing}
  >
    <span class="number">${number}${note.level === 'error' ? '!' : ''}</span>
    <p class="message" @click=${() => events.choose(note)}>${note.message}</p>
    <span class="level"
      >${note.level}
      <a
        class="rule"
        href="#${note.rule}"
        title="What ${note.rule} is"
        @click=${(event: Event) => {
          event.preventDefault();
          events.explain(note.rule);
        }}
        >${note.rule}</a
      >,
      <span class="whole">${sayTime(note.time, 2)}</span
      >${places}${note.accepted ? '' : STATUS[note.status]}</span
    >
    ${[effectWords(note), eventWords(note), acceptedWords(note)].map((words) =>
      words === undefined ? nothing : html`<span class="more">${words}</span>`,
    )}
    ${
      note.remedy && note.status === 'open'
        ? [note.remedy, ...(note.others ?? [])].map(
            ({ sentence, button }, way) =>
              html`<button class="plain on-screen" title=${sentence} @click=${() => events.mend(note, way)}>
                ${button}<span class="unseen">, finding ${number}</span>
              </button>`,
          )
        : nothing
    }
    ${stampButtons(note, number, events)}
  </li>`;
}

function stampButtons(note: MarginNote, number: number, events: MarginEvents): TemplateResult {
  const button = (says: string, press: (note: MarginNote) => void): TemplateResult =>
    html`<button class="plain on-screen stamp" @click=${() => press(note)}>
      ${says}<span class="unseen">, finding ${number}</span>
    </button>`;
  return html`${note.status === 'open' ? button('Accept with a reason', events.accept) : nothing}${
    note.accepted ? button('Take the acceptance back', events.takeBack) : nothing
  }`;
}

const STATUS: Readonly<Record<MarginNote['status'], string>> = {
  open: '',
  mended: '; mended',
  stamped: '; accepted with a reason',
};

/** Notes that need more room than their row push the next ones down, so that the rows keep their rhythm. */
export function packNotes(root: ParentNode): void {
  const blocks = [...root.querySelectorAll<HTMLElement>('.notes')];
  const list = root.querySelector<HTMLElement>('.rows');
  if (!list) return;
  // Asking for sizes makes the browser lay the page out.
  if (blocks.every((block) => block.childElementCount === 0)) {
    list.style.minHeight = '';
    return;
  }
  // On narrow paper the styles put notes under their row, where nothing needs pushing.
  const beside = blocks[0] !== undefined && getComputedStyle(blocks[0]).position === 'absolute';
  const sizes = blocks.map((block) => ({
    top: block.parentElement?.offsetTop ?? 0,
    height: block.childElementCount === 0 ? 0 : block.offsetHeight,
  }));
  const { pushes, bottom } = packMargin(sizes, NOTE_GAP);
  blocks.forEach((block, i) => (block.style.marginTop = beside ? `${pushes[i]}px` : ''));
  list.style.minHeight = beside ? `${bottom}px` : '';
}
