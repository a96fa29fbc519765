import type { AskName, Asks, FromDesk, ToDesk } from '@slewcurve/job';
import type { InkedRow } from './file-work.js';

/** How far an ask is. */
export interface Progress {
  readonly done: number;
  readonly total: number;
  readonly what: string;
}

/** What an ask may be given besides its words. */
export interface AskOptions {
  readonly onProgress?: (progress: Progress) => void;
  readonly onRow?: (row: InkedRow) => void;
  /** Stops the ask. */
  readonly signal?: AbortSignal;
}

/** What the desk answered instead: its code and message, for people. */
export class DeskError extends Error {
  readonly code: string;
  constructor(code: string, message: string) {
    super(message);
    this.code = code;
  }
}

type Answer = Asks<Blob, InkedRow>[AskName]['answer'];

interface Waiting {
  readonly name: AskName;
  readonly options: AskOptions;
  readonly resolve: (answer: Answer) => void;
  readonly reject: (error: Error) => void;
}

const PING_MS = 1000;
/** The desk works in slices and answers within 50 ms; silent this long, it is gone. */
const SILENT_MS = 4000;
/** But one edit is one slice, however long the track. */
const EDITING_MS = 60_000;
const EDITS: readonly AskName[] = ['try', 'card', 'propose', 'bytes'];

/** The page's end of the desk in its worker. Says `lost` once where the worker stops answering, and starts another. */
export class DeskClient extends EventTarget {
  #worker = startWorker();
  #next = 1;
  #waiting = new Map<number, Waiting>();
  #heard = performance.now();
  #asleepAt = performance.now();

  constructor() {
    super();
    this.#listen();
    setInterval(() => this.#beat(), PING_MS);
  }

  ask<Name extends AskName>(
    name: Name,
    ask: Asks<Blob>[Name]['ask'],
    options: AskOptions = {},
  ): Promise<Asks<Blob, InkedRow>[Name]['answer']> {
    const id = this.#next++;
    options.signal?.addEventListener('abort', () => this.#send({ id, name: 'stop' }));
    const answer = new Promise<Answer>((resolve, reject) => {
      this.#waiting.set(id, { name, options, resolve, reject });
    });
    // The desk answers an ask of a name by the answer of that name; the types of its messages say so one by one.
    // oxlint-disable-next-line typescript/no-unsafe-type-assertion
    this.#send({ id, name, ask } as ToDesk<Blob>);
    return answer;
  }

  #send(message: ToDesk<Blob>): void {
    this.#worker.postMessage(message);
  }

  #listen(): void {
    this.#heard = performance.now();
    this.#worker.addEventListener('message', ({ data }: MessageEvent<FromDesk<InkedRow>>) =>
      this.#hear(data),
    );
    this.#worker.addEventListener('error', () => this.#lose());
  }

  #hear(message: FromDesk<InkedRow>): void {
    this.#heard = performance.now();
    const waiting = this.#waiting.get(message.id);
    if (!waiting) return;
    if (message.told === 'progress') waiting.options.onProgress?.(message);
    else if (message.told === 'row') waiting.options.onRow?.(message.row);
    else {
      this.#waiting.delete(message.id);
      if (message.told === 'answer') waiting.resolve(message.answer);
      else waiting.reject(new DeskError(message.code, message.message));
    }
  }

  #beat(): void {
    const now = performance.now();
    const slept = now - this.#asleepAt > 3 * PING_MS;
    this.#asleepAt = now;
    // A page that was asleep has heard nothing either.
    if (slept) this.#heard = now;
    const editing = [...this.#waiting.values()].some(({ name }) => EDITS.includes(name));
    if (now - this.#heard > (editing ? EDITING_MS : SILENT_MS)) this.#lose();
    else this.ask('ping', {}).catch(() => {});
  }

  #lose(): void {
    this.#worker.terminate();
    const waiting = [...this.#waiting.values()];
    this.#waiting.clear();
    this.#worker = startWorker();
    this.#listen();
    for (const { reject } of waiting)
      reject(new DeskError('desk.lost', 'The work behind the page stopped and was started again.'));
    this.dispatchEvent(new Event('lost'));
  }
}

function startWorker(): Worker {
  return new Worker(new URL('../workers/job.worker.ts', import.meta.url), { type: 'module' });
}
