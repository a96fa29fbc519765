import { SlewcurveError } from '@slewcurve/core';

/** Who waits for long work: hears how far it is, may stop it, and gives other work a turn. */
export interface Watch {
  /** Asked between slices; true ends the work with `job.stopped`. */
  readonly stopped: boolean;
  /** `done` of `total` pieces of `what` are finished. */
  report(done: number, total: number, what: string): void;
  /** Resolves when the work may go on; at once where nothing else waits. */
  pause(): Promise<void>;
}

/** Nobody waits: the work runs through. */
export const UNWATCHED: Watch = Object.freeze({ stopped: false, report: () => {}, pause: async () => {} });

/**
 * Between two slices of work: says how far it is and gives way.
 *
 * @throws SlewcurveError `job.stopped`
 */
export async function betweenSlices(watch: Watch, done: number, total: number, what: string): Promise<void> {
  watch.report(done, total, what);
  await watch.pause();
  if (watch.stopped) throw new SlewcurveError('job.stopped', `Stopped at ${done} of ${total} ${what}.`);
}
