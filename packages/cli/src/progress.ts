import type { Watch } from '@slewcurve/job';
import { setImmediate } from 'node:timers/promises';
import type { CommandIo } from './command-io.js';

/** How far long work is, on one line of a terminal; nothing elsewhere. */
export interface Progress {
  say(text: string): void;
  /** Takes the line away again. */
  clear(): void;
}

/** Milliseconds between two states of the line. */
const PATIENCE = 100;

/** Back to the start of the line and wipe it (ECMA-48: CR, EL). */
const WIPE = '\r\u001B[2K';

export function progressOn({ stderr }: CommandIo): Progress {
  let said = 0;
  let shown = false;
  return {
    say(text) {
      const now = performance.now();
      if (stderr.isTTY !== true || now - said < PATIENCE) return;
      said = now;
      shown = true;
      stderr.write(`${WIPE}${text}`);
    },
    clear() {
      if (shown) stderr.write(WIPE);
      shown = false;
    },
  };
}

/** Milliseconds of work before signals get a turn. */
const SLICE = 50;

/** Watches work in this very thread: shows it, and lets a signal in now and then. */
export function watchOver(io: CommandIo, progress: Progress, prefix: string): Watch {
  let last = performance.now();
  return {
    get stopped() {
      return io.signal?.aborted === true;
    },
    report: (done, total, what) => progress.say(`${prefix}${done} of ${total} ${what}`),
    async pause() {
      if (performance.now() - last < SLICE) return;
      await setImmediate();
      last = performance.now();
    },
  };
}
