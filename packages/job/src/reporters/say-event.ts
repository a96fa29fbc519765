import { sayTime, type TimeForm } from '@slewcurve/core';
import type { ClipReport } from '../report.js';
import type { SurveyEvent } from '@slewcurve/survey';

/** Tracks from which on it is worth a line that they are one event. */
const SEVERAL = 3;
const WHAT: Readonly<Record<string, string>> = {
  turn: 'turn another way than may be meant',
  jump: 'jump',
  pace: 'change their pace',
  shake: 'shake',
  seam: 'miss their seam',
};

/** `Walk, 0.633 s: 24 tracks jump within one frame: one event; look at Hips first`; undefined for a few tracks. */
export function sayEvent(event: SurveyEvent, form?: TimeForm, fps?: number): string | undefined {
  if (event.tracks < SEVERAL) return undefined;
  const what = WHAT[event.family] ?? `are at fault by rules of ${event.family}`;
  return `${event.clip}, ${sayTime(event.time, form, fps)}: ${event.tracks} tracks ${what} within one frame: one event; look at ${event.owner} first`;
}

/**
 * `Walk ends where it starts in 38 of 40 moving tracks: if it repeats, say so with --loop`; several clips in one line; undefined where nothing
 * is guessed.
 */
export function sayLoopGuesses(clips: readonly ClipReport[]): string | undefined {
  const closed = clips.filter(({ loopGuess }) => loopGuess !== undefined);
  const [only] = closed;
  const guess = only && sayLoopGuess(only);
  if (guess === undefined) return undefined;
  if (closed.length > 1)
    return `${closed.length} of ${clips.length} clips end where they start (${closed.map(({ clip }) => clip).join(', ')}): of those that repeat, say so with --loop, and their seams are looked at`;
  return `${guess}: if it repeats, say so with --loop, and its seam is looked at`;
}

/** `Walk ends where it starts in 38 of 40 moving tracks`; undefined where nothing is guessed. */
export function sayLoopGuess({ clip, loopGuess }: ClipReport): string | undefined {
  if (loopGuess === undefined) return undefined;
  const { closed, moving } = loopGuess;
  return `${clip} ends where it starts in ${moving === 1 ? 'its one moving track' : `${closed} of ${moving} moving tracks`}`;
}
