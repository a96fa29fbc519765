import { readTime } from '@slewcurve/core';

/** A timecode, `frame 45`, or `45 frames` that is no frame rate. */
const FRAMES =
  /(?<![\w.:;-])(?:[-+]?\d+:\d\d?:\d\d?[:;]\d+(?:\.\d+)?|frame [-+]?\d+(?:\.\d+)?|[-+]?\d+(?:\.\d+)? (?:frames?|f)(?! a second))(?![\w:;])/g;

/**
 * What of a sentence follows its names, with every time that is told in frames told in seconds. What stands in double quotes stays.
 *
 * @throws SlewcurveError what `readTime` throws
 */
export function timesInSeconds(text: string, fps: number | undefined): string {
  return text
    .split(/("(?:[^"\\]|\\.)*")/)
    .map((part, i) => (i % 2 === 1 ? part : part.replace(FRAMES, (time) => `${readTime(time, fps)} s`)))
    .join('');
}
