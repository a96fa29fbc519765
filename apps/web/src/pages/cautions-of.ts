import { html, type TemplateResult } from 'lit';
import type { FileWork } from '../session/file-work.js';

/** What to mind where somebody can be hurt or made ill; nothing where no track is of such a role. */
export function cautionsOf({ report }: FileWork): readonly TemplateResult[] {
  return (report?.cautions ?? []).map(
    ({ role, tracks, message }) =>
      html`<p class="caution">
        <b>Caution, ${role === 'machine' ? 'machine' : 'headset'}</b>
        (${tracks === 1 ? '1 track' : `${tracks} tracks`}): ${message}
      </p>`,
  );
}
