import { SlewcurveError } from '../errors.js';
import { exactRate } from './exact-rate.js';
import { frameOfTimecode, isTimecode, timecodeOf } from './timecode.js';

/** How times are written for people. */
export type TimeForm = 'seconds' | 'frames' | 'timecode';

/** Every form of time, the default first. */
export const TIME_FORMS: readonly TimeForm[] = Object.freeze(['seconds', 'frames', 'timecode']);

/**
 * A time in words: `1.500 s`, `frame 45`, `00:00:01:15`. What lies between frames keeps two decimals of a frame. Without a grid times are said in seconds,
 * whatever the form.
 *
 * @param seconds of the file's own clock
 * @param fps frames per second of the grid
 */
export function sayTime(seconds: number, form: TimeForm = 'seconds', fps?: number): string {
  if (form === 'seconds' || fps === undefined || !(fps > 0) || !Number.isFinite(seconds))
    return `${seconds.toFixed(3)} s`;
  const frame = Number((seconds * exactRate(fps)).toFixed(2));
  return form === 'frames' ? `frame ${Object.is(frame, -0) ? 0 : frame}` : timecodeOf(frame, fps);
}

/**
 * Seconds that a text says: `1.5`, `1.5 s`, `frame 45`, `45 frames`, `45 f`, `00:00:01:15`, `00:01:00;02`. The undoing of `sayTime`, and what people type.
 *
 * @param fps frames per second of the grid; frames and timecode need it
 * @throws SlewcurveError `time.unreadable`, `time.needs-grid`, `time.no-such-frame`
 */
export function readTime(text: string, fps?: number): number {
  const trimmed = text.trim();
  const [, plain] =
    /^([-+]?(?:\d+(?:\.\d*)?|\.\d+)(?:e[-+]?\d+)?)\s*(?:s|sec|seconds?)?$/i.exec(trimmed) ?? [];
  if (plain !== undefined) return Number(plain);
  const [, named, counted] =
    /^(?:frame\s+([-+]?\d+(?:\.\d+)?)|([-+]?\d+(?:\.\d+)?)\s*(?:f|frames?))$/i.exec(trimmed) ?? [];
  const count = named ?? counted;
  if (count === undefined && !isTimecode(trimmed))
    throw new SlewcurveError(
      'time.unreadable',
      `"${trimmed.slice(0, 40)}" is no time. Write seconds (1.5 s), a frame (frame 45) or hh:mm:ss:ff (00:00:01:15).`,
    );
  if (fps === undefined || !(fps > 0))
    throw new SlewcurveError(
      'time.needs-grid',
      `"${trimmed.slice(0, 40)}" counts frames, and the clip lies on no frame rate that is known. Say how many there are a second, or write seconds.`,
    );
  return (count === undefined ? frameOfTimecode(trimmed, fps) : Number(count)) / exactRate(fps);
}
