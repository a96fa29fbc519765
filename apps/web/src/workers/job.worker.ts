import { SlewcurveError } from '@slewcurve/core';
import type { Source } from '@slewcurve/formats';
import {
  desk,
  kestrelPoint,
  sha256Of,
  tryTable,
  type AskName,
  type Asks,
  type FromDesk,
  type RosterRow,
  type ToDesk,
  type Watch,
} from '@slewcurve/job';
import { bufferSource } from '@slewcurve/formats';
import { inked, type Inked } from '@slewcurve/elements/plot';
import { wordBook } from '@slewcurve/survey';

// The job desk in a worker: bytes, tracks and surveys live here, and the page stays free to draw.

type InkedRow = Inked<RosterRow>;
type Ask<Name extends AskName> = Asks<Blob>[Name]['ask'];
type Answer<Name extends AskName> = Asks<Blob, InkedRow>[Name]['answer'];

/** Milliseconds of work between two looks at what else was asked. */
const SLICE_MS = 12;
/** Milliseconds between two words on how far the work is: nobody reads faster. */
const TOLD_EVERY_MS = 100;

const here = desk();
const stopped = new Set<number>();

const answers: {
  [Name in AskName]: (ask: Ask<Name>, watch: Watch, id: number) => Promise<Answer<Name>> | Answer<Name>;
} = {
  open: ({ file, name, blob, siblings, said }) =>
    here.open(file, blobSource(blob), name, siblingIn(siblings), said),
  'try-table': ({ name, blob, table }) => tryTable(blobSource(blob), name, table),
  matrix: ({ file, clip, track, settings }) => here.matrix(file, clip, track, settings),
  'open-demo': ({ file }) => here.open(file, bufferSource(kestrelPoint()), 'kestrel-point.glb'),
  survey: ({ file, settings }, watch, id) =>
    here.survey(file, settings, watch, (told) => {
      const row = inked(told);
      tell({ id, told: 'row', row }, inkOf(row));
    }),
  track: ({ file, clip, track }) => here.track(file, clip, track),
  try: ({ file, clip, track, step }) => here.trial(file, clip, track, step),
  card: async ({ file, steps }, watch) => {
    const made = await here.card(file, steps, watch);
    return { ...made, tracks: made.tracks.map((track) => ({ ...track, row: inked(track.row) })) };
  },
  propose: ({ file, allow, stamps }) => here.propose(file, allow, stamps),
  bytes: ({ file }, watch) => here.bytes(file, watch),
  hash: async ({ blob }, watch) => ({ size: blob.size, sha256: await sha256Of(blobSource(blob), watch) }),
  close: ({ file }) => {
    here.close(file);
    return null;
  },
  words: () => wordBook(),
  ping: () => null,
};

addEventListener('message', ({ data }: MessageEvent<ToDesk<Blob>>) => {
  if (data.name === 'stop') stopped.add(data.id);
  else void answer(data.id, data.name, data.ask);
});

async function answer<Name extends AskName>(id: number, name: Name, ask: Ask<Name>): Promise<void> {
  try {
    const made = await answers[name](ask, watchOf(id), id);
    tell({ id, told: 'answer', answer: made }, buffersOf(made));
  } catch (error) {
    const known = error instanceof SlewcurveError;
    const message = error instanceof Error ? error.message : String(error);
    tell({ id, told: 'error', code: known ? error.code : 'job.fault', message });
  } finally {
    stopped.delete(id);
  }
}

function watchOf(id: number): Watch {
  let since = performance.now();
  let told = 0;
  return {
    get stopped() {
      return stopped.has(id);
    },
    report(done, total, what) {
      if (performance.now() - told < TOLD_EVERY_MS && done < total) return;
      told = performance.now();
      tell({ id, told: 'progress', done, total, what });
    },
    async pause() {
      if (performance.now() - since < SLICE_MS) return;
      await nextTurn();
      since = performance.now();
    },
  };
}

/** Lets the messages that wait be heard first. A timer would wait 4 ms. */
function nextTurn(): Promise<void> {
  return new Promise((resolve) => {
    const { port1, port2 } = new MessageChannel();
    port1.addEventListener('message', () => {
      port1.close();
      resolve();
    });
    port1.start();
    port2.postMessage(null);
  });
}

function tell(message: FromDesk<InkedRow>, transfer: Transferable[] = []): void {
  postMessage(message, { transfer });
}

/** Big arrays are handed over, never cloned. */
function buffersOf(made: Answer<AskName>): Transferable[] {
  if (made === null) return [];
  if ('before' in made)
    return [...new Set([made.before, made.after])].flatMap((track) => [
      track.times.buffer,
      track.values.buffer,
    ]);
  if ('largest' in made) return made.after ? [made.after.times.buffer, made.after.values.buffer] : [];
  if ('bytes' in made) return [made.bytes.buffer];
  if ('raised' in made) return made.tracks.flatMap(({ row }) => inkOf(row));
  return [];
}

function inkOf({ ink }: InkedRow): Transferable[] {
  return ink.density.buffer instanceof ArrayBuffer ? [ink.density.buffer] : [];
}

function blobSource(blob: Blob): Source {
  return {
    size: blob.size,
    read: async (offset, length) => new Uint8Array(await blob.slice(offset, offset + length).arrayBuffer()),
  };
}

function siblingIn(siblings: Readonly<Record<string, Blob>>): (uri: string) => Promise<Source> {
  return async (uri) => {
    const blob = Object.hasOwn(siblings, uri) ? siblings[uri] : undefined;
    if (blob) return blobSource(blob);
    throw new SlewcurveError(
      'file.not-found',
      `It needs ${uri}, which was not opened with it. Open both together, or their folder.`,
    );
  };
}
