import { SlewcurveError, type RotationTrack, type SceneNode } from '@slewcurve/core';
import {
  applySteps,
  parseSentence,
  type Bend,
  type EditResult,
  type Price,
  type Step,
} from '@slewcurve/mend';

/** A sentence that is being written, read, and tried on the track before it is applied. */
export interface SentenceAtHand {
  readonly text: string;
  /** Where it stands: seconds. */
  readonly time: number;
  /** Undefined while it can't be read or done. */
  readonly step?: Step;
  /** The track as it would be. */
  readonly preview?: RotationTrack;
  /** What it costs, in words. */
  readonly price: string;
  /** Why it can't be done; empty where it can. */
  readonly problem: string;
}

/** What a sentence is tried on: a track, and what stands above it. */
export interface TrialGround {
  readonly after: RotationTrack;
  readonly above: readonly RotationTrack[];
  readonly nodes: readonly SceneNode[];
  /** Frames per second, by which times may be written as frames or timecode. */
  readonly frameRate?: number | undefined;
}

/** Read a sentence and try it on a track. */
export function tryOut(
  text: string,
  time: number,
  { after, above, nodes, frameRate }: TrialGround,
): SentenceAtHand {
  try {
    const step = parseSentence(text, frameRate);
    const { tracks, results } = applySteps([after, ...above], [step], nodes);
    const result = results[0]?.result;
    return {
      text,
      time,
      step,
      price: result ? priceOf(result) : '',
      problem: '',
      ...(tracks[0] && { preview: tracks[0] }),
    };
  } catch (error) {
    return { text, time, price: '', problem: reasonOf(error) };
  }
}

/** Why a step can't be done, without "Step 1": there is but one sentence. */
function reasonOf(error: unknown): string {
  const reason =
    error instanceof SlewcurveError && error.cause instanceof SlewcurveError ? error.cause : error;
  return reason instanceof Error ? reason.message : String(reason);
}

function priceOf(result: EditResult): string {
  const { changed, largest, added, span, price, bends = [] } = result;
  if (changed.length === 0) return 'Nothing would change.';
  const keys = changed.length === 1 ? '1 key changes' : `${changed.length.toLocaleString('en')} keys change`;
  const where = span ? `between ${span[0].toFixed(3)} and ${span[1].toFixed(3)} s` : 'and no motion changes';
  if (price) return `${keys} ${where}. ${paceWords(price, bends)}`;
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

function signed(number: string): string {
  return number.startsWith('-') ? `−${number.slice(1)}` : `+${number}`;
}
