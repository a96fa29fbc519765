import type { MendedFile } from '@slewcurve/job';
import type { Arguments } from './flags.js';
import type { FileInHand } from './with-file.js';

/** What was changed and where it was written: what somebody looks for at the end of a run. */
export function sayWritten(file: FileInHand, { steps }: MendedFile, args: Arguments): string[] {
  const keys = steps.reduce((sum, { changed }) => sum + changed, 0);
  const edits = `${counted(steps.length, 'edit')}, ${counted(keys, 'key')} changed`;
  if (args.given('dry-run')) return [`nothing written, as asked. It would be ${edits}.`];
  const [undoOut, cardOut] = [args.value('undo-out'), args.value('card-out')];
  return [
    `written: ${args.value('o') ?? file.opened.name}: ${edits}.`,
    ...(undoOut === undefined ? [] : [`written: ${undoOut}: takes it back.`]),
    ...(cardOut === undefined ? [] : [`written: ${cardOut}: the edits as a job card.`]),
  ];
}

function counted(count: number, what: string): string {
  return `${count.toLocaleString('en')} ${what}${count === 1 ? '' : 's'}`;
}
