import { html, type TemplateResult } from 'lit';
import type { JobLine } from '@slewcurve/elements/job-card';
import { sayStep } from '@slewcurve/mend';
import { linesOf, moved, redoWords, undoWords, type CardLine } from '../session/card-history.js';
import type { FileWork } from '../session/file-work.js';
import type { Session } from '../session/session.js';

/** The job card of a file, wired to the session. Lines are named by their number. */
export function jobCardOf(file: FileWork, session: Session): TemplateResult {
  const { id, history } = file;
  const lines = linesOf(history);
  const set = (next: readonly CardLine[], change: string): void => void session.setLines(id, next, change);
  const skip = (name: string, skipped: boolean): void =>
    set(
      lines.map((line, i) => (String(i) === name ? { ...line, skipped } : line)),
      skipped ? 'skip a line' : 'take a line in again',
    );
  return html`<slew-job-card
    .lines=${lines.map((line, i) => jobLine(file, line, i))}
    .undo=${undoWords(history)}
    .redo=${redoWords(history)}
    @line-moved=${({ detail }: CustomEvent<{ id: string; to: number }>) => set(moved(lines, Number(detail.id), detail.to), 'move a line')}
    @line-skipped=${({ detail }: CustomEvent<{ id: string; skipped: boolean }>) => skip(detail.id, detail.skipped)}
    @line-removed=${({ detail }: CustomEvent<{ id: string }>) =>
      set(
        lines.filter((_, i) => String(i) !== detail.id),
        'remove a line',
      )}
    @undo-asked=${() => void session.undo(id)}
    @redo-asked=${() => void session.redo(id)}
  ></slew-job-card>`;
}

function jobLine({ proofs }: FileWork, { step, skipped }: CardLine, at: number): JobLine {
  const proof = proofs.find((other) => JSON.stringify(other.step) === JSON.stringify(step));
  const keys = proof?.changed === 1 ? '1 key changed' : `${proof?.changed ?? 0} keys changed`;
  const price =
    proof && !skipped
      ? `${keys}, the largest by ${proof.largest}°; outside its span ${proof.outside}°.`
      : undefined;
  return { id: String(at), sentence: sayStep(step), skipped, ...(price !== undefined && { price }) };
}
