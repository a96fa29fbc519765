import type { RotationTrack } from '@slewcurve/core';
import type { TrialAnswer } from '@slewcurve/job';
import { parseSentence, type Bend, type Meeting, type Price, type Step } from '@slewcurve/mend';

/** A sentence that is being written, read, and tried on the track before it is applied. */
export interface SentenceAtHand {
  readonly text: string;
  /** Where it stands: seconds. */
  readonly time: number;
  /** Undefined while it can't be read or done. */
  readonly step?: Step;
  /** The track as it would be; while another result is awaited, for a moment the one before. */
  readonly preview?: RotationTrack;
  /** What it costs, in words. */
  readonly price: string;
  /** Why it can't be done; empty where it can. */
  readonly problem: string;
}

/** Read a sentence. Frames per second, by which times may be written as frames or timecode. */
export function readSentence(text: string, time: number, frameRate: number | undefined): SentenceAtHand {
  try {
    return { text, time, step: parseSentence(text, frameRate), price: '', problem: '' };
  } catch (error) {
    return refused({ text, time }, error);
  }
}

/** A sentence with what a trial of it made; `track` is what it was tried on. */
export function tried(
  { text, time, step }: SentenceAtHand,
  answer: TrialAnswer,
  track: RotationTrack,
): SentenceAtHand {
  const preview = answer.after ?? track;
  return { text, time, price: priceOf(answer), problem: '', preview, ...(step && { step }) };
}

/** A sentence that can't be read or done. */
export function refused(
  { text, time }: Pick<SentenceAtHand, 'text' | 'time'>,
  error: unknown,
): SentenceAtHand {
  return { text, time, price: '', problem: error instanceof Error ? error.message : String(error) };
}

function priceOf({ changed, largest, added, span, price, bends = [], meeting }: TrialAnswer): string {
  if (changed === 0) return 'Nothing would change.';
  const keys = changed === 1 ? '1 key changes' : `${changed.toLocaleString('en')} keys change`;
  const where = span ? `between ${span[0].toFixed(3)} and ${span[1].toFixed(3)} s` : 'and no motion changes';
  if (price) return `${keys} ${where}. ${paceWords(price, bends)}${meetingWords(meeting)}`;
  const turn = largest > 0 ? `the largest turns by ${largest.toPrecision(3)}°` : 'none turns';
  return `${keys}, ${turn}, ${where}; ${added === 0 ? 'no time is added' : `${added.toFixed(3)} s are added`}.`;
}

/** Bends are told before they are taken. */
function paceWords({ seconds, degrees, bytes }: Price, bends: readonly Bend[]): string {
  const time = Math.abs(seconds) < 5e-4 ? 'no time' : `${signed(seconds.toFixed(3))} s`;
  const size = bytes === 0 ? 'no bytes' : `${signed(bytes.toLocaleString('en'))} bytes`;
  const [worst] = bends;
  const bend = worst
    ? ` ${bends.length === 1 ? 'A bend is' : `${bends.length} bends are`} taken at speed: at ${worst.time.toFixed(2)} s the rate jumps by ${worst.jump.toPrecision(3)} deg/s.`
    : '';
  return `It costs ${time}, ${degrees < 5e-4 ? 'less than 0.001' : degrees.toPrecision(2)}° off the path, ${size}.${bend}`;
}

function meetingWords(meeting: Meeting | undefined): string {
  if (!meeting) return '';
  const [before, after, axis] = [meeting.before, meeting.after, meeting.axis].map((number) =>
    number.toPrecision(3),
  );
  return ` Both sides of the join turn at ${before} and ${after} deg/s, about axes ${axis}° apart, which no pace changes.`;
}

function signed(number: string): string {
  return number.startsWith('-') ? `−${number.slice(1)}` : `+${number}`;
}
