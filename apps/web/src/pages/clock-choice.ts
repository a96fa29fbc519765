import { html, type TemplateResult } from 'lit';
import { TIME_FORMS, type TimeForm } from '@slewcurve/core';
import { valueOf } from '@slewcurve/elements/theme/value-of';

/** How times are read on the page. */
export interface Clock {
  readonly form: TimeForm;
  /** Frames per second that somebody says, in the place of those found. */
  readonly frameRate?: number;
}

const WORDS: Readonly<Record<TimeForm, string>> = {
  seconds: 'seconds',
  frames: 'frames',
  timecode: 'hh:mm:ss:ff',
};

/** The one switch for all times, and the frames per second that they count by: those found, until others are said. */
export function clockChoice(
  clock: Clock,
  found: number | undefined,
  choose: (clock: Clock) => void,
): TemplateResult {
  const rate = clock.frameRate ?? found;
  const sayRate = (event: Event): void => {
    const given = Number(valueOf(event));
    choose({ form: clock.form, ...(given > 0 && given <= 1e5 && { frameRate: given }) });
  };
  return html`<label
      >times in:
      <select
        @change=${(event: Event) =>
          choose({ ...clock, form: TIME_FORMS.find((form) => form === valueOf(event)) ?? 'seconds' })}
      >
        ${TIME_FORMS.map((form) => html`<option value=${form} ?selected=${form === clock.form}>${WORDS[form]}</option>`)}
      </select></label
    >
    <label
      >frames a second${clock.frameRate === undefined && found !== undefined ? ' (found)' : ''}:
      <input
        type="number"
        min="1"
        step="any"
        size="7"
        placeholder="none found"
        .value=${rate === undefined ? '' : String(rate)}
        @change=${sayRate}
    /></label>`;
}
