import { html, type TemplateResult } from 'lit';
import { valueOf } from '../theme/value-of.js';
import type { ChartData } from './chart-data.js';
import { foldChoices } from './fold.js';
import { saySpan } from './quantity.js';
import type { ScaleKind } from './scale.js';

const SCALES: readonly (readonly [ScaleKind, string])[] = [
  ['usual', 'evenly, to the usual speed'],
  ['linear', 'evenly, to the greatest speed'],
  ['log', 'by powers of ten'],
];

/** How the chart is folded and scaled. */
export interface ChartChoices {
  readonly data: ChartData;
  readonly fold: number;
  readonly scale: ScaleKind;
  /** Whether the close-up is open. */
  readonly opened: boolean;
}

/** What the choices tell the chart. */
export interface ChoiceEvents {
  fold(seconds: number): void;
  scale(kind: ScaleKind): void;
  closeUp(): void;
}

/** Length of a row, scale of speeds, close-up. */
export function chartChoices(chosen: ChartChoices, events: ChoiceEvents): TemplateResult {
  const { data, fold, scale } = chosen;
  const usual = foldChoices(data.motion.end - data.motion.start, data.loop);
  const folds = usual.includes(fold) ? usual : [...usual, fold].toSorted((a, b) => a - b);
  const choose = (event: Event): void => {
    const kind = SCALES.find(([known]) => known === valueOf(event))?.[0];
    if (kind) events.scale(kind);
  };
  return html`<div class="choices on-screen">
    <label>
      A row is
      <select @change=${(event: Event) => events.fold(Number(valueOf(event)))}>
        ${folds.map(
          (seconds) =>
            html`<option value=${seconds} ?selected=${seconds === fold}>
              ${saySpan(seconds)}${seconds === data.loop ? ', one loop' : ''}
            </option>`,
        )}
      </select>
    </label>
    <label>
      Speeds stand
      <select @change=${choose}>
        ${SCALES.map(([kind, says]) => html`<option value=${kind} ?selected=${kind === scale}>${says}</option>`)}
      </select>
    </label>
    <button class="plain" @click=${() => events.closeUp()}>
      ${chosen.opened ? 'Close the close-up' : 'Open a close-up here'}
    </button>
  </div>`;
}
