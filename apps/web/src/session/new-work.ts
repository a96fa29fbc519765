import type { SaidConventions, Stamp } from '@slewcurve/job';
import type { ChosenFile } from '../files/chosen-file.js';
import { EMPTY_HISTORY, linesOf } from './card-history.js';
import type { FileWork } from './file-work.js';
import type { SavedWork } from './recovery.js';

/** What a file's work begins with. */
interface Beginning extends Omit<ChosenFile, 'blob'> {
  readonly blob?: Blob;
  readonly said?: SaidConventions;
  readonly stamps?: readonly Stamp[];
  readonly loops?: readonly string[];
}

/** The work on a file that is about to be opened. */
export function newWork(id: string, beginning: Beginning): FileWork {
  const { name, blob, siblings, handle, said, stamps = [], loops = [] } = beginning;
  return {
    id,
    name,
    siblings,
    stamps,
    loops,
    status: 'opening',
    rows: new Map(),
    found: new Map(),
    findings: new Map(),
    events: [],
    history: EMPTY_HISTORY,
    proofs: [],
    raised: [],
    saved: true,
    ...(blob && { blob }),
    ...(handle && { handle }),
    ...(said && { said }),
  };
}

/** What is kept of a file's work for another visit. */
export function savedWork(file: FileWork): SavedWork {
  const { name, blob, siblings, handle, said, history, stamps, loops } = file;
  const work = { name, siblings, stamps, loops, lines: linesOf(history), savedAt: Date.now() };
  return { ...work, ...(blob && { blob }), ...(handle && { handle }), ...(said && { said }) };
}
