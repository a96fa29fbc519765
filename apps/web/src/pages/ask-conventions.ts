import {
  LitElement,
  css,
  html,
  nothing,
  type PropertyDeclarations,
  type PropertyValues,
  type TemplateResult,
} from 'lit';
import { EULER_SEQUENCES } from '@slewcurve/core';
import { valueOf } from '@slewcurve/elements/theme/value-of';
import { UPS, type SaidConventions, type TableTrial } from '@slewcurve/job';
import type { FileWork } from '../session/file-work.js';
import type { Session } from '../session/session.js';
import { pageStyles } from './page-styles.js';

type Table = NonNullable<SaidConventions['table']>;

/** Names that mean something to a table's reader, for the fields' own lists. */
const COLUMN_NAMES: readonly string[] = [
  't_s',
  't_ms',
  'timestamp_ns',
  'qx',
  'qy',
  'qz',
  'qw',
  'rx_deg',
  'ry_deg',
  'rz_deg',
  'rx_rad',
  'ry_rad',
  'rz_rad',
  'tx',
  'ty',
  'tz',
];

/**
 * Asks by what a file is to be read where it is silent, and shows what comes of the answer before it is taken: the first rows, the tracks, their greatest
 * speed. Nothing is guessed.
 *
 * @fires conventions-said - `{ said: SaidConventions }`
 */
export class SlewAskConventions extends LitElement {
  static override properties: PropertyDeclarations = {
    session: { attribute: false },
    file: { attribute: false },
    said: { state: true },
    trial: { state: true },
    problem: { state: true },
  };
  static override styles = [
    pageStyles,
    css`
      .frame {
        overflow-x: auto;
      }
      table {
        border-collapse: collapse;
        margin: 0.5rem 0;
      }
      td,
      th {
        padding: 0.25rem 1rem 0.25rem 0;
        text-align: left;
        font-weight: 400;
      }
      th input {
        width: 8rem;
        min-height: 44px;
      }
      .asks {
        display: flex;
        flex-wrap: wrap;
        gap: 0.25rem 1.5rem;
      }
    `,
  ];

  declare session: Session;
  declare file: FileWork;
  declare private said: SaidConventions;
  declare private trial: TableTrial | undefined;
  declare private problem: string;
  private about = '';
  private asked = 0;

  protected override willUpdate(changed: PropertyValues): void {
    if (!changed.has('file') || this.about === this.file.id) return;
    this.about = this.file.id;
    this.said = this.file.said ?? {};
    this.problem = '';
    void this.tryOut();
  }

  private async tryOut(): Promise<void> {
    const { blob, name, opened } = this.file;
    if (!blob || (opened && opened.format !== 'delimited')) return;
    const asked = ++this.asked;
    try {
      const trial = await this.session.tryTable(name, blob, this.said.table ?? {});
      if (asked === this.asked) [this.trial, this.problem] = [trial, ''];
    } catch (error) {
      if (asked === this.asked) this.problem = error instanceof Error ? error.message : String(error);
    }
  }

  private say(change: SaidConventions): void {
    this.said = { ...this.said, ...change };
    if (change.table) void this.tryOut();
  }

  private sayTable(change: Table): void {
    this.say({ table: { ...this.said.table, ...change } });
  }

  protected override render(): TemplateResult {
    const { trial, file } = this;
    const isTable = trial !== undefined;
    const isReady = isTable ? trial.tracks.length > 0 : file.status === 'ready';
    return html`<form
      aria-label="What ${file.name} is read by"
      @submit=${(event: Event) => {
        event.preventDefault();
        this.dispatchEvent(
          new CustomEvent('conventions-said', { detail: { said: this.said }, bubbles: true, composed: true }),
        );
      }}
    >
      ${trial ? this.table(trial) : nothing}
      <p class="asks">
        ${trial && this.hasAngles(trial) ? this.angles(trial) : nothing}
        ${ask('up axis', UPS, this.said.up, (up) => this.say({ up: UPS.find((one) => one === up) }))}
        ${ask('handedness', ['right', 'left'], this.said.hand, (hand) => this.say({ hand: hand === 'right' || hand === 'left' ? hand : undefined }))}
        ${ask('orientations in the axes of', ['parent', 'world'], this.said.space, (space) => this.say({ space: space === 'parent' || space === 'world' ? space : undefined }))}
      </p>
      <p role="status">${this.effect()}</p>
      <button class="main" ?disabled=${!isReady}>Read it so</button>
    </form>`;
  }

  private table({ names, rows, silent }: TableTrial): TemplateResult {
    const count = Math.max(0, ...rows.map((row) => row.length));
    const own = this.said.table?.columns;
    const open = silent.includes('columns') || own !== undefined;
    const rename = (column: number, name: string): void => {
      const known = own ?? names ?? [];
      this.sayTable({
        columns: Array.from({ length: count }, (_, i) => (i === column ? name : (known[i] ?? ''))),
      });
    };
    return html`${open ? html`<p>Name the time and each number of the orientation; leave the rest as it is.</p>` : nothing}
      <div class="frame" tabindex="0" role="group" aria-label="First rows">
        <datalist id="names">${COLUMN_NAMES.map((name) => html`<option value=${name}></option>`)}</datalist>
        <table>
          <thead>
            <tr>
              ${Array.from({ length: count }, (_, i) => {
                const name = own?.[i] ?? names?.[i] ?? '';
                return open
                  ? html`<th>
                      <input
                        list="names"
                        aria-label="name of column ${i + 1}"
                        .value=${name}
                        @change=${(event: Event) => rename(i, valueOf(event))}
                      />
                    </th>`
                  : html`<th scope="col">${name}</th>`;
              })}
            </tr>
          </thead>
          <tbody>
            ${rows.map(
              (row) =>
                html`<tr>
                  ${row.map((cell) => html`<td>${cell}</td>`)}
                </tr>`,
            )}
          </tbody>
        </table>
      </div>`;
  }

  private angles({ silent }: TableTrial): TemplateResult {
    const { euler, unit } = this.said.table ?? {};
    return html`${
      silent.includes('euler') || euler !== undefined
        ? ask('sequence of the angles', EULER_SEQUENCES, euler, (value) => this.sayTable({ euler: value }))
        : nothing
    }${
      silent.includes('unit') || unit !== undefined
        ? ask('unit of the angles', ['deg', 'rad'], unit, (value) =>
            this.sayTable({ unit: value === 'rad' || value === 'deg' ? value : undefined }),
          )
        : nothing
    }`;
  }

  private hasAngles({ silent }: TableTrial): boolean {
    const { euler, unit } = this.said.table ?? {};
    return silent.includes('euler') || silent.includes('unit') || euler !== undefined || unit !== undefined;
  }

  private effect(): string {
    const { trial, problem } = this;
    if (problem !== '') return problem;
    if (!trial) return '';
    if (trial.problem) return trial.problem.message;
    if (trial.silent.includes('columns')) return 'What the columns are is still to be told.';
    if (trial.silent.length > 0)
      return `Still to be told: ${trial.silent.map((what) => (what === 'euler' ? 'the sequence of the angles' : 'their unit')).join(' and ')}.`;
    const fastest = trial.tracks.map(
      ({ track, keys, peakRate }) =>
        `${track}, ${keys} keys, at most ${peakRate.toLocaleString('en', { maximumSignificantDigits: 4 })} deg/s`,
    );
    return `Read so: ${fastest.slice(0, 4).join('; ')}${fastest.length > 4 ? `; and ${fastest.length - 4} more` : ''}.`;
  }
}

function ask(
  what: string,
  answers: readonly string[],
  now: string | undefined,
  say: (answer: string | undefined) => void,
): TemplateResult {
  return html`<label
    >${what}:
    <select @change=${(event: Event) => say(valueOf(event) || undefined)}>
      <option value="" ?selected=${now === undefined}>not told</option>
      ${answers.map((answer) => html`<option value=${answer} ?selected=${answer === now}>${answer}</option>`)}
    </select></label
  >`;
}
